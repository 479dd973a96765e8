/** One fuse or breaker: its window, what it must interrupt, from where it is fed; opened, its time–current picture. */
import Box from '@mui/material/Box';
import Button from '@mui/material/Button';
import ButtonBase from '@mui/material/ButtonBase';
import type { ReactElement } from 'react';
import type { DeviceStudy, Finding } from '../../../core/api.ts';
import { partName } from '../../../core/api.ts';
import { FuseWindowBar } from '../../charts/FuseWindowBar.tsx';
import { TimeCurrent } from '../../charts/TimeCurrent.tsx';
import { SeverityMark } from '../../controls/SeverityMark.tsx';
import { useOpenJob } from '../../state/openJob.ts';
import { useSession } from '../../state/session.ts';
import { goToFindingsOf } from './findingsView.ts';
import { barShares, MeasuredBar } from './LimitBar.tsx';
import { amps, bandWords, interruptWords, pictureWords, timeCurrentTitle, windowFigures } from './protectionWords.ts';

export interface DeviceRowProps {
  readonly device: DeviceStudy;
  /** About this device before any other part, worst first. */
  readonly findings: readonly Finding[];
  readonly isOpen: boolean;
  readonly onToggle: () => void;
}

export function DeviceRow({ device, findings, isOpen, onToggle }: DeviceRowProps): ReactElement {
  const job = useOpenJob((open) => open.job);
  const panel = `device-${device.id.replaceAll(/[^A-Za-z0-9]+/g, '-')}`;
  return (
    <Box
      component="li"
      sx={{ borderTop: '1px solid var(--hair)', backgroundColor: isOpen ? 'var(--sheet)' : 'transparent' }}
    >
      <Box sx={ROW}>
        <Box component="h3" sx={{ m: 0, fontSize: '0.9375rem', fontWeight: 400, minWidth: 0 }}>
          <ButtonBase
            data-device={device.id}
            aria-expanded={isOpen}
            aria-controls={isOpen ? panel : undefined}
            onClick={onToggle}
            sx={NAME}
          >
            <svg
              width="10"
              height="10"
              viewBox="0 0 12 12"
              aria-hidden="true"
              focusable="false"
              style={{ flex: 'none' }}
            >
              <polyline
                points={isOpen ? '1,8 6,3 11,8' : '1,4 6,9 11,4'}
                fill="none"
                stroke="currentColor"
                strokeWidth="1.5"
              />
            </svg>
            <span style={{ minWidth: 0, overflowWrap: 'anywhere' }}>
              <strong>{partName(job, device.id)}</strong>{' '}
              <span style={{ color: 'var(--soft)', whiteSpace: 'nowrap' }}>
                {`${amps(device.ratingA)} ${device.kind}`}
                <span className="only-read">: time–current picture</span>
              </span>
            </span>
          </ButtonBase>
          <Verdict device={device} findings={findings} />
        </Box>
        <Window device={device} />
        <Interrupt device={device} />
        <Ends device={device} />
      </Box>
      {isOpen && (
        <Box id={panel} sx={{ padding: '0.25rem 0.75rem 0.75rem' }}>
          <Picture device={device} />
        </Box>
      )}
    </Box>
  );
}

/** By the list's own width in letters, so that large text counts as narrow too. */
const NARROW = '@container (max-width: 46rem)';
const ROW = {
  display: 'grid',
  gridTemplateColumns: '11rem minmax(10rem, 1fr) 10.5rem 4.25rem',
  columnGap: '1rem',
  rowGap: '0.25rem',
  alignItems: 'start',
  padding: '0.375rem 0.5rem',
  fontSize: '0.8125rem',
  lineHeight: 1.35,
  [NARROW]: { gridTemplateColumns: 'minmax(0, 1fr)' },
} as const;
const NAME = {
  display: 'flex',
  alignItems: 'baseline',
  justifyContent: 'flex-start',
  gap: '0.5rem',
  width: '100%',
  minHeight: '1.5rem',
  textAlign: 'left',
  font: 'inherit',
  lineHeight: 1.3,
  '&:hover': { backgroundColor: 'var(--lit)' },
  '&.Mui-focusVisible': { outline: '2px solid var(--volt)', outlineOffset: 0 },
  '@media (pointer: coarse)': { minHeight: 44 },
} as const;

function Verdict({ device, findings }: Pick<DeviceRowProps, 'device' | 'findings'>): ReactElement {
  const [worst] = findings;
  if (worst === undefined) {
    return <Box sx={{ paddingLeft: '1.125rem', fontSize: '0.8125rem', color: 'var(--soft)' }}>no finding</Box>;
  }
  const words = findings.length === 1 ? '1 finding' : `${String(findings.length)} findings`;
  return (
    <Box sx={{ display: 'flex', alignItems: 'baseline', gap: '0.5rem', paddingLeft: '1.125rem' }}>
      <SeverityMark severity={worst.severity} />
      <Button onClick={() => goToFindingsOf(device.id)} sx={LINK}>
        {words}
        <span className="only-read"> about {device.id}</span>
      </Button>
    </Box>
  );
}

