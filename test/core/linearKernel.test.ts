/** Compiled and plain code, one system and many side by side: the same bits. */
import { afterEach, beforeAll, describe, expect, it, vi } from 'vitest';
import { Defect } from '../../core/job/issue.ts';
import { analyseBatch, type Batch } from '../../core/linear/analyseBatch.ts';
import { analyseSymmetric } from '../../core/linear/analyseSymmetric.ts';
import { residence } from '../../core/linear/residence.ts';
import { residual } from '../../core/linear/residual.ts';
import { solveRefined } from '../../core/linear/solveRefined.ts';
import { type System, seeded, wiring, wiringWithSources } from './linearSystems.ts';

/** Wiring of many sizes and loop counts, so that leaves, links, columns and the full block all occur, alone and together. */
const SYSTEMS: System[] = [
  ...[1, 2, 3, 4, 8, 40].flatMap((size) =>
    [0, 1, 3, size, 3 * size].map((loops) => wiring(size, loops, 17 * size + loops)),
  ),
  wiring(300, 60, 5),
  wiringWithSources(30, 6, 8),
];

/** Other values on the same pattern: each entry scaled by its own factor near 1, which keeps it definite. */
function varied(s: System, seed: number): Float64Array {
  const random = seeded(seed);
  return s.values.map((v) => v * (1 + 1e-3 * random()));
}

function fill(batch: Batch, lane: number, values: Float64Array, b: Float64Array): void {
  values.forEach((v, e) => {
    batch.values[e * batch.lanes + lane] = v;
  });
  b.forEach((v, i) => {
    batch.unknowns[i * batch.lanes + lane] = v;
  });
}

function lane(batch: Batch, s: number): Float64Array {
  return batch.unknowns.filter((_, k) => k % batch.lanes === s);
}

describe('the compiled kernel', () => {
  beforeAll(() => {
    // Compiled now, not after much plain work: what follows compares it with something.
    if (residence.functions === null) throw new Error('there is no kernel to compare with');
  });

  it('gives the bits of the plain steps, in one sweep or in two', () => {
    for (const s of SYSTEMS) {
      const plain = analyseSymmetric(s.pattern, { plain: true });
      const compiled = analyseSymmetric(s.pattern);
      const [x, y, z] = [new Float64Array(s.size), new Float64Array(s.size), new Float64Array(s.size)];
      for (let round = 0; round < 3; round++) {
        const values = varied(s, round);
        const report = { ...plain.refactorAndSolve(values, s.b, x) };
        expect(compiled.refactorAndSolve(values, s.b, y)).toEqual(report);
        expect(y).toEqual(x);
        compiled.refactor(values);
        compiled.solve(s.b, z);
        expect(z).toEqual(x);
      }
    }
  });

  it('reports a singular system like the plain steps, and sets its solution to zero', () => {
    const s = wiring(12, 2, 3);
    const values = s.values.slice();
    // A junction that hangs on nothing: its column and row become zero.
    const { columnStarts, rowIndices } = s.pattern;
    for (let j = 0; j < 12; j++)
      for (let e = columnStarts[j]!; e < columnStarts[j + 1]!; e++) if (j === 7 || rowIndices[e] === 7) values[e] = 0;
    const compiled = analyseSymmetric(s.pattern);
    compiled.refactor(s.values);
    const x = new Float64Array(12).fill(9);
    expect(compiled.refactorAndSolve(values, s.b, x)).toEqual({ regular: false, negativePivots: 0, failedColumn: 7 });
    expect(x).toEqual(new Float64Array(12));
  });

  it.each([false, true])(
    'refuses arrays of another length, which would be copied over their neighbours; plain code: %s',
    (plain) => {
      const s = wiring(9, 1, 4);
      const factorisation = analyseSymmetric(s.pattern, { plain });
      for (let use = 0; use < 3; use++) {
        factorisation.refactor(s.values);
        expect(() => factorisation.solve(new Float64Array(10), new Float64Array(9))).toThrow(Defect);
        expect(() => factorisation.refactor(new Float64Array(s.values.length + 1))).toThrow(Defect);
      }
    },
  );

  it('may be released: then it refuses work, and the next one uses its memory without harm', () => {
    const kept = wiring(40, 5, 2);
    const keeper = analyseSymmetric(kept.pattern);
    keeper.refactor(kept.values);
    for (let round = 0; round < 60; round++) {
      const s = wiring(5 + round, round % 7, round);
      const other = analyseSymmetric(s.pattern);
      const x = new Float64Array(s.size);
      for (let use = 0; use <= round % 3; use++) expect(other.refactorAndSolve(s.values, s.b, x).regular).toBe(true);
      expect(residual(s.pattern, s.values, s.b, x, new Float64Array(s.size))).toBeLessThan(1e-14);
      other.release();
      other.release();
      expect(() => other.solve(s.b, x)).toThrow(Defect);
      expect(() => other.refactor(s.values)).toThrow(Defect);
    }
    const x = new Float64Array(40);
    keeper.solve(kept.b, x);
    expect(residual(kept.pattern, kept.values, kept.b, x, new Float64Array(40))).toBeLessThan(1e-14);
  });

  it('serves many factorisations in turn, even when its memory has been cleared between factoring and solving', () => {
    const s = wiring(3000, 150, 2);
    const first = analyseSymmetric(s.pattern);
    first.refactor(s.values);
    first.refactor(s.values);
    const expected = new Float64Array(s.size);
    first.solve(s.b, expected);
    // About 0.2 MB each: more than the 16 MB of the memory.
    for (let k = 0; k < 120; k++) {
      const other = analyseSymmetric(s.pattern);
      other.refactor(s.values);
      other.refactor(s.values);
    }
    const x = new Float64Array(s.size);
    first.solve(s.b, x);
    expect(x).toEqual(expected);
    expect(first.refactorAndSolve(s.values, s.b, x).regular).toBe(true);
    expect(x).toEqual(expected);
  });
});

