/** The chemistry tables, parsed once from the published and remembered rows beside this file. */
import type {
  Basis,
  CellResistance,
  Chemistry,
  ChemistryTables,
  EmfCurve,
  EmfPoint,
  FactorPoint,
  LimitQuantity,
  ModelParameter,
  Spread,
} from '../../core/api.ts';
import { Defect } from '../../core/api.ts';
import activationEnergyCsv from './activation_energy.csv?raw';
import capacityTemperatureCsv from './capacity_temperature.csv?raw';
import cellVoltsCsv from './cell_volts.csv?raw';
import chargeKeptCsv from './charge_kept.csv?raw';
import emfCsv from './emf.csv?raw';
import emfTemperatureCsv from './emf_temperature.csv?raw';
import freezingCsv from './freezing.csv?raw';
import gassingCsv from './gassing.csv?raw';
import limitsCsv from './limits.csv?raw';
import modelParametersCsv from './model_parameters.csv?raw';
import relaxationCsv from './relaxation.csv?raw';
import resistanceCsv from './resistance.csv?raw';
import resistanceEvidenceCsv from './resistance_evidence.csv?raw';
import resistanceFactorsCsv from './resistance_factors.csv?raw';
import type { Row } from './rows.ts';
import { byChemistry, readRows } from './rows.ts';
import sourcesCsv from './sources.csv?raw';

const LIMIT_QUANTITIES: readonly LimitQuantity[] = [
  'absorptionV',
  'floatV',
  'equaliseV',
  'gassingV',
  'compensationVPerK',
  'chargeRate',
  'chargeRateMax',
  'dischargeRate',
  'dischargeRateShort',
  'endV',
  'loadCutV',
  'chargeLowestDegC',
  'chargeHighestDegC',
  'dischargeLowestDegC',
  'dischargeHighestDegC',
  'depthOfDischarge',
  'selfDischargePerMonth',
  'chargeEfficiency',
  'joinWithinV',
];

const sources: ReadonlyMap<string, string> = new Map(
  readRows('sources.csv', sourcesCsv).map((row) => [row.text('source'), row.text('text')]),
);

const basisOf = (row: Row): Basis => row.basis(sources);

/** A spread from three columns, divided by the number of cells that the row stands for. */
function spread(row: Row, [low, value, high]: readonly [string, string, string], divisor = 1): Spread {
  const found = {
    low: row.number(low) / divisor,
    value: row.number(value) / divisor,
    high: row.number(high) / divisor,
    basis: basisOf(row),
  };
  if (!(found.low <= found.value && found.value <= found.high)) {
    throw new Defect(`spread out of order: ${found.low}, ${found.value}, ${found.high} (${found.basis.source})`);
  }
  return found;
}

const LOW_MIDDLE_HIGH = ['low', 'middle', 'high'] as const;
const LOW_VALUE_HIGH = ['low', 'value', 'high'] as const;

function emfCurves(use: 'default' | 'other'): readonly EmfCurve[] {
  const points = new Map<string, { chemistry: Chemistry; points: EmfPoint[] }>();
  for (const row of readRows('emf.csv', emfCsv)) {
    if (row.oneOf('use', ['default', 'other']) !== use) continue;
    const name = row.text('curve');
    const curve = points.get(name) ?? { chemistry: row.chemistry(), points: [] };
    points.set(name, curve);
    const stateOfCharge = row.number('state_of_charge');
    curve.points.push({ stateOfCharge, ...spread(row, ['low_v', 'emf_v', 'high_v'], row.number('cells')) });
  }
  // Every curve in the file is for a cell at 25 degC or "room temperature".
  return [...points].map(([name, curve]) => ({ name, referenceDegC: 25, ...curve }));
}

function defaultEmf(): ChemistryTables['emf'] {
  const curves = emfCurves('default');
  return byChemistry([], (_rows, chemistry) => {
    const [curve, second] = curves.filter((candidate) => candidate.chemistry === chemistry);
    if (curve === undefined || second !== undefined) throw new Defect(`emf.csv: one default curve for ${chemistry}`);
    return curve;
  });
}

function emfTemperature(): ChemistryTables['emfTemperature'] {
  return byChemistry(readRows('emf_temperature.csv', emfTemperatureCsv), (rows) =>
    rows.map((row) => ({
      // A row without a state of charge holds at every state of charge.
      stateOfCharge: row.optionalNumber('state_of_charge') ?? 0,
      voltPerKelvin: row.number('mv_per_kelvin_cell') / 1000,
      basis: basisOf(row),
    })),
  );
}

function only(rows: readonly Row[], what: string): Row {
  const [row, second] = rows;
  if (row === undefined || second !== undefined) throw new Defect(`${what}: exactly one row expected`);
  return row;
}

