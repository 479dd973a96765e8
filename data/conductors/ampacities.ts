/** The ampacity tables of the four practices, parsed once from the rows beside this file. */
import type { AmpacityTable, BoatAmpacity, FactorBand, Figure, IecAmpacity, UsLandAmpacity } from '../../core/api.ts';
import { readRows } from '../chemistry/rows.ts';
import flexible60Csv from './bs7671-flex60.csv?raw';
import note1Csv from './cfr33-183-425-note1.csv?raw';
import note2Csv from './cfr33-183-425-note2.csv?raw';
import table5Csv from './cfr33-183-425-table5.csv?raw';
import { constant } from './constants.ts';
import { cellsOf, figureOf, sizeOf, sources } from './figures.ts';
import iecAmbientCsv from './iec60364-ambient.csv?raw';
import iecGroupingCsv from './iec60364-grouping.csv?raw';
import pvc70Csv from './iec60364-pvc70.csv?raw';
import xlpe90Csv from './iec60364-xlpe90.csv?raw';
import isoCsv from './iso13297-ampacity.csv?raw';
import isoBundlingCsv from './iso13297-bundling.csv?raw';
import isoEngineCsv from './iso13297-engine-space.csv?raw';
import nec31016Csv from './nec-310-16.csv?raw';
import nec31016OldCsv from './nec-310-16-before-2011.csv?raw';
import necAmbientCsv from './nec-ambient.csv?raw';
import necBundlingCsv from './nec-bundling.csv?raw';

/** Every table held is for 30 °C surroundings. */
const TABLE_AMBIENT_DEG_C = 30;

type Statuses = 'alike' | 'mixed';
interface Text {
  readonly name: string;
  readonly csv: string;
  readonly statuses?: Statuses;
}

function ampacityTable(text: Text, source: string, columns: readonly string[]): AmpacityTable {
  const rows = readRows(text.name, text.csv);
  return {
    name: sources.get(source) ?? source,
    tableAmbientDegC: TABLE_AMBIENT_DEG_C,
    rows: rows.map((row) => ({ size: sizeOf(row), amperesA: cellsOf(row, columns, text.statuses) })),
  };
}

function factorBands(text: Text, columns: readonly string[]): readonly FactorBand[] {
  return readRows(text.name, text.csv).map((row) => ({
    from: row.optionalNumber('from'),
    to: row.optionalNumber('to'),
    factors: cellsOf(row, columns, text.statuses),
  }));
}

function byInsulation(text: Text): ReadonlyMap<string, Figure> {
  return new Map(
    readRows(text.name, text.csv).map((row) => [String(row.number('insulationDegC')), figureOf(row, 'factor')]),
  );
}

const necColumns = ['copper-60', 'copper-75', 'copper-90', 'aluminium-60', 'aluminium-75', 'aluminium-90'];
const methods = ['A1', 'A2', 'B1', 'B2', 'C'];

export const usLand: UsLandAmpacity = {
  current: ampacityTable({ name: 'nec-310-16.csv', csv: nec31016Csv }, 'SRC-NEC-310-16', necColumns),
  before2011: ampacityTable(
    { name: 'nec-310-16-before-2011.csv', csv: nec31016OldCsv },
    'SRC-NEC-310-16-OLD',
    necColumns,
  ),
  ambient: factorBands({ name: 'nec-ambient.csv', csv: necAmbientCsv }, ['60', '75', '90']),
  bundling: factorBands({ name: 'nec-bundling.csv', csv: necBundlingCsv }, ['all']),
  smallTerminalDegC: constant('us-land-small-terminal'),
  largeTerminalDegC: constant('us-land-large-terminal'),
};

export const usMarine: BoatAmpacity = {
  table: ampacityTable({ name: 'cfr33-183-425-table5.csv', csv: table5Csv }, 'SRC-CFR33-183-425-T5', [
    '60',
    '75',
    '80',
    '90',
    '105',
    '125',
    '200',
  ]),
  engineSpaceDegC: constant('us-marine-engine-space'),
  engineSpace: byInsulation({ name: 'cfr33-183-425-note1.csv', csv: note1Csv }),
  bundling: factorBands({ name: 'cfr33-183-425-note2.csv', csv: note2Csv }, ['all']),
  bundlingFromV: constant('us-marine-bundling-from'),
};

export const isoMarine: BoatAmpacity = {
  table: ampacityTable({ name: 'iso13297-ampacity.csv', csv: isoCsv }, 'SRC-ISO-13297-A', [
    '60',
    '70',
    '85',
    '105',
    '125',
    '200',
  ]),
  engineSpaceDegC: constant('iso-marine-engine-space'),
  engineSpace: byInsulation({ name: 'iso13297-engine-space.csv', csv: isoEngineCsv }),
  bundling: factorBands({ name: 'iso13297-bundling.csv', csv: isoBundlingCsv }, ['all']),
  bundlingFromV: undefined,
};

export const iecLand: IecAmpacity = {
  pvc70: ampacityTable({ name: 'iec60364-pvc70.csv', csv: pvc70Csv, statuses: 'mixed' }, 'SRC-IEC60364-PVC', methods),
  xlpe90: ampacityTable({ name: 'iec60364-xlpe90.csv', csv: xlpe90Csv }, 'SRC-IEC60364-XLPE', methods),
  flexible60: ampacityTable({ name: 'bs7671-flex60.csv', csv: flexible60Csv }, 'SRC-BS7671-FLEX60', ['pair']),
  ambient: factorBands({ name: 'iec60364-ambient.csv', csv: iecAmbientCsv, statuses: 'mixed' }, ['pvc70', 'xlpe90']),
  grouping: factorBands({ name: 'iec60364-grouping.csv', csv: iecGroupingCsv }, ['bunched', 'single-layer']),
};
