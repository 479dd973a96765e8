/** Rest voltage of a whole string over all states of charge, and back again. */
import { emfOfCells } from '../../battery/emf.ts';
import type { StringFacts } from '../../battery/stringSource.ts';
import type { ChemistryTables } from '../../tables/chemistryTables.ts';
import { firstAt, type StraightLine } from './straightLine.ts';

/** What a hand meter well used may be off by at one block, V (common practice, no source). */
const METER_V = 0.01;

/** So much of the charge must a reading leave open for a curve to be called flat there (common practice, no source). */
const FLAT_RANGE = 0.2;
/**
 * And so little must the volts change somewhere in between, as a part of themselves for a whole charge: 1 % on the plateau of iron
 * phosphate, 6 % and more with lead (common practice, no source).
 */
const FLAT_SLOPE = 0.03;

type Bound = 'value' | 'low' | 'high';

/** x: state of charge; y: volts by the chemistry's curve alone. Never falls. */
export function restCurve(facts: StringFacts, tables: ChemistryTables, bound: Bound = 'value'): StraightLine {
  const { string, cells, temperatureDegC } = facts;
  const { chemistry } = string;
  const places = [
    ...new Set([
      ...tables.emf[chemistry].points.map(({ stateOfCharge }) => stateOfCharge),
      ...tables.emfTemperature[chemistry].map(({ stateOfCharge }) => stateOfCharge),
    ]),
  ];
  places.sort((one, other) => one - other);
  let highest = Number.NEGATIVE_INFINITY;
  return places.map((stateOfCharge) => {
    highest = Math.max(highest, emfOfCells(cells, { chemistry, stateOfCharge, temperatureDegC }, tables)[bound]);
    return { x: stateOfCharge, y: highest };
  });
}

/** States of charge that a rest voltage allows: the curve's own band, and 10 mV a block for the meter. */
export function chargesAllowed(facts: StringFacts, volts: number, tables: ChemistryTables): readonly [number, number] {
  const meterV = METER_V * facts.string.blocksInSeries;
  const least = firstAt(restCurve(facts, tables, 'high'), volts - meterV);
  return [least, Math.max(least, firstAt(restCurve(facts, tables, 'low'), volts + meterV))];
}

/** Whether the curve has a plateau between the states of charge that a reading leaves open: equal volts then prove no equal charge. */
export function isFlatOver(
  facts: StringFacts,
  [low, high]: readonly [number, number],
  tables: ChemistryTables,
): boolean {
  if (high - low < FLAT_RANGE) return false;
  const curve = restCurve(facts, tables);
  return curve.some((to, index) => {
    const from = curve[index - 1];
    if (from === undefined || to.x <= low || from.x >= high) return false;
    return (to.y - from.y) / (to.x - from.x) < FLAT_SLOPE * from.y;
  });
}