const LINK = {
  paddingInline: 0,
  minHeight: '1.5rem',
  minWidth: 0,
  fontSize: '0.8125rem',
  textDecoration: 'underline',
  '@media (pointer: coarse)': { minHeight: 44 },
} as const;

function Window({ device: { window } }: { readonly device: DeviceStudy }): ReactElement {
  if ('missing' in window) return <Box sx={{ color: 'var(--soft)' }}>No window without {window.missing}.</Box>;
  const inside = window.standardInside.map((ratingA) => amps(ratingA));
  return (
    <Box sx={{ minWidth: 0 }}>
      <FuseWindowBar window={window} />
      <Box sx={{ fontVariantNumeric: 'tabular-nums' }}>{windowFigures(window)}</Box>
      <Box sx={{ color: window.fits ? 'var(--soft)' : 'var(--stop)' }}>
        {window.fits ? `Inside; standard there: ${listed(inside)}` : sentence(window.words)}
      </Box>
    </Box>
  );
}

/** Many standard sizes fit under a thick wire: the ends tell enough. */
function listed(ratings: readonly string[]): string {
  if (ratings.length <= 4) return ratings.length === 0 ? 'none' : ratings.join(', ');
  return `${ratings[0] ?? ''} to ${ratings.at(-1) ?? ''}, ${String(ratings.length)} sizes`;
}

/** What the window says after its figures, which stand above. */
function sentence(words: string): string {
  const said = words.split('; ').slice(1).join('; ');
  return said.charAt(0).toUpperCase() + said.slice(1);
}

function Interrupt({ device }: { readonly device: DeviceStudy }): ReactElement {
  const { fault, interruptA, ok } = device;
  const shares =
    fault === null || interruptA === null
      ? null
      : barShares({ measured: { value: fault.highestA, unit: 'A' }, limit: { value: interruptA, unit: 'A' } });
  return (
    <Box sx={{ minWidth: 0 }}>
      {shares !== null && <MeasuredBar {...shares} fill={ok === false ? 'var(--stop)' : 'var(--volt)'} />}
      <Box sx={{ fontVariantNumeric: 'tabular-nums', color: ok === false ? 'var(--stop)' : 'inherit' }}>
        {interruptWords(device)}
      </Box>
    </Box>
  );
}

/** Arrows from where a source feeds it: two where it stays live with either side open. */
function Ends({ device: { fault } }: { readonly device: DeviceStudy }): ReactElement {
  if (fault === null) return <span />;
  const both = fault.fromBothSides;
  return (
    <Box sx={{ [NARROW]: { display: 'flex', gap: '0.5rem', alignItems: 'center' } }}>
      <svg width="56" height="16" viewBox="0 0 56 16" aria-hidden="true" focusable="false">
        <rect x="21" y="3" width="14" height="10" fill="none" stroke="var(--ink)" strokeWidth="1.5" />
        <path d="M1 8H19M13 3L19 8L13 13" fill="none" stroke="var(--copper)" strokeWidth="2" />
        {both && <path d="M55 8H37M43 3L37 8L43 13" fill="none" stroke="var(--copper)" strokeWidth="2" />}
      </svg>
      <Box sx={{ fontWeight: both ? 600 : 400 }}>{both ? 'fed from both ends' : 'fed from one end'}</Box>
    </Box>
  );
}

function Picture({ device }: { readonly device: DeviceStudy }): ReactElement {
  const words = pictureWords(device);
  const title = timeCurrentTitle(device);
  return (
    <Box sx={{ display: 'flex', flexWrap: 'wrap', gap: '0.25rem 1.5rem' }}>
      <Box sx={{ flex: '1 1 32rem', minWidth: 0, maxWidth: '44rem' }}>
        {device.fault === null && 'missing' in device.band ? (
          <p style={{ margin: 0, fontWeight: 600 }}>{title}</p>
        ) : (
          <TimeCurrent study={device} title={title} spoken={[title, ...words].join('. ')} />
        )}
      </Box>
      <Box sx={{ flex: '1 1 16rem', minWidth: 0, fontSize: '0.8125rem', lineHeight: 1.4, maxWidth: '44rem' }}>
        <Box component="p" sx={{ m: 0, color: 'var(--soft)' }}>
          {bandWords(device)}
        </Box>
        {words.length > 0 && (
          <Box component="ul" sx={{ m: '0.25rem 0', paddingInlineStart: '1.125rem' }}>
            {words.map((text) => (
              <li key={text}>{text}</li>
            ))}
          </Box>
        )}
        <Button onClick={() => show(device)} sx={LINK}>
          Show in the wiring<span className="only-read"> {device.id}</span>
        </Button>
      </Box>
    </Box>
  );
}

function show({ id, withstand }: DeviceStudy): void {
  const { light, select } = useOpenJob.getState();
  light(withstand === null ? [id] : [id, withstand.cable]);
  select({ parts: [id] });
  useSession.getState().goStage('wiring');
}
