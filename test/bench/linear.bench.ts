/** The sparse solvers against general-purpose libraries, on matrices that look like wiring. */
import { execFileSync } from 'node:child_process';
import { existsSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { analyseSymmetric } from '../../core/linear/analyseSymmetric.ts';
import { residual } from '../../core/linear/residual.ts';
import { figure, type Report } from './report.ts';
import { median, microseconds } from './stopwatch.ts';
import { bothTriangles, type Shape, type WiringMatrix, wiringMatrix } from './wiringMatrix.ts';

const SIZES = [50, 200, 1000, 5000];
const SETS = 4;

interface Timing {
  /** Microseconds: analyse, factor and solve. */
  readonly all: number;
  /** Microseconds: refactor and solve. */
  readonly again: number;
  readonly solve: number;
  readonly residual: number;
}

export function run(report: Report): void {
  const reference = compileReference(report);
  for (const shape of ['scattered', 'laid'] as const) {
    const results = SIZES.map((size) => measure(report, reference, size, shape));
    void results;
  }
}

function measure(report: Report, reference: string | null, size: number, shape: Shape): void {
  const matrix = wiringMatrix({ size, shape, sets: SETS, seed: 7 * size + 1 });
  const file = writeMatrix(report, matrix);
  const ours: Timing[] = [];
  const klu: Timing[] = [];
  for (let round = 0; round < report.rounds; round++) {
    ours.push(measureOurs(matrix, report.seconds));
    if (reference) klu.push(measureReference(reference, file, 'klu', report.seconds));
  }
  const m = (list: Timing[], key: keyof Timing): number => median(list.map((t) => t[key]));
  console.log(
    shape,
    size,
    'ours all',
    figure(m(ours, 'all')),
    'again',
    figure(m(ours, 'again')),
    'solve',
    figure(m(ours, 'solve')),
    'res',
    m(ours, 'residual'),
    '| klu',
    figure(m(klu, 'all')),
    figure(m(klu, 'again')),
    figure(m(klu, 'solve')),
    '| ratios',
    figure(m(ours, 'all') / m(klu, 'all')),
    figure(m(ours, 'again') / m(klu, 'again')),
    figure(m(ours, 'solve') / m(klu, 'solve')),
  );
}

function measureOurs({ pattern, values, rightHandSides }: WiringMatrix, seconds: number): Timing {
  const { size } = pattern;
  const x = new Float64Array(size);
  const all = microseconds((i) => {
    const factors = analyseSymmetric(pattern);
    factors.refactor(values[i % SETS]!);
    factors.solve(rightHandSides[i % SETS]!, x);
  }, seconds);
  const factors = analyseSymmetric(pattern);
  const again = microseconds((i) => {
    factors.refactor(values[i % SETS]!);
    factors.solve(rightHandSides[i % SETS]!, x);
  }, seconds);
  factors.refactor(values[0]!);
  const solve = microseconds((i) => factors.solve(rightHandSides[i % SETS]!, x), seconds);
  factors.solve(rightHandSides[0]!, x);
  return { all, again, solve, residual: residual(pattern, values[0]!, rightHandSides[0]!, x, new Float64Array(size)) };
}

function measureReference(program: string, file: string, method: string, seconds: number): Timing {
  return JSON.parse(execFileSync(program, [file, method, String(seconds)], { encoding: 'utf8' })) as Timing;
}

/** Compiles the harness where its headers are; null and a remark where they are not. */
function compileReference(report: Report): string | null {
  const headers = '/usr/include/suitesparse';
  if (!existsSync(join(headers, 'klu.h'))) {
    report.missing('KLU and CHOLMOD', 'SuiteSparse headers are not installed');
    return null;
  }
  const program = join(report.folder, 'sparse');
  const source = join(process.cwd(), 'test', 'bench', 'reference', 'sparse.c');
  try {
    execFileSync('gcc', ['-O2', '-march=native', `-I${headers}`, source, '-o', program, '-lklu', '-lcholmod', '-lm']);
  } catch {
    report.missing('KLU and CHOLMOD', 'the C harness did not compile');
    return null;
  }
  return program;
}

function writeMatrix(report: Report, { size, shape, pattern, values, rightHandSides }: WiringMatrix): string {
  const { starts, rows, source } = bothTriangles(pattern);
  const file = join(report.folder, `${shape}-${size}.bin`);
  const full = values.map((v) => Float64Array.from(source, (e) => v[e]!));
  const bytes = (a: Int32Array | Float64Array): Uint8Array => new Uint8Array(a.buffer, a.byteOffset, a.byteLength);
  const parts = [Int32Array.of(size, rows.length, values.length), starts, rows, ...full, ...rightHandSides];
  writeFileSync(file, Buffer.concat(parts.map(bytes)));
  return file;
}
