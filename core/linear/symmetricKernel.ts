/**
 * The steps of `symmetricSteps.ts` as a WebAssembly module, for one system and for LANES systems of the same pattern side by side: the same
 * operations in the same order, each rounded once, so that the results agree with the plain ones bit for bit.
 */
import { eliminate } from './eliminationKernel.ts';
import { SINGULAR } from './inspectPivots.ts';
import { KernelWriter, type Width } from './kernelWriter.ts';
import { solveBackward, solveForward } from './substitutionKernel.ts';
import { type Code, clear, i32, pair, scalar, type WrittenFunction, when, writeModule } from './wasmWriter.ts';
import { WasmProgram } from './webAssembly.ts';

/** Systems side by side: enough to share the cost of the indices, few enough for all to stay in the processor's cache. */
export const LANES = 8;

/**
 * The program for one system; compiled when first needed. Each function takes the address of a block (see `HEADER`). Those that factor
 * return 1 when every pivot is positive and none has been lost; else 0, and there has been no substitution.
 */
export const symmetricProgram = new WasmProgram(() => {
  const one: Width = { arithmetic: scalar, vectors: 1 };
  return writeModule([
    write('refactor', one, (k) => [load(k), eliminate(k), inspect(k)]),
    write('refactorAndSolve', one, refactorAndSolve),
    write('solve', one, (k) => [solveForward(k), solveBackward(k), i32.constant(1)]),
    write('substitute', one, (k) => [solveBackward(k), i32.constant(1)]),
  ]);
});

/** The same for LANES systems side by side. */
export const batchProgram = new WasmProgram(() => {
  const many: Width = { arithmetic: pair, vectors: LANES / 2 };
  return writeModule([
    write('refactorAndSolve', many, refactorAndSolve),
    write('substitute', many, (k) => [solveBackward(k), i32.constant(1)]),
  ]);
});

function write(name: string, width: Width, body: (k: KernelWriter) => Code): WrittenFunction {
  const k = new KernelWriter(width);
  return { name, parameterCount: 1, entry: k.finish(body(k)) };
}

function refactorAndSolve(k: KernelWriter): Code {
  const { sound } = k.integers('sound');
  return [load(k), eliminate(k), sound.set(inspect(k)), when(sound.get, solveBackward(k)), sound.get];
}

/** Clears what the matrix does not set and puts its values in their places. */
function load(k: KernelWriter): Code {
  const { load, store, constant } = k.arithmetic;
  const { w, slots, ends, values, target, nobody } = k.integers('w', 'slots', 'ends', 'values', 'target', 'nobody');
  const clearBefore = (end: Code): Code => [
    nobody.set(i32.subtract(end, i32.constant(k.stride))),
    k.each((_, o) => store(nobody.get, constant(0), o)),
  ];
  return [
    clear(k.part('linkEntries'), i32.subtract(k.part('entriesEnd'), k.part('linkEntries'))),
    clearBefore(k.part('y')),
    clearBefore(k.part('leafEntries')),
    k.start({ w, slots, ends, values }),
    k.loop(slots, ends, [
      target.set(k.follow(w, slots)),
      k.each((_, o) => store(target.get, load(values.get, o), o)),
      k.advance(values, k.stride),
      k.advance(slots, 4),
    ]),
  ];
}

/** 1 when every pivot is positive and none has been lost, by the measure of `inspectPivots` for that case; else 0. */
function inspect(k: KernelWriter): Code {
  const { allAtMost, constant, load, magnitude, multiply } = k.arithmetic;
  const { w, y, ends, values, aAt, sound } = k.integers('w', 'y', 'ends', 'values', 'aAt', 'sound');
  return [
    k.start({ w, y, ends, values }),
    y.set(i32.subtract(y.get, i32.constant(k.stride))), // nobody's diagonal ends the list
    values.set(i32.subtract(values.get, i32.constant(k.stride))), // an end is one beyond its diagonal entry
    sound.set(i32.constant(1)),
    k.loop(w, y, [
      aAt.set(k.follow(values, ends)),
      k.each((_, o) =>
        sound.set(
          i32.and(
            sound.get,
            i32.and(
              allAtMost(constant(0), load(w.get, o)),
              allAtMost(magnitude(multiply(load(w.get, o), load(aAt.get, o))), constant(1 / SINGULAR)),
            ),
          ),
        ),
      ),
      k.advance(ends, 4),
      k.advance(w, k.stride),
    ]),
    sound.get,
  ];
}
