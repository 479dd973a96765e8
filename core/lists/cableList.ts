/** What to cut: every conductor once, an out-and-back run as its two. */
import { sizeEcho } from '../conductor/sizeEcho.ts';
import { type CablePart, cablesOfPair } from '../job/part.ts';
import { sizeText } from '../units/conductorSize.ts';
import { feetText } from '../units/imperial.ts';
import { given, type List, type ListInput, worstCurrent } from './list.ts';

const headings = [
  'Id',
  'Label',
  'From',
  'To',
  'Size',
  'In the other system',
  'Length (m)',
  'Length (ft, in)',
  'Conductors in parallel',
  'Carries at most (A)',
  'In case',
  'Ends together (mΩ)',
];

/** Length is that of one conductor, without allowance for waste. */
export function cableList({ job, tables, points }: ListInput): List {
  const cables = job.parts.flatMap((part): readonly CablePart[] => {
    if (part.kind === 'pair') return cablesOfPair(part);
    return part.kind === 'cable' ? [part] : [];
  });
  const context = { practice: job.practice, tables: tables.conductors };
  const rows = cables.map((cable): readonly string[] => {
    const { size, metal, stranding, lengthM } = cable;
    const worst = worstCurrent(points, cable.id);
    return [
      cable.id,
      cable.label ?? '',
      cable.from,
      cable.to,
      size === undefined ? '' : sizeText(size),
      size === undefined ? '' : sizeEcho({ size, metal, stranding }, context).short,
      given(lengthM),
      feetText({ lengthM }),
      String(cable.inParallel),
      worst.currentA,
      worst.case,
      cable.given.has('endOhm') ? given(cable.endOhm * 1000) : '',
    ];
  });
  return { headings, rows };
}