function resistance(): ChemistryTables['resistance'] {
  return byChemistry(readRows('resistance.csv', resistanceCsv), (rows, chemistry): CellResistance => {
    const part = (name: string) => rows.filter((row) => row.text('part') === name);
    const perCell = (name: string) => {
      const row = only(part(name), `resistance.csv ${chemistry} ${name}`);
      return spread(row, LOW_MIDDLE_HIGH, row.number('cells'));
    };
    const [board] = part('board');
    return {
      fastOhmAh: perCell('fast'),
      slowOhmAh: perCell('slow'),
      boardOhm: board === undefined ? undefined : spread(board, LOW_MIDDLE_HIGH),
    };
  });
}

function factors(scale: 'state_of_charge' | 'age_years'): Readonly<Record<Chemistry, readonly FactorPoint[]>> {
  const rows = readRows('resistance_factors.csv', resistanceFactorsCsv).filter((row) => row.text('scale') === scale);
  return byChemistry(rows, (own) => own.map((row) => ({ at: row.number('at'), ...spread(row, LOW_MIDDLE_HIGH) })));
}

/** A limit prints its note beside its source. */
function limit(row: Row): Spread {
  const found = spread(row, LOW_VALUE_HIGH, row.number('cells'));
  const note = row.text('note');
  return note === '' ? found : { ...found, basis: { ...found.basis, text: `${found.basis.text}; ${note}` } };
}

function parameterSets(): ChemistryTables['parameterSets'] {
  const sets = new Map<string, Map<string, ModelParameter>>();
  for (const row of readRows('model_parameters.csv', modelParametersCsv)) {
    const name = row.text('set');
    const set = sets.get(name) ?? new Map<string, ModelParameter>();
    sets.set(name, set);
    const parameter = {
      value: row.number('value'),
      unit: row.text('unit'),
      note: row.text('note'),
      basis: basisOf(row),
    };
    set.set(row.text('parameter'), parameter);
  }
  return sets;
}

export const chemistryTables: ChemistryTables = {
  emf: defaultEmf(),
  otherEmf: new Map(emfCurves('other').map((curve) => [curve.name, curve])),
  emfTemperature: emfTemperature(),
  cellVolts: byChemistry(readRows('cell_volts.csv', cellVoltsCsv), (rows, chemistry) => {
    const row = only(rows, `cell_volts.csv ${chemistry}`);
    return {
      nominalV: row.number('nominal_v'),
      lowestV: row.number('lowest_v'),
      highestV: row.number('highest_v'),
      basis: basisOf(row),
    };
  }),
  resistance: resistance(),
  resistanceByStateOfCharge: factors('state_of_charge'),
  resistanceByAge: factors('age_years'),
  activationEnergy: byChemistry(readRows('activation_energy.csv', activationEnergyCsv), (rows, chemistry) =>
    spread(only(rows, `activation_energy.csv ${chemistry}`), ['low_j_per_mol', 'middle_j_per_mol', 'high_j_per_mol']),
  ),
  chargeKept: byChemistry(readRows('charge_kept.csv', chargeKeptCsv), (rows) =>
    rows.map((row) => ({ at: row.number('at'), ...spread(row, LOW_MIDDLE_HIGH) })),
  ),
  relaxation: byChemistry(readRows('relaxation.csv', relaxationCsv), (rows) =>
    rows.map((row) => ({ share: row.number('share'), tauS: row.number('tau_s'), basis: basisOf(row) })),
  ),
  limits: byChemistry(
    readRows('limits.csv', limitsCsv),
    (rows) => new Map(rows.map((row) => [row.oneOf('quantity', LIMIT_QUANTITIES), limit(row)])),
  ),
  capacityByTemperature: byChemistry(readRows('capacity_temperature.csv', capacityTemperatureCsv), (rows) =>
    rows.map((row) => ({
      temperatureDegC: row.number('temperature_deg_c'),
      fraction: row.number('fraction'),
      basis: basisOf(row),
    })),
  ),
  freezing: readRows('freezing.csv', freezingCsv).map((row) => ({
    stateOfCharge: row.number('state_of_charge'),
    temperatureDegC: row.number('freezes_deg_c'),
    basis: basisOf(row),
  })),
  gassing: readRows('gassing.csv', gassingCsv).map((row) => ({
    standard: row.text('standard'),
    cellType: row.text('cell_type'),
    mode: row.text('mode'),
    cellV: row.optionalNumber('cell_v'),
    milliampPerAh: row.number('milliamp_per_ah'),
    basis: basisOf(row),
  })),
  resistanceEvidence: readRows('resistance_evidence.csv', resistanceEvidenceCsv).map((row) => ({
    item: row.text('item'),
    chemistry: row.text('chemistry') === '' ? undefined : row.chemistry(),
    model: row.oneOf('model', ['fast', 'slow']),
    cells: row.number('cells'),
    lowOhmAh: row.optionalNumber('low_ohm_ah'),
    highOhmAh: row.number('high_ohm_ah'),
    method: row.text('method'),
    basis: basisOf(row),
  })),
  parameterSets: parameterSets(),
};
