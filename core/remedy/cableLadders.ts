/** Thicker cables, more of them side by side, joints made anew. */
import { areaOf, nextSizeUp } from '../conductor/size.ts';
import { type Edit, together } from '../draft/edit.ts';
import { setField } from '../draft/fields.ts';
import type { ConductorSize, JointPart, PartId } from '../job/part.ts';
import { nameOf } from '../job/part.ts';
import { sizeText } from '../units/conductorSize.ts';
import { formatQuantity } from '../units/formatQuantity.ts';
import { type Bench, type Candidate, type Ladder, relabelled, stepped } from './candidate.ts';

/** A conductor that can be bought thicker: a cable, or one or both conductors of an out-and-back run. */
export interface Conductor {
  readonly part: PartId;
  /** In words. */
  readonly name: string;
  readonly field: 'size' | 'minusSize';
  readonly size: ConductorSize;
  readonly inParallel: number;
  /** Of one conductor, all that the field is about together. */
  readonly metres: number;
  /** Its resistance was entered: a new cable has its own. */
  readonly isMeasured: boolean;
}

/** Largest number of sizes that are tried above the one in place. */
const MOST_SIZES = 14;
/** A termination well made; common practice, no source. */
const GOOD_JOINT_OHM = 0.0002;

/** The conductor that an id of a finding stands for; `undefined` for other parts and for a cable of no stated size. */
export function conductorOf({ job }: Pick<Bench, 'job'>, id: PartId): Conductor | undefined {
  const [, pairId = id, pole = ''] = /^(.*)\.(plus|minus)$/.exec(id) ?? [];
  for (const part of job.parts) {
    if (part.kind === 'cable' && part.id === id && part.size !== undefined) {
      const { size, inParallel, lengthM } = part;
      const isMeasured = part.resistanceOhm !== undefined;
      return { part: id, name: `Cable ${nameOf(part)}`, field: 'size', size, inParallel, metres: lengthM, isMeasured };
    }
    if (part.kind !== 'pair' || (part.id !== id && part.id !== pairId) || part.size === undefined) continue;
    const { inParallel, lengthM } = part;
    const isMeasured = part.resistanceOhm !== undefined;
    const backM = part.minusLengthM ?? lengthM;
    const base = { part: part.id, inParallel, isMeasured };
    if (part.minusSize === undefined) {
      return {
        ...base,
        name: `Run ${nameOf(part)}, both conductors`,
        field: 'size',
        size: part.size,
        metres: lengthM + backM,
      };
    }
    return pole === 'minus'
      ? { ...base, name: `Return of run ${nameOf(part)}`, field: 'minusSize', size: part.minusSize, metres: backM }
      : { ...base, name: `Plus of run ${nameOf(part)}`, field: 'size', size: part.size, metres: lengthM };
  }
  return undefined;
}

/** The next sizes up, smallest first. */
export function thicker(bench: Bench, conductors: readonly Conductor[]): Ladder {
  const rungs: Candidate[] = [];
  let sizes: readonly ConductorSize[] = conductors.map(({ size }) => size);
  for (let step = 0; step < MOST_SIZES; step++) {
    const next = sizes.map((size) => nextSizeUp(size, bench.tables.conductors) ?? size);
    if (next.every((size, k) => size === sizes[k])) break;
    sizes = next;
    rungs.push(resized(bench, conductors, sizes));
  }
  return { rungs, rising: true };
}

function resized(bench: Bench, conductors: readonly Conductor[], sizes: readonly ConductorSize[]): Candidate {
  const changes = conductors.map((conductor, k) => ({ ...conductor, to: sizes[k]! }));
  const label = changes.map(({ name, size, to }) => `${name}: ${sizeText(to)} instead of ${sizeText(size)}`).join('; ');
  const cost = changes.map(({ metres, inParallel, to }) => lengthOf(metres * inParallel, to)).join(' and ');
  const edits = changes.flatMap(({ part, field, to, isMeasured }) => [
    setField({ part, field, value: sizeText(to) }),
    ...(isMeasured ? [setField({ part, field: 'resistanceOhm', value: undefined })] : []),
  ]);
  const amount = changes.reduce((sum, { metres, inParallel, to }) => sum + metres * inParallel * areaMm2(bench, to), 0);
  return { edit: together(label, edits), cost, effort: 'cable', amount };
}

function areaMm2(bench: Bench, size: ConductorSize): number {
  const area = areaOf(size, bench.tables.conductors);
  return 'missing' in area ? Number.POSITIVE_INFINITY : area.value;
}

function lengthOf(metres: number, size: ConductorSize): string {
  return `${formatQuantity({ value: metres, unit: 'm', digits: 3 })} of ${sizeText(size)}`;
}

/** One or two more conductors of the same size beside those that are there. */
export function moreInParallel(bench: Bench, conductor: Conductor): Ladder {
  const { part, name, inParallel, size, metres, isMeasured } = conductor;
  // The number in parallel is one for the whole run, so a run of two sizes gets more of both.
  const isWhole = bench.drawn(part)?.kind === 'cable' || conductor.field === 'size';
  if (!isWhole) return stepped([]);
  const rungs = [1, 2].map((more): Candidate => {
    const count = inParallel + more;
    const edits = [
      setField({ part, field: 'inParallel', value: count }),
      ...(isMeasured ? [setField({ part, field: 'resistanceOhm', value: undefined })] : []),
    ];
    const label = `${name}: ${count} × ${sizeText(size)} side by side instead of ${inParallel}`;
    const amount = metres * more * areaMm2(bench, size);
    return { edit: together(label, edits), cost: lengthOf(metres * more, size), effort: 'cable', amount };
  });
  return { rungs, rising: true };
}

/** A joint taken apart, cleaned and made anew. */
export function joinedAnew(joint: JointPart): Ladder {
  if (joint.resistanceOhm <= GOOD_JOINT_OHM) return stepped([]);
  const label = `Joint ${nameOf(joint)}: made anew, ${ohms(GOOD_JOINT_OHM)} instead of ${ohms(joint.resistanceOhm)}`;
  const change = { part: joint.id, field: 'resistanceOhm', value: GOOD_JOINT_OHM, origin: 'guess' } as const;
  return stepped([anew(relabelled(setField(change), label))]);
}

/** The terminations of a conductor made anew. */
export function endsAnew({ job }: Bench, conductor: Conductor): Ladder {
  const part = job.parts.find(({ id }) => id === conductor.part);
  if ((part?.kind !== 'cable' && part?.kind !== 'pair') || part.endOhm <= 2 * GOOD_JOINT_OHM) return stepped([]);
  const label = `${conductor.name}: terminations made anew, ${ohms(2 * GOOD_JOINT_OHM)} instead of ${ohms(part.endOhm)}`;
  const change = { part: part.id, field: 'endOhm', value: 2 * GOOD_JOINT_OHM, origin: 'guess' } as const;
  return stepped([anew(relabelled(setField(change), label))]);
}

function anew(edit: Edit): Candidate {
  return { edit, cost: 'new terminations', effort: 'joint', amount: 1 };
}

function ohms(value: number): string {
  return formatQuantity({ value, unit: 'ohm', digits: 3 });
}
