/** What can be done about volts lost on the way to a load, or from a charger to a string. */

import { parallelString } from '../draft/connect.ts';
import { voltWalk } from '../explain/voltWalk.ts';
import type { WalkStep } from '../explain/walk.ts';
import type { OperatingCase } from '../job/job.ts';
import type { DiodePart, Part, PartId } from '../job/part.ts';
import { nameOf } from '../job/part.ts';
import type { OperatingPoint } from '../network/answer.ts';
import { formatQuantity } from '../units/formatQuantity.ts';
import { type Conductor, conductorOf, endsAnew, joinedAnew, moreInParallel, thicker } from './cableLadders.ts';
import { type Bench, type Ladder, relabelled, stepped } from './candidate.ts';

/** A piece of the way is worth changing from this part of all that the wiring loses on it. */
const WORTH_CHANGING = 0.1;
/** Share of a load that is walked to where the whole cannot be delivered. */
const LIGHTER = 0.1;

/** Thicker cables and better joints on the way, what loses most first; then another string beside the one that feeds. */
export function lessLostTo(bench: Bench, load: PartId, source?: PartId): readonly Ladder[] {
  const walk = walkTo(bench, load, source);
  if (walk === undefined) return [];
  const lossy = lossesOf(walk.steps);
  const all = lossy.flatMap(({ conductor }) => (conductor === undefined ? [] : [conductor]));
  const conductors = [...new Map(all.map((one) => [`${one.part} ${one.field}`, one])).values()];
  const single = conductors.slice(0, 2);
  return [
    ...lossy.flatMap(({ part }) => (part?.kind === 'joint' ? [joinedAnew(part)] : [])),
    ...lossy.flatMap(({ part }) => (part?.kind === 'diode' ? [keepsLess(bench, part)] : [])),
    ...conductors.map((conductor) => endsAnew(bench, conductor)),
    ...single.map((conductor) => thicker(bench, [conductor])),
    ...(conductors.length > 1 ? [thicker(bench, conductors)] : []),
    ...single.slice(0, 1).map((conductor) => moreInParallel(bench, conductor)),
    ...anotherString(bench, walk.source),
  ];

  function lossesOf(
    steps: readonly WalkStep[],
  ): readonly { part: Part | undefined; conductor: Conductor | undefined }[] {
    const pieces = steps.filter(({ kind, changeV }) => kind === 'part' && changeV < 0);
    const lostV = pieces.reduce((sum, { changeV }) => sum - changeV, 0);
    const worth = pieces.filter(({ changeV }) => -changeV >= WORTH_CHANGING * lostV);
    worth.sort((a, b) => a.changeV - b.changeV);
    return worth.map(({ part }) => ({ part: bench.drawn(part), conductor: conductorOf(bench, part) }));
  }
}

/** An isolator of transistors instead of a diode: what it keeps; common practice, no source. */
const TRANSISTOR_ISOLATOR_V = 0.1;

function keepsLess(bench: Bench, diode: DiodePart): Ladder {
  if (diode.forwardV !== undefined && diode.forwardV <= TRANSISTOR_ISOLATOR_V) return stepped([]);
  const text = formatQuantity({ value: TRANSISTOR_ISOLATOR_V, unit: 'V', prefix: false });
  const edit = bench.set(
    diode,
    'forwardV',
    TRANSISTOR_ISOLATOR_V,
    `Diode ${nameOf(diode)}: an isolator that keeps ${text}`,
  );
  return stepped([{ edit, cost: 'one isolator with transistors', effort: 'device', amount: 1 }]);
}

/** Another string like the one that feeds. */
export function anotherString(bench: Bench, source: PartId): readonly Ladder[] {
  const string = bench.drawn(source);
  if (string?.kind !== 'string') return [];
  const label = `Another string like ${nameOf(string)} beside it, with leads like its own`;
  const cost = `${string.blocksInSeries} more ${string.blocksInSeries === 1 ? 'block' : 'blocks'} of ${string.capacityAh} Ah, with leads and fuse`;
  return [
    stepped([
      { edit: relabelled(parallelString(string.id), label), cost, effort: 'string', amount: string.capacityAh },
    ]),
  ];
}

function walkTo(bench: Bench, load: PartId, source: PartId | undefined) {
  const { operatingCase, point } = pointWith(bench, load);
  const from = source === undefined ? {} : { source };
  const walk = voltWalk({ job: bench.job, operatingCase, point, load, ...from });
  return walk.ok ? walk : undefined;
}

/** The case's answer; where it has none, or the load has dropped out, the same with the load lighter, so that there is a way to see. */
function pointWith(
  bench: Bench,
  load: PartId,
): { readonly operatingCase: OperatingCase; readonly point: OperatingPoint } {
  const { operatingCase, point } = bench;
  const state = point.parts.get(load)?.state;
  if (point.outcome === 'solved' && state !== 'dropped-out') return { operatingCase, point };
  const part = bench.inCase(load);
  const lighter = part === undefined ? undefined : lighterLoad(part);
  if (lighter === undefined) return { operatingCase, point };
  const changed = new Map(operatingCase.changed).set(load, lighter);
  const { surge: _surge, ...steady } = operatingCase;
  const eased = { ...steady, surge: undefined, changed };
  return { operatingCase: eased, point: bench.solve(eased) };
}

function lighterLoad(part: Part): Part | undefined {
  if (part.kind === 'inverter') {
    return { ...part, cutoffV: undefined, acPowerW: LIGHTER * (part.acPowerW ?? part.ratedW), standbyW: undefined };
  }
  if (part.kind !== 'load') return undefined;
  const less = (figure: number | undefined) => (figure === undefined ? undefined : LIGHTER * figure);
  return { ...part, minimumV: undefined, powerW: less(part.powerW), currentA: less(part.currentA) };
}
