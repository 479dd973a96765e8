/** Order statistics of what was drawn. */
import type { Percentiles } from '../answer.ts';

/** 5th, 50th and 95th percentile, by linear interpolation between order statistics (the definition that most statistics packages take by default). */
export function percentiles(values: Float64Array, otherwise: number): Percentiles {
  const sorted = values.slice();
  sorted.sort();
  const at = (fraction: number): number => {
    if (sorted.length === 0) return otherwise;
    const place = fraction * (sorted.length - 1);
    const below = Math.floor(place);
    const next = sorted[Math.min(below + 1, sorted.length - 1)]!;
    return sorted[below]! + (place - below) * (next - sorted[below]!);
  };
  return { p05: at(0.05), p50: at(0.5), p95: at(0.95) };
}
