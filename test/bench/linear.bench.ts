/** The sparse solvers against general-purpose libraries, on matrices that look like wiring. */
import { join } from 'node:path';
import { analyseBatch } from '../../core/linear/analyseBatch.ts';
import { analyseGeneral } from '../../core/linear/analyseGeneral.ts';
import { analyseSymmetric } from '../../core/linear/analyseSymmetric.ts';
import type { Factorisation } from '../../core/linear/matrix.ts';
import { residual } from '../../core/linear/residual.ts';
import { compileSparse, runSparse, type Timing, writeSystems } from './references.ts';
import { figure, type Report } from './report.ts';
import { median, microseconds } from './stopwatch.ts';
import {
  bothTriangles,
  type GeneralMatrix,
  generalMatrix,
  type Shape,
  type WiringMatrix,
  wiringMatrix,
} from './wiringMatrix.ts';

const SIZES = [50, 200, 1000, 5000];
/** Sets of values used in turn, so that no solver sees the same numbers twice running. */
const SETS = 8;

/** Rounds of timings by solver; all solvers ran in turn in each round. */
type Rounds = Record<string, Timing[]>;

export function run(report: Report): void {
  const program = compileSparse(report);
  warmUp(report);
  for (const shape of ['laid', 'scattered'] as const) {
    const results = SIZES.map((size) => symmetricRounds(report, program, shape, size));
    againTable(report, shape, results);
    allTable(report, shape, results);
    batchTable(report, shape, results);
  }
  generalTable(report, program);
  report.remark(
    'laid: a junction hangs on one of the 8 before it, loops close within 50. scattered: parents and loops join any two junctions. ' +
      'Both: a random tree and n/20 loops, positive definite. Ratios are medians of the ratios within one round. ' +
      'KLU scales rows by default; without scaling it is faster, and shown as well.',
  );
}

/** Seconds of work on all sizes and shapes before anything is measured: a compiled path is thrown away when it first meets a new case. */
const WARM_UP_S = 4;

function warmUp(report: Report): void {
  const cold = wiringMatrix({ size: 200, shape: 'laid', sets: SETS, seed: 5 });
  const start = performance.now();
  analyseSymmetric(cold.pattern).refactorAndSolve(cold.values[0]!, cold.rightHandSides[0]!, new Float64Array(200));
  const first = performance.now() - start;
  report.remark(
    `The very first analysis of a process, before any compilation, n = 200: ${figure(first)} ms. All below is warm.`,
  );
  const shapes = SIZES.flatMap((size) =>
    (['laid', 'scattered'] as const).map((shape) => ({ size, shape, sets: SETS, seed: size })),
  );
  const matrices = shapes.map(wiringMatrix);
  const generals = shapes.map(generalMatrix);
  const end = performance.now() + 1000 * WARM_UP_S;
  for (let k = 0; performance.now() < end; k++) {
    const { pattern, values, rightHandSides, size } = matrices[k % matrices.length]!;
    const x = new Float64Array(size);
    for (let repeat = 0; repeat < 5000 / size; repeat++) {
      for (const plain of [false, true]) {
        const factors = analyseSymmetric(pattern, { plain });
        for (let i = 0; i < 3; i++) factors.refactorAndSolve(values[i]!, rightHandSides[i]!, x);
        factors.solve(x, x);
        factors.release();
      }
      const general = generals[k % generals.length]!;
      const factors = analyseGeneral(general.pattern);
      for (let i = 0; i < 2; i++) factors.refactor(general.values[i]!);
      factors.solve(x, x);
      factors.release();
    }
  }
}

const middle = (rounds: Timing[] | undefined, key: keyof Timing): number =>
  rounds ? median(rounds.map((t) => t[key])) : Number.NaN;

/** Median of a's time over b's, round by round. */
function ratio(a: Timing[] | undefined, b: Timing[] | undefined, key: keyof Timing): number {
  if (!a || !b) return Number.NaN;
  return median(a.map((t, k) => t[key] / b[k]![key]));
}

const cell = (x: number): string => (Number.isNaN(x) ? '–' : figure(x));

