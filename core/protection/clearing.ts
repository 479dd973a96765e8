/** Whether a device opens a current, and when. */
import { formatQuantity } from '../units/formatQuantity.ts';
import type { Clearing, DeviceBand } from './answer.ts';
import { type EdgePoint, heldS, openedS } from './bandCurve.ts';

/** Below this a curve is not read any more and the heat of the melting, I²t, decides. */
const SHORTEST_CURVE_S = 0.01;

/**
 * What a band says of a current: log–log between its points; below 10 ms, and beyond its last point, by I²t where that is known. Beyond
 * the last point without I²t the device is taken to open no later than there (`beyond`), and is not known to hold at all. More
 * current never clears later and never holds longer.
 */
export function clearingOf({ band, currentA }: { readonly band: DeviceBand; readonly currentA: number }): Clearing {
  const { device } = band;
  const opens = edgeOf(band, 'clearS');
  const last = opens.at(-1);
  const opened = openedFor(band, opens, currentA);
  const clearS = Number.isFinite(opened.timeS) ? opened.timeS : null;
  const holdS = heldFor(band, currentA);
  const clears = last === undefined && clearS === null ? null : clearS !== null;
  const beyond = last !== undefined && currentA > last.currentA && !opened.byI2t;
  const letThroughI2t =
    clearS === null ? null : letThrough(band, { currentA, clearS, beyond, byI2t: opened.byI2t, last });
  const answer = { device, currentA, clearS, holdS, clears, letThroughI2t, beyond };
  return { ...answer, text: textOf(band, answer) };
}

/** Points of one edge that say something: a finite opening, or a holding above nought. */
function edgeOf(band: DeviceBand, of: 'meltS' | 'clearS'): readonly EdgePoint[] {
  return band.points.flatMap(({ currentA, [of]: timeS }) =>
    timeS > 0 && (of === 'meltS' || Number.isFinite(timeS)) ? [{ currentA, timeS }] : [],
  );
}

function openedFor({ totalI2t }: DeviceBand, opens: readonly EdgePoint[], currentA: number) {
  const timeS = openedS(opens, currentA);
  if (totalI2t === null) return { timeS, byI2t: false };
  const last = opens.at(-1);
  const heatS = totalI2t / currentA ** 2;
  if (timeS < SHORTEST_CURVE_S) return { timeS: Math.min(SHORTEST_CURVE_S, heatS), byI2t: true };
  const within = last !== undefined && currentA <= last.currentA;
  if (within || heatS > SHORTEST_CURVE_S) return { timeS, byI2t: false };
  return { timeS: heatS, byI2t: true };
}

/** Null where the band says nothing. */
function heldFor(band: DeviceBand, currentA: number): number | null {
  const holds = edgeOf(band, 'meltS');
  const last = holds.at(-1);
  const { preArcI2t } = band;
  const beyond = last === undefined || currentA > last.currentA;
  const timeS = heldS(holds, currentA);
  if (preArcI2t === null) return beyond ? null : timeS;
  const heatS = preArcI2t / currentA ** 2;
  if (beyond) return Math.min(heatS, last?.timeS ?? SHORTEST_CURVE_S);
  return timeS < SHORTEST_CURVE_S ? Math.min(SHORTEST_CURVE_S, Math.max(heatS, timeS)) : timeS;
}

interface Opening {
  readonly currentA: number;
  readonly clearS: number;
  readonly beyond: boolean;
  readonly byI2t: boolean;
  readonly last: EdgePoint | undefined;
}

/**
 * A²s until the current is off. Beyond the last point a fuse lets through no more than there: what melts it takes the same heat,
 * however fast (common practice, no source). A breaker does not melt: there it is the square of the current times the longest time.
 */
function letThrough({ kind, totalI2t }: DeviceBand, { currentA, clearS, beyond, byI2t, last }: Opening): number {
  if (byI2t && totalI2t !== null) return totalI2t;
  if (beyond && kind === 'fuse' && last !== undefined) return last.currentA ** 2 * last.timeS;
  return currentA ** 2 * clearS;
}

function textOf(band: DeviceBand, answer: Omit<Clearing, 'text'>): string {
  return `${sentence(answer, edgeOf(band, 'clearS')[0])} (${provenance(band)})`;
}

function sentence({ currentA, clearS, clears, holdS, beyond }: Omit<Clearing, 'text'>, least?: EdgePoint): string {
  const at = formatQuantity({ value: currentA, unit: 'A' });
  const holding = holdS !== null && holdS > 0 && Number.isFinite(holdS) ? `, holds at least ${timeText(holdS)}` : '';
  if (clears === null) return `at ${at} nothing is known of its opening${holding}`;
  if (clearS === null) {
    const surely =
      least === undefined ? '' : `; it surely does from ${formatQuantity({ value: least.currentA, unit: 'A' })}`;
    return `at ${at} it need not open${holding}${surely}`;
  }
  const end = beyond ? ', its time at the last point of the band: the current lies beyond it' : '';
  return `at ${at} it has opened by ${timeText(clearS)}${end}${holding}`;
}

/** Where a band comes from, as it is printed beside every figure read off it. */
export function provenance({ from, type, basis }: Pick<DeviceBand, 'from' | 'type' | 'basis'>): string {
  if (from === 'maker') return "maker's points entered in the job";
  const memory = basis.status === 'from-memory' ? ', from memory' : '';
  return `generic band of ${type}${memory}: get the maker's curve`;
}

const MINUTE_S = 60;
const HOUR_S = 3600;

/** Minutes and hours for what takes long. */
export function timeText(value: number): string {
  if (value >= 2 * HOUR_S) return formatQuantity({ value: value / HOUR_S, unit: 'h', digits: 3 });
  if (value >= 2 * MINUTE_S) return formatQuantity({ value: value / MINUTE_S, unit: 'min', digits: 3 });
  return formatQuantity({ value, unit: 's', digits: 3 });
}
