/** What a draw of figures comes to in the quantities of the circuit. */
import type { Shift } from '../../network/shift.ts';
import type { AssumedFigure, Move } from './assumedFigures.ts';

/** The change that a draw makes: `t` from 0 (low) through 0.5 (the value) to 1 (high). */
export function moved({ toLow, toHigh }: Pick<Move, 'toLow' | 'toHigh'>, t: number): number {
  return t < 0.5 ? (1 - 2 * t) * toLow : (2 * t - 1) * toHigh;
}

/** Gathers the moves of all figures by the quantity that they move. */
export class FigureChanges {
  /** Each quantity once, in the order of `changes` as `write` fills them. */
  readonly shifts: readonly Shift[];
  private readonly figures: readonly AssumedFigure[];
  /** By figure and move: its place among the shifts. */
  private readonly places: readonly (readonly number[])[];
  private readonly factors: Float64Array;
  private readonly bases: Float64Array;

  constructor(figures: readonly AssumedFigure[]) {
    const place = new Map<string, number>();
    const shifts: Shift[] = [];
    this.places = figures.map(({ moves }) =>
      moves.map(({ shift }) => {
        const name = `${shift.quantity} ${shift.part}`;
        const known = place.get(name);
        if (known !== undefined) return known;
        place.set(name, shifts.length);
        return shifts.push(shift) - 1;
      }),
    );
    this.shifts = shifts;
    this.figures = figures;
    this.factors = new Float64Array(shifts.length);
    this.bases = new Float64Array(shifts.length);
  }

  /** The changes for figures at `at(f)`, each between 0 (its low) and 1 (its high), 0.5 being its value. */
  write(changes: Float64Array, at: (figure: number) => number): void {
    changes.fill(0);
    this.factors.fill(1);
    this.figures.forEach(({ moves }, f) => {
      const t = at(f);
      moves.forEach((move, k) => {
        const place = this.places[f]![k]!;
        const change = moved(move, t);
        if (move.base === undefined) changes[place]! += change;
        else {
          this.bases[place] = move.base;
          this.factors[place]! *= 1 + change / move.base;
        }
      });
    });
    for (let place = 0; place < changes.length; place++) {
      if (this.factors[place] !== 1) changes[place]! += this.bases[place]! * (this.factors[place]! - 1);
    }
  }
}
