/** The conductor tables, parsed once from the rows beside this file. */
import type {
  CircularMilConstant,
  ConductorTables,
  Figure,
  MetricResistanceRow,
  UsResistanceRow,
} from '../../core/api.ts';
import { Defect } from '../../core/api.ts';
import { readRows } from '../chemistry/rows.ts';
import { iecLand, isoMarine, usLand, usMarine } from './ampacities.ts';
import autoCsv from './auto-areas.csv?raw';
import circularMilCsv from './circular-mil-constants.csv?raw';
import { constant } from './constants.ts';
import { basisOf, figureOf, optionalFigure, sizeOf, sources } from './figures.ts';
import iec60228Csv from './iec60228-resistance.csv?raw';
import usResistanceCsv from './nec-ch9-table8.csv?raw';
import saeCsv from './sae-areas.csv?raw';
import tinnedCsv from './tinned-conductivity.csv?raw';
import { withstand } from './withstand.ts';

const metricResistance: readonly MetricResistanceRow[] = readRows('iec60228-resistance.csv', iec60228Csv).map(
  (row) => ({
    areaMm2: row.number('areaMm2'),
    class1Plain: optionalFigure(row, 'class1Plain'),
    class1Tinned: optionalFigure(row, 'class1Tinned'),
    class2Plain: optionalFigure(row, 'class2Plain'),
    class2Tinned: optionalFigure(row, 'class2Tinned'),
    class5Plain: optionalFigure(row, 'class5Plain'),
    class5Tinned: optionalFigure(row, 'class5Tinned'),
    aluminium: optionalFigure(row, 'aluminium'),
  }),
);

const usResistance: readonly UsResistanceRow[] = readRows('nec-ch9-table8.csv', usResistanceCsv).map((row) => ({
  size: sizeOf(row),
  areaCmil: row.number('areaCmil'),
  wires: row.number('wires'),
  construction: row.oneOf('construction', ['solid', 'stranded']),
  plain: figureOf(row, 'plain'),
  coated: figureOf(row, 'coated'),
  aluminium: figureOf(row, 'aluminium'),
}));

const circularMilConstants: readonly CircularMilConstant[] = readRows('circular-mil-constants.csv', circularMilCsv).map(
  (row) => ({ metal: row.oneOf('metal', ['copper', 'aluminium']), use: row.text('use'), k: figureOf(row, 'k') }),
);

export const conductors: ConductorTables = {
  metals: {
    copper: { resistivityOhmMm2PerM: constant('copper-resistivity'), alphaPerK: constant('copper-alpha') },
    aluminium: { resistivityOhmMm2PerM: constant('aluminium-resistivity'), alphaPerK: constant('aluminium-alpha') },
  },
  layFactor: constant('lay-factor'),
  tinned: readRows('tinned-conductivity.csv', tinnedCsv).map((row) => ({
    fromMm: row.number('fromMm'),
    toMm: row.number('toMm'),
    conductivity: figureOf(row, 'conductivity'),
  })),
  flexibleWireMm: constant('flexible-wire'),
  awgFormula: { source: 'SRC-ASTM-B258', text: sources.get('SRC-ASTM-B258') ?? '', status: 'published' },
  metricNominal: {
    source: 'SRC-IEC60228',
    text: `${sources.get('SRC-IEC60228') ?? ''}, nominal area`,
    status: 'published',
  },
  metricResistance,
  usResistance,
  saeAreaCmil: saeAreas(),
  autoAreaMm2: autoAreas(),
  circularMilConstants,
  usLand,
  usMarine,
  isoMarine,
  iecLand,
  defaultInsulationDegC: {
    'us-land': constant('us-land-insulation'),
    'us-marine': constant('us-marine-insulation'),
    'iso-marine': constant('iso-marine-insulation'),
    'iec-land': constant('iec-land-insulation'),
  },
  engineSpaceDegC: constant('engine-space'),
  withstand,
};

function saeAreas(): ReadonlyMap<number, Figure> {
  const areas = new Map<number, Figure>();
  for (const row of readRows('sae-areas.csv', saeCsv)) {
    const size = sizeOf(row);
    if (size.system !== 'sae') throw new Defect('the SAE table holds SAE sizes');
    areas.set(size.gauge, { value: row.number('areaCmil'), basis: basisOf(row) });
  }
  return areas;
}

function autoAreas(): ReadonlyMap<number, Figure> {
  const areas = new Map<number, Figure>();
  for (const row of readRows('auto-areas.csv', autoCsv)) {
    const size = sizeOf(row);
    if (size.system !== 'auto') throw new Defect('the auto table holds auto sizes');
    areas.set(size.outsideDiameterMm, { value: row.number('areaMm2'), basis: basisOf(row) });
  }
  return areas;
}
