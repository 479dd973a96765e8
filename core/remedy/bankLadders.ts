/** What can be done about strings as one bank: a block isolated, links made thicker. */
import { stringSource } from '../battery/stringSource.ts';
import { areaOf, nextSizeUp } from '../conductor/size.ts';
import { setField } from '../draft/fields.ts';
import type { JunctionId, Part, PartId, StringPart } from '../job/part.ts';
import { junctionsOf, nameOf } from '../job/part.ts';
import { ambientOf } from '../network/circuit.ts';
import { sizeText } from '../units/conductorSize.ts';
import { type Bench, type Candidate, type Ladder, relabelled, stepped } from './candidate.ts';

/** Longest way from a pole that is followed to a switch, in parts. */
const MOST_IN_LEAD = 6;
/** Largest number of sizes that are tried above the one in place. */
const MOST_SIZES = 14;

/**
 * The string with the lowest rest volts for its nominal ones cut off by its own fuse, breaker or switch. Asked of a finding that
 * says stop; strings that only differ in charge are for a charger and time, and the job has no field for those.
 */
export function isolated(bench: Bench, ids: readonly PartId[]): readonly Ladder[] {
  if (bench.finding.severity !== 'stop') return [];
  const strings = ids.flatMap((id) => {
    const part = bench.inCase(id);
    return part?.kind === 'string' ? [part] : [];
  });
  const [first, ...others] = strings;
  if (first === undefined) return [];
  const worst = others.reduce((low, one) => (fullness(bench, one) < fullness(bench, low) ? one : low), first);
  const device = (['plus', 'minus'] as const).flatMap((pole) => deviceOf(bench, worst, pole))[0];
  if (device === undefined) return [];
  const edit = relabelled(
    setField({ part: device.id, field: 'state', value: 'open' }),
    `${nameOf(worst)} isolated: ${nameOf(device)} opened`,
  );
  return [stepped([{ edit, cost: 'one device opened', effort: 'setting', amount: 1 }])];
}

function fullness({ job, operatingCase, tables }: Bench, string: StringPart): number {
  const ambientDegC = ambientOf(job, operatingCase);
  const { emfV } = stringSource(string, { model: 'slow', ambientDegC, tables: tables.chemistry });
  return emfV.value / (string.blocksInSeries * string.blockNominalV);
}

/** The first fuse, breaker or switch in line with a pole of a string; none where the way parts before. */
function deviceOf({ job }: Bench, string: StringPart, pole: 'plus' | 'minus'): readonly Part[] {
  let from: Part = string;
  let junction: JunctionId = string[pole];
  for (let step = 0; step < MOST_IN_LEAD; step++) {
    const next = job.parts.filter((part) => part.id !== from.id && junctionsOf(part).includes(junction));
    const [only] = next;
    if (only === undefined || next.length > 1 || !('from' in only) || typeof only.from !== 'string') return [];
    if (only.kind === 'fuse' || only.kind === 'breaker' || only.kind === 'switch') return [only];
    junction = only.from === junction ? (only.to as JunctionId) : only.from;
    from = only;
  }
  return [];
}

/** Links of the next sizes up. */
export function thickerLinks(bench: Bench, id: PartId): readonly Ladder[] {
  const { tables } = bench;
  const string = bench.inCase(id);
  if (string?.kind !== 'string' || string.linkSize === undefined) return [];
  const rungs: Candidate[] = [];
  const links = string.blocksInSeries - 1;
  for (let size = string.linkSize; rungs.length < MOST_SIZES; ) {
    const next = nextSizeUp(size, tables.conductors);
    if (next === undefined) break;
    size = next;
    const area = areaOf(size, tables.conductors);
    const edit = relabelled(
      setField({ part: string.id, field: 'linkSize', value: sizeText(size) }),
      `Links of ${nameOf(string)}: ${sizeText(size)} instead of ${sizeText(string.linkSize)}`,
    );
    const amount = 'missing' in area ? Number.POSITIVE_INFINITY : links * area.value;
    rungs.push({
      edit,
      cost: `${links} ${links === 1 ? 'link' : 'links'} of ${sizeText(size)}`,
      effort: 'cable',
      amount,
    });
  }
  return [{ rungs, rising: true }];
}
