/** Whether the nearer of two devices in series opens alone. */
import type { BreakerPart, FusePart } from '../job/part.ts';
import type { Figure } from '../tables/practiceTable.ts';
import type { Basis } from '../tables/status.ts';
import type { Tables } from '../tables/tables.ts';
import { formatQuantity } from '../units/formatQuantity.ts';
import { numberText } from '../units/numberText.ts';
import type { DeviceBand } from './answer.ts';
import { clearingOf } from './clearing.ts';
import { bandName, deviceBandOf, ENTERED } from './deviceBand.ts';

export interface SelectivityRequest {
  /** Nearer the source. */
  readonly upstream: FusePart | BreakerPart;
  /** Nearer the fault. */
  readonly downstream: FusePart | BreakerPart;
  /** Highest current through both for a fault behind the nearer; null where it is not known. */
  readonly faultA: number | null;
}

export interface Selectivity {
  /** Null: ratios and bands do not settle it. */
  readonly selective: boolean | null;
  /** Of the ratings. */
  readonly ratio: number;
  /** Ratio from which it is taken to be so. */
  readonly needed: number;
  readonly by: 'ratio' | 'heat' | 'bands';
  readonly text: string;
  readonly basis: Basis;
}

/**
 * By melting heat where it is known: the farther device's least pre-arcing I²t above the nearer one's total I²t. Else by the makers' curves of
 * both up to the fault; else by the ratio of the ratings, 1.6 for two gG (one step of 1.587 accepted) and 2 for others. Generic bands of
 * unlike types that overlap at the fault leave it open. Sources SRC-IEC60269-RATIO, SRC-PRACTICE.
 */
export function selectivityOf(request: SelectivityRequest, tables: Pick<Tables, 'devices'>): Selectivity {
  const { upstream, downstream, faultA } = request;
  const ratio = upstream.ratingA / downstream.ratingA;
  const asked = neededRatio(upstream, downstream, tables);
  const enough = ratio >= asked.accepted.value;
  const bands = [deviceBandOf(upstream, tables), deviceBandOf(downstream, tables)] as const;
  const known = { ratio, needed: asked.needed.value, basis: (enough ? asked.accepted : asked.needed).basis };
  const ratios = `${ratioText(ratio)} to 1 where ${numberText({ value: asked.needed.value })} to 1 is asked`;
  if ('missing' in bands[0] || 'missing' in bands[1])
    return { ...known, selective: enough, by: 'ratio', text: `ratings ${ratios}` };
  const pair = { upper: bands[0], lower: bands[1] };
  const crossA = crossing(pair, faultA);
  const heat = byHeat(pair, crossA);
  if (heat !== null) return { ...known, ...heat, by: 'heat', basis: ENTERED };
  const both = bands[0].from === 'maker' && bands[1].from === 'maker';
  if (both && crossA !== null) {
    const at = formatQuantity({ value: crossA, unit: 'A' });
    const text = `the makers' curves overlap at ${at}; ratings ${ratios}`;
    return { ...known, selective: false, by: 'bands', basis: ENTERED, text };
  }
  const unlike = bandName(upstream.type ?? '') !== bandName(downstream.type ?? '');
  const open = enough && unlike && faultA !== null && overlapAt(pair, faultA) === true;
  const text = open ? `ratings ${ratios}, but the bands of the two types overlap at the fault` : `ratings ${ratios}`;
  return { ...known, selective: open ? null : enough, by: open ? 'bands' : 'ratio', text };
}

interface BandPair {
  readonly upper: DeviceBand;
  readonly lower: DeviceBand;
}

function neededRatio(
  upstream: FusePart | BreakerPart,
  downstream: FusePart | BreakerPart,
  { devices }: Pick<Tables, 'devices'>,
): { readonly needed: Figure; readonly accepted: Figure } {
  const { sameGg, sameGgStep, others } = devices.selectivity;
  const isGg = (device: FusePart | BreakerPart) => device.kind === 'fuse' && bandName(device.type ?? '') === 'gg';
  if (!isGg(upstream) || !isGg(downstream)) return { needed: others, accepted: others };
  const whole = upstream.ratingA / downstream.ratingA >= sameGg.value;
  return { needed: sameGg, accepted: whole ? sameGg : sameGgStep };
}

/** Null where one of the two heats is not known. */
function byHeat({ upper, lower }: BandPair, crossA: number | null): { selective: boolean; text: string } | null {
  if (upper.preArcI2t === null || lower.totalI2t === null) return null;
  const heats = `melts from ${heatText(upper.preArcI2t)}, the nearer lets through ${heatText(lower.totalI2t)}`;
  if (upper.preArcI2t <= lower.totalI2t) return { selective: false, text: `the farther ${heats}` };
  if (crossA === null || upper.from !== 'maker' || lower.from !== 'maker')
    return { selective: true, text: `the farther ${heats}` };
  const at = formatQuantity({ value: crossA, unit: 'A' });
  return { selective: false, text: `the farther ${heats}, but the makers' curves overlap at ${at}` };
}

/** Below this time curves are not compared: there the heat decides. */
const COMPARED_FROM_S = 0.1;

/** Least of the bands' own currents, up to the fault, at which the farther may open before the nearer surely has; null: none. */
function crossing(pair: BandPair, faultA: number | null): number | null {
  const most = faultA ?? Number.POSITIVE_INFINITY;
  const currents = [...pair.upper.points, ...pair.lower.points].map(({ currentA }) => currentA);
  if (faultA !== null) currents.push(faultA);
  currents.sort((a, b) => a - b);
  return currents.find((currentA) => currentA <= most && overlapAt(pair, currentA)) ?? null;
}

/** Whether the farther device may melt before the nearer has opened; null where the bands do not reach. */
function overlapAt({ upper, lower }: BandPair, currentA: number): boolean | null {
  const near = clearingOf({ band: lower, currentA });
  const { holdS } = clearingOf({ band: upper, currentA });
  if (holdS === null || near.beyond) return null;
  // At so little current the nearer need not open at all: whether the farther does is a question of overload, not of selectivity.
  if (near.clearS === null || near.clearS <= COMPARED_FROM_S) return false;
  return holdS <= near.clearS;
}

function heatText(value: number): string {
  return formatQuantity({ value, unit: 'A2s', digits: 3 });
}

function ratioText(value: number): string {
  return numberText({ value, digits: 4 });
}
