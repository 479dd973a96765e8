/** Times a step by the median over batches of about a millisecond: short enough to dodge other programs, long enough for the clock. */

/** Runs this long before the clock starts, so that the compiler has done its work. */
const WARM_S = 0.1;

/** Microseconds a call, over about `seconds`. `step(i)` is called with i = 0, 1, 2 … */
export function microseconds(step: (i: number) => void, seconds: number): number {
  let i = 0;
  const warm = performance.now() + 1000 * Math.max(WARM_S, seconds);
  do step(i++);
  while (performance.now() < warm);
  const start = performance.now();
  step(i++);
  const once = performance.now() - start;
  const repeat = once > 1 ? 1 : Math.ceil(1 / (once + 1e-4));
  const batches: number[] = [];
  const end = performance.now() + 1000 * seconds;
  while (performance.now() < end || batches.length < 3) {
    const t = performance.now();
    for (let k = 0; k < repeat; k++) step(i++);
    batches.push((1000 * (performance.now() - t)) / repeat);
  }
  return median(batches);
}

export function median(numbers: readonly number[]): number {
  const sorted = Float64Array.from(numbers);
  sorted.sort();
  const middle = sorted.length >> 1;
  return sorted.length % 2 === 1 ? sorted[middle]! : (sorted[middle - 1]! + sorted[middle]!) / 2;
}
