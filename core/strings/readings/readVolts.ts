/** Volts along a chain from whatever pairs of its points were read. */
import type { Reading } from '../../job/job.ts';
import type { Chain } from './chain.ts';

export type VoltReading = Extract<Reading, { quantity: 'voltage' }>;

/** Points of a chain whose volts against each other are known, and the readings that were not needed for it. */
export interface ReadVolts {
  /** Group of each point; points of different groups are not tied to each other by any reading. */
  readonly group: readonly number[];
  /** Volts of each point against the lowest point of its group. */
  readonly volts: readonly number[];
  /** A reading over, and by how much it exceeds what the others add up to. */
  readonly spare: readonly { readonly reading: VoltReading; readonly valueV: number; readonly excessV: number }[];
}

interface Span {
  readonly reading: VoltReading;
  readonly low: number;
  readonly high: number;
  readonly valueV: number;
  readonly exact: boolean;
}

/** Readings at the terminals themselves come before those with wiring in between, short spans before long ones. */
export function readVolts(chain: Chain, readings: readonly VoltReading[]): ReadVolts {
  const spans = readings.flatMap((reading) => spanOf(chain, reading));
  spans.sort((a, b) => Number(b.exact) - Number(a.exact) || a.high - a.low - (b.high - b.low));
  const points = chain.stretches.length + 1;
  const group = Array.from({ length: points }, (_, point) => point);
  const volts = Array.from({ length: points }, () => 0);
  const spare: ReadVolts['spare'][number][] = [];
  for (const { reading, low, high, valueV } of spans) {
    const [below, over] = [group[low]!, group[high]!];
    const excessV = valueV - (volts[high]! - volts[low]!);
    if (below === over) {
      spare.push({ reading, valueV, excessV });
      continue;
    }
    for (let point = 0; point < points; point++) {
      if (group[point] !== over) continue;
      group[point] = below;
      volts[point]! += excessV;
    }
  }
  return { group, volts, spare };
}

function spanOf(chain: Chain, reading: VoltReading): readonly Span[] {
  const [minus, plus] = [chain.pointOf(reading.minus), chain.pointOf(reading.plus)];
  if (minus === undefined || plus === undefined || minus === plus) return [];
  const exact = chain.isExact(reading.minus) && chain.isExact(reading.plus);
  return minus < plus
    ? [{ reading, low: minus, high: plus, valueV: reading.valueV, exact }]
    : [{ reading, low: plus, high: minus, valueV: -reading.valueV, exact }];
}