function symmetricRounds(report: Report, program: string | null, shape: Shape, size: number): Rounds {
  const matrix = wiringMatrix({ size, shape, sets: SETS, seed: 7 * size + 1 });
  const file = join(report.folder, `${shape}-${size}.bin`);
  const { starts, rows, source } = bothTriangles(matrix.pattern);
  writeSystems(file, {
    starts,
    rows,
    values: matrix.values.map((v) => Float64Array.from(source, (e) => v[e]!)),
    rightHandSides: matrix.rightHandSides,
  });
  const rounds: Rounds = {};
  const add = (name: string, timing: Timing | null): void => {
    if (timing) rounds[name] = [...(rounds[name] ?? []), timing];
  };
  for (let round = 0; round < report.rounds; round++) {
    for (const name of program ? ['klu', 'klu-unscaled', 'cholmod'] : []) {
      add(name, runSparse(program!, file, name, report.seconds));
    }
    add('ours', oursTiming(matrix, report.seconds, false));
    add('plain', oursTiming(matrix, report.seconds, true));
    add('batch', batchTiming(matrix, report.seconds));
  }
  return rounds;
}

function oursTiming({ pattern, values, rightHandSides }: WiringMatrix, seconds: number, plain: boolean): Timing {
  const x = new Float64Array(pattern.size);
  const all = microseconds((i) => {
    const factors = analyseSymmetric(pattern, { plain });
    factors.refactorAndSolve(values[i % SETS]!, rightHandSides[i % SETS]!, x);
    factors.release(); // as the C harness frees its factors
  }, seconds);
  const factors = analyseSymmetric(pattern, { plain });
  const again = microseconds((i) => {
    factors.refactorAndSolve(values[i % SETS]!, rightHandSides[i % SETS]!, x);
  }, seconds);
  factors.refactor(values[0]!);
  const solve = microseconds((i) => factors.solve(rightHandSides[i % SETS]!, x), seconds);
  factors.solve(rightHandSides[0]!, x);
  return {
    all,
    again,
    solve,
    residual: residual(pattern, values[0]!, rightHandSides[0]!, x, new Float64Array(pattern.size)),
  };
}

/** `again`: systems already side by side. `all`: filled in from separate arrays and read back. Both for one system. */
function batchTiming({ pattern, values, rightHandSides, size }: WiringMatrix, seconds: number): Timing {
  const batch = analyseBatch(pattern);
  const { lanes } = batch;
  const entries = values[0]!.length;
  const x = new Float64Array(size);
  const fill = (): void => {
    for (let s = 0; s < lanes; s++) {
      const v = values[s % SETS]!;
      const b = rightHandSides[s % SETS]!;
      for (let e = 0; e < entries; e++) batch.values[e * lanes + s] = v[e]!;
      for (let i = 0; i < size; i++) batch.unknowns[i * lanes + s] = b[i]!;
    }
  };
  fill();
  const sides = batch.unknowns.slice();
  const again = microseconds(() => {
    batch.unknowns.set(sides);
    batch.refactorAndSolve();
  }, seconds);
  const all = microseconds(() => {
    fill();
    batch.refactorAndSolve();
    for (let s = 0; s < lanes; s++) for (let i = 0; i < size; i++) x[i] = batch.unknowns[i * lanes + s]!;
  }, seconds);
  return { all: all / lanes, again: again / lanes, solve: Number.NaN, residual: Number.NaN };
}

function againTable(report: Report, shape: Shape, results: Rounds[]): void {
  const rows = results.map((r, k) => [
    String(SIZES[k]),
    ...['ours', 'plain', 'klu', 'klu-unscaled', 'cholmod'].map((name) => cell(middle(r[name], 'again'))),
    cell(ratio(r['ours'], r['klu'], 'again')),
    cell(ratio(r['ours'], r['klu-unscaled'], 'again')),
    cell(ratio(r['plain'], r['klu'], 'again')),
    cell(ratio(r['ours'], r['klu'], 'solve')),
    middle(r['ours'], 'residual').toExponential(0),
  ]);
  const head = ['n', 'ours, µs', 'ours plain JS, µs', 'KLU, µs', 'KLU unscaled, µs', 'CHOLMOD, µs'];
  const ratios = ['ours / KLU', 'ours / KLU unscaled', 'plain / KLU', 'solve only: ours / KLU', 'residual'];
  report.table(`Refactor and solve, ${shape}`, [...head, ...ratios], rows);
  const exponent = (name: string): string => {
    const [from, to] = [results[1]![name], results[3]![name]];
    return cell(Math.log(middle(to, 'again') / middle(from, 'again')) / Math.log(SIZES[3]! / SIZES[1]!));
  };
  report.remark(
    `Growth from n = 200 to 5000, as a power of n: ours ${exponent('ours')}, KLU ${exponent('klu')}, CHOLMOD ${exponent('cholmod')}.`,
  );
}

