/** The answer to a small job in a few lines, and folded under it all that nobody said. */
import Box from '@mui/material/Box';
import Typography from '@mui/material/Typography';
import type { ReactElement } from 'react';
import { formatQuantity, type Part, sizeText } from '../../core/api.ts';
import { Folded } from '../controls/Folded.tsx';
import { OriginMark } from '../controls/OriginMark.tsx';
import { SeverityMark } from '../controls/SeverityMark.tsx';
import { fieldWord } from '../controls/words.ts';
import type { SmallAnswer } from './answerOf.ts';

/** Findings told here; the rest stand in their stage. */
const MOST_FINDINGS = 3;

export function SmallAnswerView({ answer }: { readonly answer: SmallAnswer }): ReactElement {
  return (
    <Box aria-live="polite">
      <Typography variant="h3" component="p">
        {headline(answer)}
      </Typography>
      <Box component="dl" sx={{ display: 'grid', gridTemplateColumns: 'auto 1fr', columnGap: 2, rowGap: 0.25, my: 1 }}>
        {lines(answer).map(([name, value]) => (
          <Box key={name} sx={{ display: 'contents' }}>
            <Box component="dt" sx={{ color: 'var(--soft)' }}>
              {name}
            </Box>
            <Box component="dd" sx={{ m: 0, fontVariantNumeric: 'tabular-nums' }}>
              {value}
            </Box>
          </Box>
        ))}
      </Box>
      <Findings answer={answer} />
      <Folded title="What was taken for granted" aside={`${String(answer.taken.length)} figures`}>
        <Taken taken={answer.taken} />
      </Folded>
    </Box>
  );
}

function volts(value: number): string {
  return formatQuantity({ value, unit: 'V', digits: 4, prefix: false });
}

function headline({ walk, point, job }: SmallAnswer): string {
  if (point.outcome === 'collapse') return point.collapse?.message ?? 'The bank cannot deliver that.';
  if (walk === null) return 'Nothing feeds the load.';
  const load = job.parts.find(({ id }) => id === walk.load);
  const name = load?.kind === 'inverter' ? 'the inverter' : 'the load';
  return `Of ${volts(walk.emfV)} at rest, ${name} gets ${volts(walk.totals.loadV)}.`;
}

type Line = readonly [name: string, value: string];

function lines({ walk, point, job }: SmallAnswer): readonly Line[] {
  if (walk === null) return [];
  const { outV, backV, sagV } = walk.totals;
  const amps = (id: string): string => {
    const currentA = point.parts.get(id as Part['id'])?.currentA;
    return currentA === null || currentA === undefined
      ? '–'
      : formatQuantity({ value: currentA, unit: 'A', digits: 3 });
  };
  const lost = (value: number): string => formatQuantity({ value, unit: 'V', digits: 2 });
  return [
    ['Current of the load', amps(walk.load)],
    ['Lost in the bank itself', lost(sagV)],
    ['Lost in cables and joints', lost(outV + backV)],
    ...job.parts.flatMap((part) => sizeLine(part)),
  ];
}

function sizeLine(part: Part): readonly Line[] {
  if (part.kind === 'pair' && part.size !== undefined) return [[part.label ?? part.id, sizeText(part.size)]];
  if (part.kind === 'fuse') return [[part.label ?? part.id, formatQuantity({ value: part.ratingA, unit: 'A' })]];
  return [];
}

function Findings({ answer: { report } }: { readonly answer: SmallAnswer }): ReactElement | null {
  const told = report.findings.filter(({ severity }) => severity !== 'note').slice(0, MOST_FINDINGS);
  if (told.length === 0) return null;
  return (
    <Box component="ul" sx={{ listStyle: 'none', p: 0, my: 1 }}>
      {told.map(({ rule, parts, severity, message }) => (
        <Box component="li" key={`${rule} ${parts.join(' ')}`} sx={{ display: 'flex', gap: 1, py: 0.25 }}>
          <SeverityMark severity={severity} />
          <span>{message}</span>
        </Box>
      ))}
    </Box>
  );
}

function Taken({ taken }: { readonly taken: SmallAnswer['taken'] }): ReactElement {
  return (
    <Box component="ul" sx={{ listStyle: 'none', p: 0, m: 0, fontSize: '0.875rem' }}>
      {taken.map(({ part, figure }) => (
        <Box
          component="li"
          key={`${part} ${figure.field} ${figure.text ?? ''}`}
          sx={{
            display: 'flex',
            gap: 1,
            justifyContent: 'space-between',
            borderTop: '1px solid var(--hair)',
            py: 0.25,
          }}
        >
          <span>{figure.text ?? `${part}, ${fieldWord(figure.field).toLowerCase()}: ${valueText(figure)}`}</span>
          <OriginMark origin={figure.origin} />
        </Box>
      ))}
    </Box>
  );
}

function valueText({ value, unit }: SmallAnswer['taken'][number]['figure']): string {
  if (typeof value === 'number') return unit === '' ? String(value) : formatQuantity({ value, unit });
  if (typeof value === 'boolean') return value ? 'yes' : 'no';
  return value ?? '';
}
