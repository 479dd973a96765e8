/** Draws over the ranges of assumed figures, each solved. */
import { seededUniform } from '../../linear/seededDraws.ts';
import type { Sweep } from '../../network/sweep.ts';
import type { AssumedFigure } from './assumedFigures.ts';
import type { Deviations } from './deviations.ts';
import { type FigureChanges, moved } from './figureChanges.ts';

/** Draws between two words of progress. */
const STRETCH = 512;

export interface DrawRequest {
  readonly draws: number;
  readonly seed: number;
  /** Largest |deviation| that is within. */
  readonly limit: number;
  readonly figures: readonly AssumedFigure[];
  readonly figureChanges: FigureChanges;
  readonly sweep: Sweep;
  readonly sharing: Deviations;
  /** Number of strings that the sweep watches. */
  readonly strings: number;
  readonly progress?: ((done: number, of: number) => void) | undefined;
}

export interface Drawn {
  /** By string: current of every solved draw. */
  readonly currentsA: readonly Float64Array[];
  readonly deviations: readonly Float64Array[];
  /** By figure: what was drawn, as the move of its first quantity, in solved draws. */
  readonly figures: readonly Float64Array[];
  readonly solved: number;
  readonly unsolved: number;
  /** Draws in which every string is within the limit. */
  readonly within: number;
}

export function drawAll({
  draws,
  seed,
  limit,
  figures,
  figureChanges,
  sweep,
  sharing,
  strings,
  progress,
}: DrawRequest): Drawn {
  const uniform = seededUniform(seed);
  const rows = (count: number) => Array.from({ length: count }, () => new Float64Array(draws));
  const [currentsA, deviations, drawnFigures] = [rows(strings), rows(strings), rows(figures.length)];
  let solved = 0;
  let within = 0;
  const lot = Array.from({ length: STRETCH }, () => new Float64Array(figures.length));
  for (let first = 0; first < draws; first += STRETCH) {
    const count = Math.min(STRETCH, draws - first);
    sweep.run({
      count,
      draw: (index, changes) => {
        figureChanges.write(changes, (f) => {
          const t = uniform();
          lot[index]![f] = moved(figures[f]!.moves[0]!, t);
          return t;
        });
      },
      take: (index, currents) => {
        if (currents === null) return;
        const off = sharing.of(currents);
        let isWithin = true;
        for (let k = 0; k < currents.length; k++) {
          currentsA[k]![solved] = currents[k]!;
          deviations[k]![solved] = off[k]!;
          if (Math.abs(off[k]!) > limit) isWithin = false;
        }
        drawnFigures.forEach((row, f) => {
          row[solved] = lot[index]![f]!;
        });
        if (isWithin) within++;
        solved++;
      },
    });
    progress?.(first + count, draws);
  }
  const cut = (all: readonly Float64Array[]) => all.map((row) => row.subarray(0, solved));
  return {
    currentsA: cut(currentsA),
    deviations: cut(deviations),
    figures: cut(drawnFigures),
    solved,
    unsolved: draws - solved,
    within,
  };
}
