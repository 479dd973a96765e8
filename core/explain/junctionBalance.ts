/** Kirchhoff's current rule at one junction, part by part. */

import type { CheckedJob, OperatingCase } from '../job/job.ts';
import { partsInCase } from '../job/job.ts';
import type { JunctionId, PartId } from '../job/part.ts';
import type { OperatingPoint, PartAnswer } from '../network/answer.ts';
import { isOpen, type SinglePart, withoutPairs } from '../network/wiring.ts';
import { lowerHalfA } from './walkPorts.ts';

/** One part's current at a junction. */
export interface JunctionCurrent {
  readonly part: PartId;
  /** Busbar: which segment, counted from 0 along the bar. */
  readonly segment?: number;
  /** Of the group where it enters or leaves. */
  readonly junction: JunctionId;
  /** Positive into the junction. */
  readonly currentA: number;
}

export interface JunctionBalance {
  readonly junction: JunctionId;
  readonly voltageV: number | null;
  /** The junctions that the sum is taken over: one, or several that zero-ohm parts side by side make one of. */
  readonly group: readonly JunctionId[];
  readonly currents: readonly JunctionCurrent[];
  /** Sum of all currents: the remainder of Kirchhoff's current rule. */
  readonly sumA: number;
  /** Parts inside the group whose current the network does not determine. */
  readonly undetermined: readonly PartId[];
}

export interface JunctionRequest {
  readonly job: CheckedJob;
  readonly operatingCase: OperatingCase;
  readonly point: OperatingPoint;
  readonly junction: JunctionId;
}

/** A current into a junction; null where the network does not determine it. */
interface End {
  readonly part: PartId;
  readonly segment?: number;
  readonly junction: JunctionId;
  readonly currentA: number | null;
}

/** Ends that belong together: what leaves by one arrives by another, so an open current inside cancels over them all. */
type Ends = readonly End[];

/**
 * Every current in and out of a junction, positive in. Where parts without resistance lie side by side, how they share a current
 * is not determined: the junctions that they join then count as one, and their own currents are left out of the sum.
 */
export function junctionBalance({ job, operatingCase, point, junction }: JunctionRequest): JunctionBalance {
  const parts = withoutPairs(partsInCase(job, operatingCase));
  const ends = parts.flatMap((part) => endsOf(part, point));
  const { group, inside } = groupOf(junction, ends);
  const currents = ends
    .flat()
    .flatMap(({ currentA, ...end }): readonly JunctionCurrent[] =>
      currentA === null || !group.has(end.junction) ? [] : [{ ...end, currentA: currentA === 0 ? 0 : currentA }],
    );
  return {
    junction,
    voltageV: point.junctions.get(junction) ?? null,
    group: [...group],
    currents,
    sumA: currents.reduce((sum, { currentA }) => sum + currentA, 0),
    undetermined: [...inside],
  };
}

/** The junctions that open currents tie to this one, and the parts that do. */
function groupOf(
  junction: JunctionId,
  ends: readonly Ends[],
): { readonly group: ReadonlySet<JunctionId>; readonly inside: ReadonlySet<PartId> } {
  const open = ends.map((tied) => tied.filter(({ currentA }) => currentA === null)).filter((tied) => tied.length > 0);
  const group = new Set([junction]);
  const inside = new Set<PartId>();
  // A set may grow while it is walked.
  for (const at of group) {
    for (const tied of open) {
      if (!tied.some((end) => end.junction === at)) continue;
      for (const end of tied) {
        group.add(end.junction);
        inside.add(end.part);
      }
    }
  }
  return { group, inside };
}

function endsOf(part: SinglePart, point: OperatingPoint): readonly Ends[] {
  const answer = point.parts.get(part.id);
  if (answer === undefined) return [];
  const { id } = part;
  /** A current that leaves `from` and arrives at `to`. */
  const through = (from: JunctionId, to: JunctionId, currentA: number | null, segment?: number): Ends => {
    const where = segment === undefined ? {} : { segment };
    return [
      { part: id, ...where, junction: from, currentA: negative(currentA) },
      { part: id, ...where, junction: to, currentA },
    ];
  };
  switch (part.kind) {
    case 'string':
      if (part.midpoint === undefined) return [through(part.minus, part.plus, answer.currentA)];
      return [
        through(part.midpoint, part.plus, answer.currentA),
        through(part.minus, part.midpoint, lowerHalfA(part, point)),
      ];
    case 'array':
    case 'charger':
      return [through(part.minus, part.plus, answer.currentA)];
    case 'load':
    case 'inverter':
      return [through(part.plus, part.minus, answer.currentA)];
    case 'controller':
    case 'converter':
      return portEnds(part, answer, through);
    case 'busbar':
      return part.junctions.slice(1).map((to, k) => through(part.junctions[k]!, to, answer.segmentsA?.[k] ?? null, k));
    default:
      return isOpen(part) ? [through(part.from, part.to, 0)] : [through(part.from, part.to, answer.currentA)];
  }
}

function portEnds(
  part: Extract<SinglePart, { kind: 'controller' | 'converter' }>,
  { inputA = null, outputA = null }: PartAnswer,
  through: (from: JunctionId, to: JunctionId, currentA: number | null) => Ends,
): readonly Ends[] {
  const ends = [through(part.from.plus, part.from.minus, inputA), through(part.to.minus, part.to.plus, outputA)];
  // A switching controller joins its two minus terminals inside; what passes there is no answer of its own.
  const joinsMinus = part.kind === 'controller' && part.type === 'pwm' && part.from.minus !== part.to.minus;
  return joinsMinus ? [...ends, through(part.to.minus, part.from.minus, null)] : ends;
}

function negative(currentA: number | null): number | null {
  return currentA === null || currentA === 0 ? currentA : -currentA;
}
