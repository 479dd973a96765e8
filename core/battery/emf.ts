/** Rest voltage (EMF) of cells against state of charge and temperature. */
import type { Chemistry } from '../job/part.ts';
import type { ChemistryTables, EmfCurve, EmfPoint } from '../tables/chemistryTables.ts';
import type { Basis } from '../tables/status.ts';
import { weakest } from '../tables/status.ts';
import type { Banded } from './banded.ts';
import { along, placeIn } from './curve.ts';

export interface CellState {
  readonly chemistry: Chemistry;
  /** 0 to 1; values outside are taken as the nearer end. */
  readonly stateOfCharge: number;
  readonly temperatureDegC: number;
}

export interface Emf extends Banded {
  /** dE/dSoC, volts for the whole range of charge; the slope of the table's straight line there (never negative). */
  readonly slopeV: number;
}

/**
 * Rest voltage of one cell:
 *
 *   E(s, T) = E(s, 25 degC) + (dE/dT)(s) (T - 25)
 *
 * with straight lines between the points of the chemistry's table, whose points rise strictly. The band covers what the
 * published curves differ by, rest shorter than 24 h, and hysteresis; on the flat middle of iron phosphate it is far wider
 * than the curve is high, so a rest voltage there tells no state of charge. Where dE/dT is not known it is left out.
 * Sources: rows of `data/chemistry/emf.csv` and `emf_temperature.csv`.
 */
export function emfPerCell(state: CellState, tables: ChemistryTables): Emf {
  const curve = tables.emf[state.chemistry];
  const shift = temperatureShiftV(state, curve, tables);
  return emfOnCurve(curve, state.stateOfCharge, shift);
}

/** Rest voltage of `cells` cells in series (a block, or a whole string). */
export function emfOfCells(cells: number, state: CellState, tables: ChemistryTables): Emf {
  const one = emfPerCell(state, tables);
  return {
    ...one,
    value: one.value * cells,
    low: one.low * cells,
    high: one.high * cells,
    slopeV: one.slopeV * cells,
  };
}

/** Rest voltage of one cell on any curve of the tables, shifted by `shiftV`. */
export function emfOnCurve(curve: EmfCurve, stateOfCharge: number, shiftV = 0): Emf {
  const place = placeIn(curve.points, (point) => point.stateOfCharge, stateOfCharge);
  const { from, to } = place;
  const run = to.stateOfCharge - from.stateOfCharge;
  return {
    value: along(place, (point) => point.value) + shiftV,
    low: along(place, (point) => point.low) + shiftV,
    high: along(place, (point) => point.high) + shiftV,
    slopeV: run === 0 ? 0 : (to.value - from.value) / run,
    origin: 'default',
    basis: weakerBasis(pointsUsed(from, to, place.fraction)),
  };
}

function temperatureShiftV(state: CellState, curve: EmfCurve, tables: ChemistryTables): number {
  const slopes = tables.emfTemperature[state.chemistry];
  if (slopes.length === 0) return 0;
  const place = placeIn(slopes, (point) => point.stateOfCharge, state.stateOfCharge);
  return along(place, (point) => point.voltPerKelvin) * (state.temperatureDegC - curve.referenceDegC);
}

function pointsUsed(from: EmfPoint, to: EmfPoint, fraction: number): readonly EmfPoint[] {
  if (fraction === 0) return [from];
  return fraction === 1 ? [to] : [from, to];
}

/** The basis of the weakest point: an interpolated figure is no better than the worse of its neighbours. */
function weakerBasis(points: readonly EmfPoint[]): Basis {
  const status = weakest(...points.map((point) => point.basis.status));
  return points.find((point) => point.basis.status === status)!.basis;
}
