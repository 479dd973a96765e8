/**
 * Elimination and substitution over a symmetric plan, in plain JavaScript. The letters: d diagonal, r = 1/d, u an entry of the pivot's row
 * before the division, l = u r the multiplier, y the right-hand side.
 */
import type { SymmetricPlan } from './symmetricPlan.ts';

/** Factors w = A in place into L and 1/D and carries the right-hand side along. */
export function eliminate(plan: SymmetricPlan, w: Float64Array): void {
  const { size } = plan.pattern;
  const { table, leafCount, linkCount, columnCount, fullSize, fullNodes, fullPlace } = plan;
  const y = size + 1;
  const chainPlace = 2 * (size + 1);
  eliminateLeaves(table, w, leafCount, y, chainPlace);
  eliminateLinks(table, w, 2 * leafCount, linkCount, y, chainPlace + leafCount);
  eliminateColumns(table, w, 2 * leafCount + 4 * linkCount, columnCount, y, chainPlace + leafCount + 2 * linkCount);
  eliminateFull(table, w, fullNodes, fullSize, y, fullPlace);
}

function eliminateLeaves(table: Int32Array, w: Float64Array, count: number, y: number, place: number): void {
  for (let k = 0; k < count; k++) {
    const v = table[2 * k]!;
    const p = table[2 * k + 1]!;
    const r = 1 / w[v]!;
    const u = w[place + k]!;
    const l = u * r;
    w[v] = r;
    w[place + k] = l;
    w[p] = w[p]! - l * u;
    w[y + p] = w[y + p]! - l * w[y + v]!;
  }
}

function eliminateLinks(
  table: Int32Array,
  w: Float64Array,
  program: number,
  count: number,
  y: number,
  place: number,
): void {
  let t = program;
  let q = place;
  for (let k = 0; k < count; k++) {
    const v = table[t]!;
    const a = table[t + 1]!;
    const b = table[t + 2]!;
    const c = table[t + 3]!;
    const r = 1 / w[v]!;
    const yv = w[y + v]!;
    const ua = w[q]!;
    const ub = w[q + 1]!;
    const la = ua * r;
    const lb = ub * r;
    w[v] = r;
    w[a] = w[a]! - la * ua;
    w[b] = w[b]! - lb * ub;
    w[c] = w[c]! - la * ub;
    w[y + a] = w[y + a]! - la * yv;
    w[y + b] = w[y + b]! - lb * yv;
    w[q] = la;
    w[q + 1] = lb;
    t += 4;
    q += 2;
  }
}

function eliminateColumns(
  table: Int32Array,
  w: Float64Array,
  program: number,
  count: number,
  y: number,
  place: number,
): void {
  let t = program;
  let q = place;
  for (let k = 0; k < count; k++) {
    const v = table[t]!;
    const d = table[t + 1]!;
    const r = 1 / w[v]!;
    const yv = w[y + v]!;
    w[v] = r;
    let row = t + 2;
    t += 2 + d;
    const end = q + d;
    for (; q < end; q++) {
      const u = w[q]!;
      const l = u * r;
      const i = table[row++]!;
      w[i] = w[i]! - l * u;
      w[y + i] = w[y + i]! - l * yv;
      for (let s = q + 1; s < end; s++) {
        const c = table[t++]!;
        w[c] = w[c]! - l * w[s]!;
      }
      w[q] = l;
    }
    t++;
  }
}

function eliminateFull(
  table: Int32Array,
  w: Float64Array,
  nodes: number,
  size: number,
  y: number,
  place: number,
): void {
  let row = place;
  for (let k = 0; k < size; k++) {
    const v = table[nodes + k]!;
    const r = 1 / w[v]!;
    const yv = w[y + v]!;
    w[v] = r;
    const length = size - k - 1;
    let target = row + length;
    for (let i = 0; i < length; i++) {
      const u = w[row + i]!;
      const l = u * r;
      const a = table[nodes + k + 1 + i]!;
      w[a] = w[a]! - l * u;
      w[y + a] = w[y + a]! - l * yv;
      for (let j = i + 1; j < length; j++) {
        w[target] = w[target]! - l * w[row + j]!;
        target++;
      }
      w[row + i] = l;
    }
    row += length;
  }
}

/** y = L⁻¹ y. */
export function solveForward(plan: SymmetricPlan, w: Float64Array): void {
  const { table, leafCount, linkCount, columnCount, fullSize, fullNodes, fullPlace } = plan;
  const y = plan.pattern.size + 1;
  let q = 2 * y;
  let t = 0;
  for (let k = 0; k < leafCount; k++) {
    const a = y + table[t + 1]!;
    w[a] = w[a]! - w[q++]! * w[y + table[t]!]!;
    t += 2;
  }
  for (let k = 0; k < linkCount; k++) {
    const yv = w[y + table[t]!]!;
    const a = y + table[t + 1]!;
    const b = y + table[t + 2]!;
    w[a] = w[a]! - w[q]! * yv;
    w[b] = w[b]! - w[q + 1]! * yv;
    t += 4;
    q += 2;
  }
  for (let k = 0; k < columnCount; k++) {
    const yv = w[y + table[t]!]!;
    const d = table[t + 1]!;
    t += 2;
    for (let i = 0; i < d; i++) {
      const a = y + table[t + i]!;
      w[a] = w[a]! - w[q++]! * yv;
    }
    t += d + (d * (d - 1)) / 2 + 1;
  }
  q = fullPlace;
  for (let k = 0; k < fullSize; k++) {
    const yv = w[y + table[fullNodes + k]!]!;
    for (let i = k + 1; i < fullSize; i++) {
      const a = y + table[fullNodes + i]!;
      w[a] = w[a]! - w[q++]! * yv;
    }
  }
}

/** y = L⁻ᵀ D⁻¹ y. */
export function solveBackward(plan: SymmetricPlan, w: Float64Array): void {
  const { table, leafCount, linkCount, columnCount, fullSize, fullNodes, fullPlace } = plan;
  const y = plan.pattern.size + 1;
  let q = plan.storage;
  for (let k = fullSize - 1; k >= 0; k--) {
    const v = table[fullNodes + k]!;
    let s = w[y + v]! * w[v]!;
    for (let i = fullSize - 1; i > k; i--) s -= w[--q]! * w[y + table[fullNodes + i]!]!;
    w[y + v] = s;
  }
  q = fullPlace;
  let t = fullNodes;
  for (let k = 0; k < columnCount; k++) {
    const d = table[t - 1]!;
    t -= 3 + d + (d * (d - 1)) / 2;
    const v = table[t]!;
    let s = w[y + v]! * w[v]!;
    for (let i = d - 1; i >= 0; i--) s -= w[--q]! * w[y + table[t + 2 + i]!]!;
    w[y + v] = s;
  }
  for (let k = 0; k < linkCount; k++) {
    t -= 4;
    q -= 2;
    const v = table[t]!;
    w[y + v] = w[y + v]! * w[v]! - w[q]! * w[y + table[t + 1]!]! - w[q + 1]! * w[y + table[t + 2]!]!;
  }
  for (let k = 0; k < leafCount; k++) {
    t -= 2;
    q--;
    const v = table[t]!;
    w[y + v] = w[y + v]! * w[v]! - w[q]! * w[y + table[t + 1]!]!;
  }
}
