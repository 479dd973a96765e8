/** Programs that are used to measure against, where they are installed. */
import { execFileSync } from 'node:child_process';
import { existsSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import type { Report } from './report.ts';

/** Microseconds a system: analyse, factor and solve; refactor and solve; solve only. And the scaled residual. */
export interface Timing {
  readonly all: number;
  readonly again: number;
  readonly solve: number;
  readonly residual: number;
}

/** Several systems of one pattern, with both triangles. */
export interface ReferenceSystems {
  readonly starts: Int32Array;
  readonly rows: Int32Array;
  readonly values: readonly Float64Array[];
  readonly rightHandSides: readonly Float64Array[];
}

/** Writes the systems in the format that the reference programs read. */
export function writeSystems(file: string, { starts, rows, values, rightHandSides }: ReferenceSystems): void {
  const bytes = (a: Int32Array | Float64Array): Uint8Array => new Uint8Array(a.buffer, a.byteOffset, a.byteLength);
  const head = Int32Array.of(starts.length - 1, rows.length, values.length);
  writeFileSync(file, Buffer.concat([head, starts, rows, ...values, ...rightHandSides].map(bytes)));
}

const SOURCES = join(process.cwd(), 'test', 'bench', 'reference');
const COMPILER = 'gcc';
const HEADERS = '/usr/include/suitesparse';

/** Compiles the harness for KLU and CHOLMOD; null where that is not possible. */
export function compileSparse(report: Report): string | null {
  if (!existsSync(join(HEADERS, 'klu.h'))) {
    report.missing('KLU and CHOLMOD', 'the SuiteSparse headers are not installed');
    return null;
  }
  const program = join(report.folder, 'sparse');
  const source = join(SOURCES, 'sparse.c');
  try {
    execFileSync(COMPILER, [
      '-O2',
      '-march=native',
      `-I${HEADERS}`,
      source,
      '-o',
      program,
      '-lklu',
      '-lcholmod',
      '-lm',
    ]);
    return program;
  } catch {
    report.missing('KLU and CHOLMOD', 'the C harness did not compile');
    return null;
  }
}

export function runSparse(program: string, file: string, method: string, seconds: number): Timing {
  return JSON.parse(execFileSync(program, [file, method, String(seconds)], { encoding: 'utf8' })) as Timing;
}

/** LAPACK's dense solver through numpy, on one thread; null where there is none. */
export function runLapack(report: Report, file: string, seconds: number): Timing | null {
  const program = '/usr/bin/python3';
  try {
    const env = { ...process.env, OPENBLAS_NUM_THREADS: '1', OMP_NUM_THREADS: '1' };
    const text = execFileSync(program, [join(SOURCES, 'lapack.py'), file, String(seconds)], {
      encoding: 'utf8',
      env,
      stdio: 'pipe',
    });
    return { again: Number.NaN, solve: Number.NaN, ...(JSON.parse(text) as { all: number; residual: number }) };
  } catch {
    report.missing('LAPACK', 'python3 with numpy is not installed');
    return null;
  }
}
