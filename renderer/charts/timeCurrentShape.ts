/** Where things stand in a time–current picture: both axes in equal ratios. */
import type { DeviceBand, DeviceStudy } from '../../core/api.ts';
import type { Plot } from './lineFrame.tsx';

/** Times that are drawn, s: below a millisecond nothing is known of any band, above an hour nothing is asked. */
export const SHORTEST_S = 0.001;
export const LONGEST_S = 3600;
/** A cable's heat is taken to stay in it up to five seconds. */
export const ADIABATIC_UP_TO_S = 5;

export type Point = readonly [x: number, y: number];

export interface Axes {
  readonly plot: Plot;
  readonly fromA: number;
  readonly toA: number;
}

/** Whole decades round everything that is drawn. */
export function axesOf(study: DeviceStudy, plot: Plot): Axes {
  const { window, fault, ratingA, surges, band, upstream, downstream } = study;
  const bands = [band, upstream?.band, downstream?.band].flatMap((one) =>
    one === undefined || 'missing' in one ? [] : [one],
  );
  const currents = [
    ratingA,
    'missing' in window ? 0 : window.loadA,
    fault?.highestA ?? 0,
    fault?.lowestA ?? 0,
    ...surges.map(({ currentA }) => currentA),
    ...bands.flatMap(({ points }) => points.map(({ currentA }) => currentA)),
  ].filter((currentA) => currentA > 0);
  // A load of next to nothing would push all else to the edge.
  const least = Math.max(Math.min(...currents), ratingA / 30);
  const most = Math.max(...currents);
  return { plot, fromA: 10 ** Math.floor(Math.log10(least)), toA: 10 ** Math.ceil(Math.log10(most * 1.05)) };
}

export function xOf({ plot, fromA, toA }: Axes, currentA: number): number {
  return plot.left + (Math.log(currentA / fromA) / Math.log(toA / fromA)) * (plot.right - plot.left);
}

export function yOf({ plot }: Axes, seconds: number): number {
  const held = Math.min(LONGEST_S * 2, Math.max(SHORTEST_S / 2, seconds));
  return plot.bottom - (Math.log(held / SHORTEST_S) / Math.log(LONGEST_S / SHORTEST_S)) * (plot.bottom - plot.top);
}

/**
 * The area between surely holding and surely open, as a closed outline; it leaves the plot at its top, where the device need not
 * open at all. Beyond the last point it goes on by I²t where both are known. Null where the band has not got both edges.
 */
export function bandOutline(band: DeviceBand, axes: Axes): readonly Point[] | null {
  const melt = band.points.filter(({ meltS }) => meltS > 0).map(({ currentA, meltS }) => [currentA, meltS] as const);
  const clear = band.points
    .filter(({ clearS }) => Number.isFinite(clearS))
    .map(({ currentA, clearS }) => [currentA, clearS] as const);
  const [meltFirst, clearFirst] = [melt[0], clear[0]];
  if (meltFirst === undefined || clearFirst === undefined) return null;
  const top = axes.plot.top - 4;
  const at = ([currentA, seconds]: readonly [number, number]): Point => [xOf(axes, currentA), yOf(axes, seconds)];
  const { preArcI2t, totalI2t } = band;
  const goesOn = preArcI2t !== null && totalI2t !== null;
  const beyond = (i2t: number, last: readonly [number, number] | undefined): readonly Point[] =>
    goesOn && last !== undefined && axes.toA > last[0] ? [at([axes.toA, Math.min(last[1], i2t / axes.toA ** 2)])] : [];
  return [
    [xOf(axes, meltFirst[0]), top],
    ...melt.map(at),
    ...beyond(preArcI2t ?? 0, melt.at(-1)),
    ...beyond(totalI2t ?? 0, clear.at(-1)),
    ...clear.toReversed().map(at),
    [xOf(axes, clearFirst[0]), top],
  ];
}

/** Beyond its last point a device has opened no later than there: from there to the edge of the plot. */
export function noLater({ points, totalI2t }: DeviceBand, axes: Axes): readonly Point[] {
  const last = points.findLast(({ clearS }) => Number.isFinite(clearS));
  if (last === undefined || totalI2t !== null || last.currentA >= axes.toA) return [];
  const y = yOf(axes, last.clearS);
  return [
    [xOf(axes, last.currentA), y],
    [axes.plot.right, y],
  ];
}

/** The current from which an edge of a band lies at or below some seconds, for the place of its name; null where it never does. */
export function currentAt({ points }: DeviceBand, edge: 'meltS' | 'clearS', seconds: number): number | null {
  const index = points.findIndex(({ [edge]: time }) => time <= seconds);
  const [before, after] = [points[index - 1], points[index]];
  if (after === undefined) return null;
  const [earlier, later] = [before?.[edge] ?? Number.POSITIVE_INFINITY, after[edge]];
  if (before === undefined || !Number.isFinite(earlier) || later <= 0 || earlier <= later) return after.currentA;
  const share = Math.log(seconds / earlier) / Math.log(later / earlier);
  return before.currentA * (after.currentA / before.currentA) ** share;
}

/** The line of what a cable stands, I²t, from five seconds down to the foot of the plot. */
export function withstandLine(k2s2: number, axes: Axes): readonly Point[] {
  const at = (seconds: number): Point => [xOf(axes, Math.sqrt(k2s2 / seconds)), yOf(axes, seconds)];
  return [at(ADIABATIC_UP_TO_S), at(SHORTEST_S)];
}

/** 1, 10, 100 … within the axes. */
export function decades({ fromA, toA }: Axes): readonly number[] {
  const found: number[] = [];
  for (let currentA = fromA; currentA <= toA * 1.001; currentA *= 10) found.push(currentA);
  return found;
}
