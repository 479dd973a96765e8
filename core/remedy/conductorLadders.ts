/** Bonds of the next sizes, and conductors of another metal or make. */
import { areaOf, nextSizeUp } from '../conductor/size.ts';
import { together } from '../draft/edit.ts';
import { setField } from '../draft/fields.ts';
import type { ConductorSize, PartId } from '../job/part.ts';
import { nameOf } from '../job/part.ts';
import { sizeText } from '../units/conductorSize.ts';
import { formatQuantity } from '../units/formatQuantity.ts';
import { type Bench, type Candidate, type Ladder, stepped } from './candidate.ts';

/** Largest number of sizes that are tried above the one in place. */
const MOST_SIZES = 14;

/** A bond of the next sizes up, smallest first. */
export function largerBond(bench: Bench, id: PartId): readonly Ladder[] {
  const bond = bench.drawn(id);
  if (bond?.kind !== 'bond' || bond.size === undefined) return [];
  const rungs: Candidate[] = [];
  let size: ConductorSize | undefined = bond.size;
  for (let step = 0; step < MOST_SIZES; step++) {
    size = nextSizeUp(size, bench.tables.conductors);
    if (size === undefined) break;
    const area = areaOf(size, bench.tables.conductors);
    const text = sizeText(size);
    const label = `Bond ${nameOf(bond)}: ${text} instead of ${sizeText(bond.size)}`;
    rungs.push({
      edit: together(label, [setField({ part: bond.id, field: 'size', value: text })]),
      cost: bond.lengthM === undefined ? `a bond of ${text}` : `${metres(bond.lengthM)} of ${text}`,
      effort: 'cable',
      amount: (bond.lengthM ?? 1) * ('missing' in area ? 0 : area.value),
    });
  }
  return [{ rungs, rising: true }];
}

/** The run laid anew in stranded copper of the same size, tinned where it was tinned. */
export function strandedCopper(bench: Bench, id: PartId): readonly Ladder[] {
  const [, pairId] = /^(.*)\.(?:plus|minus)$/.exec(id) ?? [];
  const part = bench.drawn(id) ?? bench.drawn((pairId ?? id) as PartId);
  if ((part?.kind !== 'cable' && part?.kind !== 'pair') || part.size === undefined) return [];
  const metal = part.metal === 'tinned-copper' ? 'tinned-copper' : 'copper';
  const edits = [
    setField({ part: part.id, field: 'metal', value: metal }),
    setField({ part: part.id, field: 'stranding', value: 'stranded' }),
    ...(part.resistanceOhm === undefined
      ? []
      : [setField({ part: part.id, field: 'resistanceOhm', value: undefined })]),
  ];
  const laidM = part.lengthM * part.inParallel * (part.kind === 'pair' ? 2 : 1);
  const label = `${part.kind === 'pair' ? 'Run' : 'Cable'} ${nameOf(part)}: laid anew in stranded copper, ${sizeText(part.size)}`;
  return [
    stepped([
      {
        edit: together(label, edits),
        cost: `${metres(laidM)} of ${sizeText(part.size)}`,
        effort: 'cable',
        amount: laidM,
      },
    ]),
  ];
}

function metres(value: number): string {
  return formatQuantity({ value, unit: 'm', digits: 3 });
}
