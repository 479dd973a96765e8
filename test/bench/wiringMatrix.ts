/** Nodal conductance matrices that look like wiring: a random tree, a few loops, sources at a few junctions, small loads everywhere. */

import type { Pattern } from '../../core/linear/matrix.ts';
import { patternFromEntries } from '../../core/linear/patternFromEntries.ts';

/** A seeded generator of numbers in 0 to 1 (mulberry32). */
function seeded(seed: number): () => number {
  let s = seed >>> 0;
  return () => {
    s = (s + 0x6d2b79f5) >>> 0;
    let t = Math.imul(s ^ (s >>> 15), 1 | s);
    t = (t + Math.imul(t ^ (t >>> 7), 61 | t)) ^ t;
    return ((t ^ (t >>> 14)) >>> 0) / 4294967296;
  };
}

/**
 * `scattered`: parents and loops join any two junctions, so that loops cross the whole network: the hard case.
 * `laid`: a junction hangs on one of the 8 before it, and a loop closes between junctions at most 50 apart, as cables run.
 */
export type Shape = 'scattered' | 'laid';

/** One pattern, several sets of values and right-hand sides on it. */
export interface WiringMatrix {
  readonly size: number;
  readonly shape: Shape;
  readonly pattern: Pattern;
  readonly values: readonly Float64Array[];
  readonly rightHandSides: readonly Float64Array[];
}

export interface WiringRequest {
  readonly size: number;
  readonly shape: Shape;
  readonly sets: number;
  readonly seed: number;
}

/** Builds one. Every junction carries a load of about a milli-siemens; three carry a source of some hundred siemens; cables are 1 to 1000 S. */
export function wiringMatrix({ size, shape, sets, seed }: WiringRequest): WiringMatrix {
  const random = seeded(seed);
  const any = (limit: number): number => Math.floor(random() * limit);
  const from: number[] = [];
  const to: number[] = [];
  for (let i = 1; i < size; i++) {
    from.push(i);
    to.push(shape === 'scattered' ? any(i) : i - 1 - any(Math.min(i, 8)));
  }
  for (let k = 0; k < Math.floor(size / 20); k++) {
    const i = any(size);
    const j = shape === 'scattered' ? any(size) : (i + 1 + any(Math.min(size - 1, 50))) % size;
    if (i === j) continue;
    from.push(i);
    to.push(j);
  }
  const sources = [0, Math.floor(size / 3), Math.floor((2 * size) / 3)];
  const rows = [...from, ...from, ...to];
  const columns = [...to, ...from, ...to];
  const { pattern, slots } = patternFromEntries(size, rows, columns, { symmetric: true });
  const diagonal = (i: number): number => pattern.columnStarts[i + 1]! - 1;
  const values: Float64Array[] = [];
  const rightHandSides: Float64Array[] = [];
  for (let s = 0; s < sets; s++) {
    const v = new Float64Array(pattern.rowIndices.length);
    for (let k = 0; k < from.length; k++) {
      const g = 10 ** (3 * random());
      v[slots[k]!]! -= g;
      v[slots[from.length + k]!]! += g;
      v[slots[2 * from.length + k]!]! += g;
    }
    const b = new Float64Array(size);
    for (let i = 0; i < size; i++) {
      v[diagonal(i)]! += 1e-3 * (1 + random());
      b[i] = -0.1 * random();
    }
    for (const i of sources) {
      v[diagonal(i)]! += 300;
      b[i]! += 300 * 12.8;
    }
    values.push(v);
    rightHandSides.push(b);
  }
  return { size, shape, pattern, values, rightHandSides };
}

/** The same matrix with both triangles: columns and, for each entry, the place of its value in the upper triangle. */
export function bothTriangles(pattern: Pattern): { starts: Int32Array; rows: Int32Array; source: Int32Array } {
  const { size, columnStarts, rowIndices } = pattern;
  const list: [number, number, number][] = [];
  for (let j = 0; j < size; j++) {
    for (let e = columnStarts[j]!; e < columnStarts[j + 1]!; e++) {
      const i = rowIndices[e]!;
      list.push([j, i, e]);
      if (i !== j) list.push([i, j, e]);
    }
  }
  list.sort((a, b) => a[0] - b[0] || a[1] - b[1]);
  const starts = new Int32Array(size + 1);
  for (const [j] of list) starts[j + 1]!++;
  for (let j = 0; j < size; j++) starts[j + 1]! += starts[j]!;
  return { starts, rows: Int32Array.from(list, (t) => t[1]), source: Int32Array.from(list, (t) => t[2]) };
}

/** As `WiringMatrix`, but unsymmetric. */
export interface GeneralMatrix {
  readonly pattern: Pattern;
  readonly values: readonly Float64Array[];
  readonly rightHandSides: readonly Float64Array[];
}

/**
 * Wiring with converters, one for each 20 junctions: each draws at one junction a current that depends on the voltage at another, so the
 * matrix has an entry without its mirror image.
 */
export function generalMatrix(request: WiringRequest): GeneralMatrix {
  const { pattern: upper, values, rightHandSides } = wiringMatrix(request);
  const { starts, rows, source } = bothTriangles(upper);
  const random = seeded(request.seed + 1);
  const { size } = request;
  const columns = Int32Array.from(rows);
  for (let j = 0; j < size; j++) columns.fill(j, starts[j], starts[j + 1]);
  const inputs = Array.from({ length: Math.floor(size / 20) }, () => Math.floor(random() * size));
  const outputs = inputs.map((i) => (i + 1 + Math.floor(random() * 8)) % size);
  const { pattern, slots } = patternFromEntries(size, [...rows, ...inputs], [...columns, ...outputs], {
    symmetric: false,
  });
  const general = values.map((v) => {
    const w = new Float64Array(pattern.rowIndices.length);
    for (let k = 0; k < source.length; k++) w[slots[k]!] = v[source[k]!]!;
    for (let k = source.length; k < slots.length; k++) w[slots[k]!] = w[slots[k]!]! + 0.1 * random();
    return w;
  });
  return { pattern, values: general, rightHandSides };
}
