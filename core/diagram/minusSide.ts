/** Which junctions of a drawing lie on the minus side: their words stand below their lines. */
import type { CheckedJob } from '../job/job.ts';
import type { JunctionId, Part } from '../job/part.ts';

/**
 * Junctions that conductors, bars and devices in the line join to the minus of something, and to the plus of nothing before. In wiring
 * that joins a plus to a minus (strings in series) each junction takes the pole that reaches it first.
 */
export function minusSide(job: CheckedJob): ReadonlySet<JunctionId> {
  const near = neighbours(job.parts);
  const poleOf = new Map<JunctionId, 'plus' | 'minus'>();
  const queue: JunctionId[] = [];
  const start = (junction: JunctionId, pole: 'plus' | 'minus'): void => {
    if (poleOf.has(junction)) return;
    poleOf.set(junction, pole);
    queue.push(junction);
  };
  for (const part of job.parts) {
    for (const poles of polesOf(part)) {
      start(poles.plus, 'plus');
      start(poles.minus, 'minus');
    }
  }
  for (const junction of queue) {
    for (const far of near.get(junction) ?? []) start(far, poleOf.get(junction) ?? 'plus');
  }
  return new Set([...poleOf].filter(([, pole]) => pole === 'minus').map(([junction]) => junction));
}

interface Poles {
  readonly plus: JunctionId;
  readonly minus: JunctionId;
}
function polesOf(part: Part): readonly Poles[] {
  if ('plus' in part) return [part];
  return part.kind === 'pair' || part.kind === 'controller' || part.kind === 'converter' ? [part.from, part.to] : [];
}

function neighbours(parts: readonly Part[]): ReadonlyMap<JunctionId, readonly JunctionId[]> {
  const near = new Map<JunctionId, JunctionId[]>();
  const join = (a: JunctionId, b: JunctionId): void => {
    for (const [from, to] of [
      [a, b],
      [b, a],
    ] as const) {
      const list = near.get(from);
      if (list === undefined) near.set(from, [to]);
      else list.push(to);
    }
  };
  for (const part of parts) {
    if (part.kind === 'busbar') {
      for (const [index, junction] of part.junctions.entries()) {
        const next = part.junctions[index + 1];
        if (next !== undefined) join(junction, next);
      }
    } else if ('from' in part && typeof part.from === 'string' && typeof part.to === 'string') join(part.from, part.to);
  }
  return near;
}

/** The minus that belongs to a plus, by the first source, load or run that has both: where a run of two conductors would return. */
export function returnOf(job: CheckedJob, plus: JunctionId): JunctionId | undefined {
  const devices = job.parts.filter((part) => 'plus' in part);
  const runs = job.parts.filter((part) => !('plus' in part));
  return [...devices, ...runs].flatMap(polesOf).find((poles) => poles.plus === plus)?.minus;
}