describe('a batch', () => {
  it.each([false, true])('gives the bits of single systems in every lane; plain code: %s', (plain) => {
    for (const s of SYSTEMS) {
      const batch = analyseBatch(s.pattern, { plain });
      const one = analyseSymmetric(s.pattern);
      const right = (k: number): Float64Array => s.b.map((v) => v * (k + 1) + k);
      for (let k = 0; k < batch.lanes; k++) fill(batch, k, varied(s, k), right(k));
      const reports = batch.refactorAndSolve();
      const x = new Float64Array(s.size);
      for (let k = 0; k < batch.lanes; k++) {
        expect(reports[k]).toEqual(one.refactorAndSolve(varied(s, k), right(k), x));
        expect(lane(batch, k)).toEqual(x);
      }
    }
  });

  it.each([false, true])('is not troubled by a singular system, nor by lanes left empty; plain code: %s', (plain) => {
    const s = wiring(20, 2, 7);
    const batch = analyseBatch(s.pattern, { plain });
    fill(batch, 0, s.values, s.b);
    fill(batch, 1, new Float64Array(s.values.length), s.b);
    fill(batch, 2, s.values, s.b);
    const reports = batch.refactorAndSolve(3).slice(0, 3);
    expect(reports.map((r) => r.regular)).toEqual([true, false, true]);
    const x = new Float64Array(20);
    const single = analyseSymmetric(s.pattern);
    single.refactorAndSolve(s.values, s.b, x);
    expect(lane(batch, 0)).toEqual(x);
    expect(lane(batch, 1)).toEqual(new Float64Array(20));
    expect(lane(batch, 2)).toEqual(x);
  });
});

describe('the kernel is compiled', () => {
  it('only after much plain work', async () => {
    vi.resetModules();
    const fresh = await import('../../core/linear/analyseSymmetric.ts');
    const host = Reflect.get(globalThis, 'WebAssembly') as { Module: new (bytes: Uint8Array) => object };
    const module = vi.spyOn(host, 'Module');
    const s = wiring(300, 20, 6);
    const factorisation = fresh.analyseSymmetric(s.pattern);
    for (let k = 0; k < 100; k++) factorisation.refactor(s.values);
    expect(module).not.toHaveBeenCalled();
    for (let k = 0; k < 5000; k++) factorisation.refactor(s.values);
    expect(module).toHaveBeenCalledTimes(1);
    module.mockRestore();
  });
});

describe('without WebAssembly', () => {
  afterEach(() => {
    vi.unstubAllGlobals();
    vi.resetModules();
  });

  const forbidden = {
    Module: function refuse() {
      throw new Error('compilation is forbidden by the content policy');
    },
  };

  it.each([
    ['missing', undefined],
    ['forbidden', forbidden],
  ])('%s, the answers stay the same', async (_, host) => {
    const s = wiring(60, 9, 4);
    const x = new Float64Array(60);
    const usual = analyseSymmetric(s.pattern);
    usual.refactor(s.values);
    usual.refactorAndSolve(s.values, s.b, x);

    vi.stubGlobal('WebAssembly', host);
    vi.resetModules();
    const bare = await import('../../core/linear/analyseSymmetric.ts');
    const bareResidence = await import('../../core/linear/residence.ts');
    expect(bareResidence.residence.functions).toBeNull();
    const bareBatch = await import('../../core/linear/analyseBatch.ts');
    const y = new Float64Array(60);
    const factorisation = bare.analyseSymmetric(s.pattern);
    for (let round = 0; round < 3; round++) factorisation.refactorAndSolve(s.values, s.b, y);
    expect(y).toEqual(x);
    const batch = bareBatch.analyseBatch(s.pattern);
    for (let k = 0; k < batch.lanes; k++) fill(batch, k, s.values, s.b);
    batch.refactorAndSolve();
    expect(lane(batch, 5)).toEqual(x);
  });
});

describe('large wiring', () => {
  it.each([1000, 5000])('of %i junctions leaves a residual of rounding', (size) => {
    const s = wiring(size, size / 20, size);
    const factorisation = analyseSymmetric(s.pattern);
    factorisation.refactor(s.values);
    const x = new Float64Array(size);
    factorisation.solve(s.b, x);
    expect(solveRefined(factorisation, s.values, s.b, x).scaledResidual).toBeLessThan(1e-15);
  });
});
