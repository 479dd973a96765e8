/** How warm a conductor gets from its own current. */
import type { Status } from '../tables/status.ts';
import { weakest } from '../tables/status.ts';
import { ratingOf } from './ampacity.ts';
import type { AmpacityContext, RatedConductor } from './rating.ts';
import type { Missing } from './size.ts';

/** T = ambientDegC + riseAtRatedK · (I / ampacityA)², I being the current of all parallel conductors together. */
export interface HeatingLaw {
  readonly ambientDegC: number;
  readonly riseAtRatedK: number;
  readonly ampacityA: number;
  readonly status: Status;
  readonly assumed: readonly string[];
}

/**
 * The heating law of a cable, from its practice's ampacity table: at the table's amperes in the table's ambient the conductor
 * stands at its rated temperature, and the rise above the surroundings goes with the square of the current.
 *
 * Which factors enter `ampacityA`, and why: the heat of loaded neighbours does (it raises the rise of every ampere), even where
 * the book does not make it binding. Ambient and engine-space factors do not: they follow from the surroundings, which the law
 * already adds as `ambientDegC`. The terminals' limit does not: it guards the terminal, and does not cool or warm the wire.
 * The law ignores that warm metal resists more, and lugs drawing heat away; both are inside the table's own accuracy.
 * Missing where the cable has no ampacity. Source of the law: SRC-SQUARE-ROOT-LAW.
 */
export function heatingLaw(cable: RatedConductor, context: AmpacityContext): HeatingLaw | Missing {
  const rating = ratingOf(cable, context);
  if ('missing' in rating) return rating;
  return {
    ambientDegC: rating.surroundDegC,
    riseAtRatedK: rating.ratedDegC - rating.tableAmbientDegC,
    ampacityA: rating.base.value * rating.neighbours * cable.inParallel,
    status: weakest(rating.base.basis.status, 'common-practice'),
    assumed: rating.assumed,
  };
}

/** Temperature of the conductor at a current, °C. It is an estimate beyond about twice the ampacity, where insulation fails. */
export function temperatureAt(law: HeatingLaw, currentA: number): number {
  return law.ambientDegC + law.riseAtRatedK * (currentA / law.ampacityA) ** 2;
}
