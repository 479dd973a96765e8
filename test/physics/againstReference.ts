/** One random network through the engine and through the reference, and everything that must hold of the answer. */
import type { JunctionId } from '../../core/job/part.ts';
import { brokenLaws } from './answerLaws.ts';
import { badNumbers, powerBalance, worstRemainder } from './answerSums.ts';
import { type DenseAnswer, denseReference, NoSolution } from './denseReference.ts';
import type { JobValue } from './jobDraft.ts';
import { outsideLaws } from './outsideLaws.ts';
import { type RandomJobOptions, randomJob } from './randomJob.ts';
import { type Answered, answered, checked } from './solveValue.ts';

/** Junction volts, relative to the largest volts of their island. */
const VOLTS_TOLERANCE = 1e-9;
/**
 * Amps against the reference, relative to the largest current of the network. Wider than for volts: through a tenth of a
 * milliohm the last digit of 50 V is already 1e-10 A.
 */
const AMPS_TOLERANCE = 1e-8;
/** Junction remainder, A for each ampere that meets there (or in all, below 1 A). */
const REMAINDER_TOLERANCE = 1e-9;
/** Power left over, of the power that passes through. */
const POWER_TOLERANCE = 1e-9;
/** A part's own law, of the volts, amps or watts at stake. */
const LAW_TOLERANCE = 1e-9;

/** Random jobs through engine and reference: all that is wrong, and how many of them the reference could judge. */
export function heldAgainstReference(list: readonly RandomJobOptions[]): {
  readonly found: readonly string[];
  readonly compared: number;
} {
  let compared = 0;
  const found = list.flatMap((options) => {
    const value = randomJob(options);
    const about = complaintsAbout(value);
    if (about !== 'no reference') compared += 1;
    const texts = about === 'no reference' ? complaintsWithoutReference(value) : about;
    return texts.map((text) => `seed ${options.seed}, ${options.partCount} parts: ${text}`);
  });
  return { found, compared };
}

/** A job that draws more than a limited source gives has no solution: an answer that claims one must at least keep the laws. */
function complaintsWithoutReference(value: JobValue): readonly string[] {
  const answer = answered(value);
  return answer.point.outcome === 'solved' ? ownComplaints(answer) : badNumbers(answer.point);
}

/** All that is wrong with the answer about a job; a job that the reference cannot solve has nothing to be held against. */
export function complaintsAbout(value: JobValue): readonly string[] | 'no reference' {
  const { job, operatingCase } = checked(value);
  const reference = referenceFor({ job, operatingCase });
  if (reference === undefined) return 'no reference';
  let answer: Answered;
  try {
    answer = answered(value);
  } catch (error) {
    return [String(error)];
  }
  const { point } = answer;
  if (reference.volts.size === 0 && point.outcome === 'unsupplied') return badNumbers(point);
  if (point.outcome !== 'solved') return [`${point.outcome} (${point.collapse?.message ?? ''})`];
  return [
    ...voltComplaints(answer, reference),
    ...ampComplaints(answer, reference),
    ...stateComplaints(answer, reference),
    ...ownComplaints(answer),
  ];
}

/** The reference's answer, surely on the high-voltage branch; undefined where it finds none. */
function referenceFor({ job, operatingCase }: Pick<Answered, 'job' | 'operatingCase'>): DenseAnswer | undefined {
  try {
    const reference = denseReference({ job, operatingCase, laws: outsideLaws(job) });
    return reference.leastVoltsKept > 0.5 ? reference : undefined;
  } catch (error) {
    if (error instanceof NoSolution) return undefined;
    throw error;
  }
}

/** What an answer must keep by itself: both of Kirchhoff's rules, the balance of power, every part's law, no NaN. */
export function ownComplaints(answer: Answered): readonly string[] {
  const remainder = worstRemainder(answer);
  const power = powerBalance(answer);
  const wattsAllowed = POWER_TOLERANCE * power.throughputW;
  return [
    ...badNumbers(answer.point).map((bad) => `not a number: ${bad}`),
    ...(remainder.perAmp <= REMAINDER_TOLERANCE ? [] : [`remainder ${remainder.perAmp} A per A at ${remainder.at}`]),
    ...(Math.abs(power.mismatchW) <= wattsAllowed
      ? []
      : [`power: ${power.mismatchW} W of ${power.throughputW} W left over`]),
    ...(power.worstPartW <= wattsAllowed ? [] : [`power of ${power.worstPart} is ${power.worstPartW} W from its V I`]),
    ...brokenLaws(answer, LAW_TOLERANCE).map(({ part, law, by }) => `${part} breaks "${law}" by ${by}`),
  ];
}

