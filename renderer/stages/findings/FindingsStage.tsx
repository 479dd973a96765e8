/** The verdicts, worst first; what could not be judged and the figure it waits for; what was compared and held. */
import Box from '@mui/material/Box';
import Typography from '@mui/material/Typography';
import { type ReactElement, useEffect, useMemo, useRef } from 'react';
import type { CheckReport } from '../../../core/api.ts';
import { Folded } from '../../controls/Folded.tsx';
import { useOpenJob } from '../../state/openJob.ts';
import { PracticeChoice } from '../site/PracticeChoice.tsx';
import { CaseTrouble } from './CaseTrouble.tsx';
import { FindingFilters } from './FindingFilters.tsx';
import { FindingList } from './FindingList.tsx';
import { FindingsTabs } from './FindingsTabs.tsx';
import { filtered, listed, severityCounts } from './findingList.ts';
import { changeView, useFindingsView } from './findingsView.ts';
import { NotDone } from './NotDone.tsx';
import { PassedList } from './PassedList.tsx';
import { PracticesPanel } from './PracticesPanel.tsx';
import { ProtectionPanel } from './ProtectionPanel.tsx';

export function FindingsStage(): ReactElement {
  const answers = useOpenJob(({ answers }) => answers);
  const trouble = useOpenJob(({ solverTrouble }) => solverTrouble);
  const count = useRef<HTMLOutputElement>(null);
  const assumed = useOpenJob(({ job }) => job.practiceAssumed === true);
  // The choice of a rule book goes once it is made: whoever was in it goes on at the head of the list.
  useEffect(() => {
    if (!assumed && document.activeElement === document.body) count.current?.focus();
  }, [assumed]);
  const points = useMemo(() => [...(answers?.points.values() ?? [])], [answers]);
  return (
    <Box sx={{ height: '100%', minHeight: 0, overflow: 'auto', padding: '1rem 1.5rem 2rem' }}>
      <Typography component="h1" variant="h1">
        Findings
      </Typography>
      <Box
        component="output"
        ref={count}
        tabIndex={-1}
        aria-live="polite"
        sx={{ display: 'block', mb: '0.75rem', color: 'var(--soft)', fontVariantNumeric: 'tabular-nums' }}
      >
        {answers === null ? 'The job is being solved …' : countWords(answers.report)}
      </Box>
      {trouble !== null && (
        <Box role="alert" sx={{ color: 'var(--stop)', mb: '0.75rem' }}>
          There are no new answers: {trouble}
        </Box>
      )}
      {assumed && <NoPractice />}
      <CaseTrouble points={points} />
      {answers !== null && (
        <FindingsTabs
          verdicts={<Verdicts report={answers.report} onMade={() => count.current?.focus()} />}
          protection={<ProtectionPanel findings={answers.report.findings} />}
          practices={<PracticesPanel own={answers.report} />}
        />
      )}
    </Box>
  );
}

function Verdicts({ report, onMade }: { readonly report: CheckReport; readonly onMade: () => void }): ReactElement {
  const job = useOpenJob(({ job }) => job);
  const { filter, openKey } = useFindingsView();
  const all = useMemo(() => listed(report.findings), [report]);
  const shown = useMemo(() => filtered(all, filter, job), [all, filter, job]);
  const held = report.passed.reduce((sum, { count }) => sum + count, 0);
  return (
    <>
      {all.length > 0 && (
        <>
          <FindingFilters
            all={all}
            shown={shown.length}
            filter={filter}
            onChange={(changed) => changeView({ filter: changed })}
          />
          <h2 className="only-read">The findings</h2>
          <FindingList shown={shown} openKey={openKey} onOpen={(key) => changeView({ openKey: key })} onMade={onMade} />
        </>
      )}
      <Box sx={{ mt: '1rem' }}>
        <Folded title="Checks not done for want of a figure" aside={report.notChecked.length} open>
          <NotDone rows={report.notChecked} />
        </Folded>
        <Folded title="Comparisons that held" aside={held}>
          <PassedList passed={report.passed} />
        </Folded>
      </Box>
    </>
  );
}

/** `4 findings: 1 stop, 3 fix; 12 checks not done for want of a figure`. */
export function countWords(report: CheckReport): string {
  const { findings, notChecked, passed } = report;
  const held = passed.reduce((sum, { count }) => sum + count, 0);
  const open =
    notChecked.length === 0
      ? 'every check had its figures'
      : `${String(notChecked.length)} not done for want of a figure`;
  if (findings.length === 0) return `No finding in ${String(held)} checks; ${open}.`;
  const told = severityCounts(findings).map(([severity, many]) => `${String(many)} ${severity}`);
  const noun = findings.length === 1 ? 'finding' : 'findings';
  return `${String(findings.length)} ${noun}, worst first: ${told.join(', ')}. ${String(held)} comparisons held; ${open}.`;
}

/** A job that names no practice is judged by no book: that comes first, with the choice at hand. */
function NoPractice(): ReactElement {
  return (
    <Box component="section" aria-labelledby="no-practice" sx={{ mb: '1rem', maxWidth: '60rem' }}>
      <Typography component="h2" variant="h2" id="no-practice">
        No rule book is applied yet
      </Typography>
      <Box component="p" sx={{ mt: '0.25rem', mb: '0.5rem' }}>
        This job names no practice, so nothing below was judged by a rule book: only what needs none. Choose the one
        that is in force where the system stands.
      </Box>
      <PracticeChoice />
    </Box>
  );
}
