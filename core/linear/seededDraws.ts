/** Numbers that look drawn by lot and are the same for the same seed on every machine. */

/** A source of numbers, uniform in [0, 1). */
export type Uniform = () => number;

const TWO_32 = 2 ** 32;

/**
 * xoshiro128** (Blackman and Vigna, "Scrambled linear pseudorandom number generators", ACM TOMS 47 (2021), 36), its state filled from
 * the seed by SplitMix steps as its authors advise. Two 32-bit words make one number of 53 bits. `seed`: a whole number.
 */
export function seededUniform(seed: number): Uniform {
  let counter = seed >>> 0;
  const fill = (): number => {
    counter = (counter + 0x9e3779b9) >>> 0;
    let mixed = Math.imul(counter ^ (counter >>> 16), 0x85ebca6b);
    mixed = Math.imul(mixed ^ (mixed >>> 13), 0xc2b2ae35);
    return (mixed ^ (mixed >>> 16)) >>> 0;
  };
  let [a, b, c, d] = [fill(), fill(), fill(), fill()];
  const word = (): number => {
    const product = Math.imul(b, 5);
    const result = Math.imul((product << 7) | (product >>> 25), 9) >>> 0;
    const shifted = b << 9;
    c ^= a;
    d ^= b;
    b ^= c;
    a ^= d;
    c ^= shifted;
    d = (d << 11) | (d >>> 21);
    return result;
  };
  return () => ((word() >>> 5) * 2 ** 26 + (word() >>> 6)) / (TWO_32 * 2 ** 21);
}
