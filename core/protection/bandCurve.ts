/** Times read off one edge of a band on log–log axes. */

/** A known time of one edge at one current, A and s; currents rise, times never do. */
export interface EdgePoint {
  readonly currentA: number;
  readonly timeS: number;
}

/**
 * Seconds for which a device surely holds, by the edge of shortest melting. Below the first point it holds at least as long as there;
 * beyond the last nothing is known, so 0. ln t runs straight over ln I between two points.
 */
export function heldS(edge: readonly EdgePoint[], currentA: number): number {
  const first = edge[0];
  const last = edge.at(-1);
  if (first === undefined || last === undefined || currentA > last.currentA) return 0;
  return currentA <= first.currentA ? first.timeS : between(edge, currentA);
}

/**
 * Seconds by which a device has surely opened, by the edge of longest clearing. Below the first point Infinity: it need not open;
 * beyond the last no longer than there, for more current never opens a device later.
 */
export function openedS(edge: readonly EdgePoint[], currentA: number): number {
  const first = edge[0];
  const last = edge.at(-1);
  if (first === undefined || last === undefined || currentA < first.currentA) return Number.POSITIVE_INFINITY;
  return currentA >= last.currentA ? last.timeS : between(edge, currentA);
}

function between(edge: readonly EdgePoint[], currentA: number): number {
  const index = edge.findIndex((point) => point.currentA >= currentA);
  const [before, after] = [edge[index - 1], edge[index]!];
  if (before === undefined || after.currentA === currentA) return after.timeS;
  if (after.timeS === 0 || before.timeS === 0) return after.timeS;
  const share = Math.log(currentA / before.currentA) / Math.log(after.currentA / before.currentA);
  return before.timeS * (after.timeS / before.timeS) ** share;
}
