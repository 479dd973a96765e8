/** Straight lines between the points of a table: where on the line a place falls. */
import { Defect } from '../job/issue.ts';

/** Two neighbouring points and the fraction (0 to 1) of the way from the first to the second. */
export interface Place<P> {
  readonly from: P;
  readonly to: P;
  readonly fraction: number;
}

/**
 * The place of `x` among points that rise in `at`. Beyond either end the end point itself is taken: a table is never
 * extrapolated. Throws a `Defect` for an empty table.
 */
export function placeIn<P>(points: readonly P[], at: (point: P) => number, x: number): Place<P> {
  const first = points[0];
  const last = points.at(-1);
  if (first === undefined || last === undefined) throw new Defect('a table has at least one point');
  if (x <= at(first)) return { from: first, to: points[1] ?? first, fraction: 0 };
  if (x >= at(last)) return { from: points.at(-2) ?? last, to: last, fraction: 1 };
  let index = 1;
  while (at(points[index]!) < x) index += 1;
  const from = points[index - 1]!;
  const to = points[index]!;
  return { from, to, fraction: (x - at(from)) / (at(to) - at(from)) };
}

/** The figure at a place of the table. */
export function along<P>(place: Place<P>, figure: (point: P) => number): number {
  const start = figure(place.from);
  return start + (figure(place.to) - start) * place.fraction;
}
