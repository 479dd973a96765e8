/** Does every fuse fit between its load and its wire, and open every fault? A row a device; the faults and what could be changed under it. */
import Box from '@mui/material/Box';
import { type ReactElement, useMemo } from 'react';
import { cautionTexts, type Finding, type ProtectionStudy } from '../../../core/api.ts';
import { Hatches } from '../../charts/Hatches.tsx';
import { CautionStrip } from '../../controls/CautionStrip.tsx';
import { Chip, ChipRow } from '../../controls/Chips.tsx';
import { Folded } from '../../controls/Folded.tsx';
import { Assumed, Quiet } from '../../controls/Prose.tsx';
import { StudyPlace } from '../../controls/StudyPlace.tsx';
import { useOpenJob } from '../../state/openJob.ts';
import { DeviceList } from './DeviceList.tsx';
import { FaultTable } from './FaultTable.tsx';
import { changeView, useFindingsView } from './findingsView.ts';
import { ProposalsPanel } from './ProposalsPanel.tsx';
import { useProtectionStudy } from './protectionStudies.ts';
import { METHODS, protectionTitle } from './protectionWords.ts';

export function ProtectionPanel({ findings }: { readonly findings: readonly Finding[] }): ReactElement {
  const { method } = useFindingsView();
  const study = useProtectionStudy('now', { method });
  const { last } = study;
  return (
    <Box sx={{ position: 'relative' }}>
      <Hatches />
      {last === null || study.state?.status === 'failed' ? (
        <StudyPlace study={study} doing="Working out every fault" begin="Work out every fault">
          {() => null}
        </StudyPlace>
      ) : (
        <Answered study={last} findings={findings} isOld={study.answer === null} />
      )}
    </Box>
  );
}

interface AnsweredProps {
  readonly study: ProtectionStudy;
  readonly findings: readonly Finding[];
  /** Of the job before the last edit, or by the method before. */
  readonly isOld: boolean;
}

function Answered({ study, findings, isOld }: AnsweredProps): ReactElement {
  const job = useOpenJob((open) => open.job);
  const { isProposing } = useFindingsView();
  const cautions = useMemo(() => cautionTexts('devices', job), [job]);
  return (
    <Box aria-busy={isOld} sx={isOld ? OLD : FRESH}>
      <Box sx={{ display: 'flex', flexWrap: 'wrap', alignItems: 'center', gap: '0.25rem 1.5rem' }}>
        <Box
          component="h2"
          aria-live="polite"
          sx={{ m: 0, flex: '1 1 24rem', fontSize: '1.1875rem', fontWeight: 600, lineHeight: 1.3 }}
        >
          {protectionTitle(study.devices)}
        </Box>
        <MethodRow />
      </Box>
      <CautionStrip texts={cautions} title="Before a hand touches a fuse" />
      <DeviceList devices={study.devices} findings={findings} />
      <Box sx={{ mt: '0.5rem' }}>
        <Folded
          title="Propose fuses and cables"
          aside="cheapest that passes, run by run; nothing is changed before you take it"
          open={isProposing}
          onTurn={(now) => now !== isProposing && changeView({ isProposing: now })}
        >
          {isProposing && <ProposalsPanel />}
        </Folded>
        <Folded title="Fault level at every junction" aside={faultAside(study)}>
          <FaultTable study={study} />
        </Folded>
        <Assumed texts={study.assumed} />
      </Box>
      <Quiet>
        Everything closed and on; what is assumed of a string counts over its whole range. Highest: every source,
        conductors at 20 °C, chargers at their rated output. Lowest: low volts and high resistance of the bank that
        sends least, conductors hot, chargers nothing. A bolted fault: no arc, no resistance of its own.
      </Quiet>
    </Box>
  );
}

function faultAside({ poles }: ProtectionStudy): string {
  return `${String(poles.length)} between poles`;
}

function MethodRow(): ReactElement {
  const { method } = useFindingsView();
  return (
    <ChipRow aria-label="Method of the fault currents">
      <span style={{ alignSelf: 'center', color: 'var(--soft)', fontSize: '0.875rem', marginInlineEnd: '0.25rem' }}>
        Fault currents by
      </span>
      {METHODS.map(([one, words, hint]) => (
        <Chip key={one} title={hint}>
          <input
            type="radio"
            name="fault-method"
            checked={one === method}
            onChange={() => changeView({ method: one })}
          />
          <span>{words}</span>
        </Chip>
      ))}
    </ChipRow>
  );
}

/** Figures of the job before the last edit stand back while the next are on their way; a short wait is not shown. */
const OLD = { opacity: 0.55, transition: 'opacity 0s linear 0.3s' } as const;
const FRESH = { opacity: 1 } as const;