function voltComplaints({ point }: Answered, reference: DenseAnswer): readonly string[] {
  const scale = new Map<JunctionId, number>();
  for (const [junction, volts] of reference.volts) {
    const group = reference.group(junction);
    scale.set(group, Math.max(scale.get(group) ?? 0, Math.abs(volts)));
  }
  const shift = shiftOfAdrift({ point, reference });
  let worst = { by: 0, text: '' };
  for (const [junction, volts] of reference.volts) {
    const group = reference.group(junction);
    const engine = point.junctions.get(junction);
    const gap = engine === null || engine === undefined ? Infinity : Math.abs(engine + (shift.get(group) ?? 0) - volts);
    const by = gap / Math.max(scale.get(group)!, 1);
    if (!(by <= worst.by)) worst = { by, text: `${junction} at ${engine} V, reference ${volts} V` };
  }
  return worst.by <= VOLTS_TOLERANCE ? [] : [`volts off by ${worst.by} of the largest: ${worst.text}`];
}

/** A group fed by a converter alone has no 0 V in the contract: its volts are compared against one of its own junctions. */
function shiftOfAdrift(at: {
  readonly point: Answered['point'];
  readonly reference: DenseAnswer;
}): ReadonlyMap<JunctionId, number> {
  const shift = new Map<JunctionId, number>();
  for (const [junction, volts] of at.reference.volts) {
    const group = at.reference.group(junction);
    const engine = at.point.junctions.get(junction);
    if (!at.reference.adrift.has(group) || shift.has(group) || engine === null || engine === undefined) continue;
    shift.set(group, volts - engine);
  }
  return shift;
}

function ampComplaints({ point }: Answered, reference: DenseAnswer): readonly string[] {
  const scaleA = Math.max(1, ...[...reference.amps.values()].map(Math.abs));
  const found: string[] = [];
  for (const [key, amps] of reference.amps) {
    const engine = engineAmps(point, key);
    if (engine === undefined) continue;
    if (reference.undetermined.has(key)) {
      if (engine !== null) found.push(`${key} answers ${engine} A, but zero-ohm parts lie side by side there`);
    } else if (engine === null) found.push(`${key} answers no current, but it is determined: ${amps} A`);
    else if (!(Math.abs(engine - amps) <= AMPS_TOLERANCE * scaleA))
      found.push(`${key} carries ${engine} A, reference ${amps} A`);
  }
  return found;
}

/** The engine's current for a branch of the reference; undefined where the answer has no such figure. */
function engineAmps(point: Answered['point'], key: string): number | null | undefined {
  const [id = '', branch] = key.split('#');
  const answer = point.parts.get(id as Parameters<typeof point.parts.get>[0]);
  if (answer === undefined) throw new Error(`no answer about ${id}`);
  if (branch === undefined) return answer.currentA;
  if (branch === 'in') return answer.inputA;
  if (branch === 'out') return answer.outputA;
  if (branch === 'low' || branch === 'return') return undefined;
  return answer.segmentsA?.[Number(branch)];
}

/** Which loads are fed and which have dropped out; a current left open says why. */
function stateComplaints({ point }: Answered, reference: DenseAnswer): readonly string[] {
  const found: string[] = [];
  for (const id of reference.fed) {
    const { state } = point.parts.get(id)!;
    const dropped = reference.dropped.has(id);
    if (state === 'unfed') found.push(`${id} is fed, but answers "unfed"`);
    if (dropped !== (state === 'dropped-out'))
      found.push(`${id} answers "${state}", reference: ${dropped ? 'dropped out' : 'on'}`);
  }
  for (const answer of point.parts.values()) {
    const open = answer.currentA === null || (answer.segmentsA ?? []).includes(null);
    if (open && (answer.undetermined ?? '') === '') found.push(`${answer.id} leaves a current open without a reason`);
  }
  return found;
}
