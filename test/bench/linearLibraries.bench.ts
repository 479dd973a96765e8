/** The sparse solver against general-purpose libraries for JavaScript, and LAPACK's solver of full matrices. */
import { join } from 'node:path';
import { lup, lusolve, slu, sparse } from 'mathjs';
import { LuDecomposition, Matrix } from 'ml-matrix';
import { analyseSymmetric } from '../../core/linear/analyseSymmetric.ts';
import { runLapack, writeSystems } from './references.ts';
import { figure, type Report } from './report.ts';
import { microseconds } from './stopwatch.ts';
import { bothTriangles, type WiringMatrix, wiringMatrix } from './wiringMatrix.ts';

const SIZES = [50, 200, 1000, 5000];
/** The largest sizes for solvers of full matrices: those of ml-matrix and LAPACK, and that of mathjs. */
const LARGEST_FULL = 1000;
const LARGEST_SLOW = 200;

export function run(report: Report): void {
  const names = ['mathjs slu', 'mathjs lup, full', 'ml-matrix LU, full', 'LAPACK dgesv, full'];
  const rows = SIZES.map((size) => {
    const matrix = wiringMatrix({ size, shape: 'laid', sets: 1, seed: 7 * size + 1 });
    const ours = oursMicroseconds(matrix, report.seconds);
    const theirs = [...libraryMicroseconds(matrix, report.seconds), lapackMicroseconds(report, matrix)];
    const cells = theirs.map((t) => (t === null ? 'not run' : `${figure(t)} (${figure(t / ours)} ×)`));
    return [String(size), figure(ours), ...cells];
  });
  report.table('General-purpose libraries from start to end, µs, and times ours; laid', ['n', 'ours', ...names], rows);
}

function oursMicroseconds({ pattern, values, rightHandSides, size }: WiringMatrix, seconds: number): number {
  const x = new Float64Array(size);
  const step = (): void => {
    const factors = analyseSymmetric(pattern);
    factors.refactorAndSolve(values[0]!, rightHandSides[0]!, x);
    factors.release();
  };
  microseconds(step, 10 * seconds);
  return microseconds(step, seconds);
}

/** mathjs sparse, mathjs full, ml-matrix; null where it would take too long. */
function libraryMicroseconds(
  { pattern, values, rightHandSides, size }: WiringMatrix,
  seconds: number,
): (number | null)[] {
  const right = [...rightHandSides[0]!].map((v) => [v]);
  const full = size <= LARGEST_FULL ? Matrix.zeros(size, size) : null;
  const bySparse = sparse();
  bySparse.resize([size, size]);
  for (let j = 0; j < size; j++) {
    for (let e = pattern.columnStarts[j]!; e < pattern.columnStarts[j + 1]!; e++) {
      const i = pattern.rowIndices[e]!;
      const v = values[0]![e]!;
      bySparse.set([i, j], v);
      bySparse.set([j, i], v);
      full?.set(i, j, v);
      full?.set(j, i, v);
    }
  }
  const column = new Matrix(right);
  const rows = full !== null && size <= LARGEST_SLOW ? full.to2DArray() : null;
  return [
    microseconds(() => void lusolve(slu(bySparse, 1, 1), right), seconds),
    rows && microseconds(() => void lusolve(lup(rows), right), seconds),
    full && microseconds(() => void new LuDecomposition(full).solve(column), seconds),
  ];
}

function lapackMicroseconds(report: Report, { pattern, values, rightHandSides, size }: WiringMatrix): number | null {
  if (size > LARGEST_FULL) return null;
  const { starts, rows, source } = bothTriangles(pattern);
  const file = join(report.folder, `libraries-${size}.bin`);
  const both = Float64Array.from(source, (e) => values[0]![e]!);
  writeSystems(file, { starts, rows, values: [both], rightHandSides: [rightHandSides[0]!] });
  return runLapack(report, file, report.seconds)?.all ?? null;
}
