/** The device tables, parsed once from the rows beside this file. */
import type { BandRow, DeviceTables, Figure, RatingSeries } from '../../core/api.ts';
import { Defect } from '../../core/api.ts';
import { readRows } from '../chemistry/rows.ts';
import { basisOf, clauseFigure, figureOf } from '../conductors/figures.ts';
import bandsCsv from './bands.csv?raw';
import breakerCsv from './breaker-interrupt.csv?raw';
import largeBankCsv from './large-bank.csv?raw';
import pulsesCsv from './pulses.csv?raw';
import ratingsCsv from './ratings.csv?raw';
import selectivityCsv from './selectivity.csv?raw';
import interruptCsv from './typical-interrupt.csv?raw';

const STATUSES = ['published', 'common-practice', 'from-memory'] as const;

/** Ratings by series; a series is only as sure as its weakest rating. */
function ratingSeries(): ReadonlyMap<string, RatingSeries> {
  const series = new Map<string, RatingSeries>();
  for (const row of readRows('ratings.csv', ratingsCsv)) {
    const name = row.text('series');
    const rating = figureOf(row, 'ratingA');
    const before = series.get(name);
    const last = before?.ratingsA.at(-1);
    if (last !== undefined && last >= rating.value) throw new Defect(`ratings.csv: ${name} rises`);
    const remembered = rating.basis.status === 'from-memory';
    series.set(name, {
      ratingsA: [...(before?.ratingsA ?? []), rating.value],
      basis: before === undefined || remembered ? rating.basis : before.basis,
      fromMemoryA: [...(before?.fromMemoryA ?? []), ...(remembered ? [rating.value] : [])],
    });
  }
  return series;
}

/** Rows by type in lower case; an empty limit of the ratings is no limit. */
function bandRows(): ReadonlyMap<string, readonly BandRow[]> {
  const byType = new Map<string, BandRow[]>();
  for (const row of readRows('bands.csv', bandsCsv)) {
    const type = row.text('type');
    const rows = byType.get(type.toLowerCase()) ?? [];
    rows.push({
      type,
      fromA: row.optionalNumber('fromA') ?? 0,
      toA: row.optionalNumber('toA') ?? Number.POSITIVE_INFINITY,
      per: row.oneOf('per', ['rating', 'amperes']),
      at: row.number('at'),
      holdsS: row.optionalNumber('holdsS'),
      opensS: row.optionalNumber('opensS'),
      basis: basisOf(row),
      note: row.text('note'),
    });
    byType.set(type.toLowerCase(), rows);
  }
  return byType;
}

const ratios: ReadonlyMap<string, Figure> = new Map(
  readRows('selectivity.csv', selectivityCsv).map((row) => [row.text('name'), clauseFigure(row, 'value')]),
);

function ratio(name: string): Figure {
  const figure = ratios.get(name);
  if (figure === undefined) throw new Defect(`selectivity.csv has ${name}`);
  return figure;
}

const largeBank: ReadonlyMap<string, Figure> = new Map(
  readRows('large-bank.csv', largeBankCsv).map((row) => [row.text('name'), clauseFigure(row, 'value')]),
);

function largeBankFigure(name: string): Figure {
  const figure = largeBank.get(name);
  if (figure === undefined) throw new Defect(`large-bank.csv has ${name}`);
  return figure;
}

export const devices: DeviceTables = {
  ratings: ratingSeries(),
  typicalInterrupt: readRows('typical-interrupt.csv', interruptCsv).map((row) => ({
    type: row.text('type'),
    upToV: { value: row.number('upToV'), basis: { ...basisOf(row), status: row.oneOf('voltStatus', STATUSES) } },
    interruptA: figureOf(row, 'interruptA'),
    note: row.text('note'),
  })),
  breakerInterrupt: readRows('breaker-interrupt.csv', breakerCsv).map((row) => ({
    fromV: row.number('fromV'),
    toV: row.number('toV'),
    fromCrankingA: row.number('fromCrankingA'),
    toCrankingA: row.optionalNumber('toCrankingA'),
    mainA: clauseFigure(row, 'mainA'),
    branchA: clauseFigure(row, 'branchA'),
  })),
  bands: bandRows(),
  pulses: readRows('pulses.csv', pulsesCsv).map((row) => ({
    pulses: row.number('pulses'),
    share: figureOf(row, 'share'),
  })),
  selectivity: { sameGg: ratio('sameGg'), sameGgStep: ratio('sameGgStep'), others: ratio('others') },
  largeBank: {
    crankingA: largeBankFigure('crankingA'),
    capacityAh: largeBankFigure('capacityAh'),
    mainA: largeBankFigure('mainA'),
    fromShortA: largeBankFigure('fromShortA'),
    mainV: largeBankFigure('mainV'),
  },
};