function allTable(report: Report, shape: Shape, results: Rounds[]): void {
  const rows = results.map((r, k) => [
    String(SIZES[k]),
    ...['ours', 'klu', 'cholmod'].map((name) => cell(middle(r[name], 'all'))),
    cell(ratio(r['ours'], r['klu'], 'all')),
    cell(ratio(r['ours'], r['cholmod'], 'all')),
  ]);
  const head = ['n', 'ours, µs', 'KLU, µs', 'CHOLMOD, µs', 'ours / KLU', 'ours / CHOLMOD'];
  report.table(`Analyse, factor and solve, ${shape}`, head, rows);
}

function batchTable(report: Report, shape: Shape, results: Rounds[]): void {
  const rows = results.map((r, k) => [
    String(SIZES[k]),
    cell(middle(r['batch'], 'again')),
    cell(middle(r['batch'], 'all')),
    cell(middle(r['klu'], 'again')),
    cell(ratio(r['klu'], r['batch'], 'again')),
    cell(ratio(r['klu-unscaled'], r['batch'], 'again')),
    cell(median((r['klu'] ?? []).map((t, i) => t.again / r['batch']![i]!.all))),
  ]);
  const head = ['n', 'batch, µs a system', 'with copying in and out, µs', 'KLU refactor and solve, µs'];
  const ratios = ['throughput over KLU', 'over KLU unscaled', 'with copying, over KLU'];
  report.table(`Eight systems side by side, ${shape}`, [...head, ...ratios], rows);
}

function generalTable(report: Report, program: string | null): void {
  const rows = SIZES.map((size) => {
    const matrix = generalMatrix({ size, shape: 'laid', sets: SETS, seed: size + 3 });
    const file = join(report.folder, `general-${size}.bin`);
    const { columnStarts: starts, rowIndices } = matrix.pattern;
    writeSystems(file, { starts, rows: rowIndices, values: matrix.values, rightHandSides: matrix.rightHandSides });
    const [ours, klu]: Timing[][] = [[], []];
    for (let round = 0; round < report.rounds; round++) {
      if (program) klu!.push(runSparse(program, file, 'klu', report.seconds));
      ours!.push(generalTiming(matrix, report.seconds));
    }
    const known = program ? klu : undefined;
    return [
      String(size),
      ...(['all', 'again'] as const).flatMap((key) => [
        cell(middle(ours, key)),
        cell(middle(known, key)),
        cell(ratio(ours, known, key)),
      ]),
      middle(ours, 'residual').toExponential(0),
    ];
  });
  const head = ['n', 'all: ours, µs', 'KLU, µs', 'ours / KLU', 'again: ours, µs', 'KLU, µs', 'ours / KLU', 'residual'];
  report.table('General systems (wiring with converters): all from start to end, and refactor and solve', head, rows);
}

function generalTiming({ pattern, values, rightHandSides }: GeneralMatrix, seconds: number): Timing {
  const x = new Float64Array(pattern.size);
  const step = (f: Factorisation, i: number): void => {
    f.refactor(values[i % SETS]!);
    f.solve(rightHandSides[i % SETS]!, x);
  };
  const all = microseconds((i) => {
    const factors = analyseGeneral(pattern);
    step(factors, i);
    factors.release();
  }, seconds);
  const factors = analyseGeneral(pattern);
  const again = microseconds((i) => step(factors, i), seconds);
  const solve = microseconds((i) => factors.solve(rightHandSides[i % SETS]!, x), seconds);
  step(factors, 0);
  return {
    all,
    again,
    solve,
    residual: residual(pattern, values[0]!, rightHandSides[0]!, x, new Float64Array(pattern.size)),
  };
}
