/** A conductor size in the words of the other systems, to stand in grey beside its field. */
import type { Metal, Stranding } from '../job/part.ts';
import { type ConductorSize, sizeText } from '../units/conductorSize.ts';
import type { UnitsFirst } from '../units/fieldUnit.ts';
import { formatQuantity } from '../units/formatQuantity.ts';
import { equivalentIn } from './equivalent.ts';
import { makeOf } from './metal.ts';
import type { ResistanceContext } from './resistance.ts';
import { areaOf, sizesOf } from './size.ts';

export interface SizeEcho {
  /** `67.43 mm²`, or for a metric size the gauges that it lies between. */
  readonly short: string;
  /** The least size of the other system with no less metal, and with no more resistance: they often differ by one. */
  readonly detail: string;
}

export interface SizeEchoRequest {
  readonly size: ConductorSize;
  readonly metal: Metal | undefined;
  readonly stranding: Stranding | undefined;
}

/** What a size is in the other system: mm² for a gauge, AWG for mm². Nothing is exchanged by it. */
export function sizeEcho({ size, metal, stranding }: SizeEchoRequest, context: ResistanceContext): SizeEcho {
  const area = areaOf(size, context.tables);
  if ('missing' in area) return { short: '', detail: area.missing };
  const make = makeOf({ metal, stranding }, context.practice);
  const system = size.system === 'mm2' ? 'awg' : 'mm2';
  const other = equivalentIn({ size, system, make }, context);
  const squareMm = formatQuantity({ value: area.value, unit: 'mm2' });
  if ('missing' in other) return { short: size.system === 'mm2' ? '' : squareMm, detail: '' };
  const { nextSmaller, byArea, byResistance } = other;
  const between = betweenText(nextSmaller, byArea);
  const detail = [
    ...(byArea === undefined ? [] : [`${sizeText(byArea)} by metal`]),
    ...(byResistance === undefined ? [] : [`${sizeText(byResistance)} by resistance, ${make.stranding}`]),
  ];
  return { short: size.system === 'mm2' ? between : squareMm, detail: detail.join('; ') };
}

function betweenText(smaller: ConductorSize | undefined, larger: ConductorSize | undefined): string {
  if (smaller !== undefined && larger !== undefined) {
    const same = sizeText(smaller) === sizeText(larger);
    return same ? sizeText(larger) : `between ${sizeText(smaller)} and ${sizeText(larger)}`;
  }
  if (larger !== undefined) return `less than ${sizeText(larger)}`;
  return smaller === undefined ? '' : `more than ${sizeText(smaller)}`;
}

/** The sizes of the tables to pick from, smallest first; gauges and kcmil first for who thinks in them. */
export function usualSizes(first: UnitsFirst, context: ResistanceContext): readonly ConductorSize[] {
  const { tables } = context;
  const metric = sizesOf('mm2', tables);
  const american = [...sizesOf('awg', tables), ...sizesOf('kcmil', tables)];
  return first === 'us' ? [...american, ...metric] : [...metric, ...american];
}
