/** Ampacity against published tables that nobody here wrote. */
import { describe, expect, it } from 'vitest';
import { type AmpacityContext, ampacity, sizeText } from '../../core/api.ts';
import { squareRootFactor } from '../../core/conductor/rating.ts';
import { tables } from '../../data/index.ts';
import bundledCsv from './conductor-vectors/boat-105C-bundled.csv?raw';
import { cable, found, numberOf, type TestCable, vectorRows } from './conductorVectors.ts';

const conductors = tables.conductors;

function rated(conductor: TestCable, context: Partial<AmpacityContext> & Pick<AmpacityContext, 'practice'>) {
  return found(ampacity(conductor, { ambientDegC: 30, tables: conductors, ...context }));
}

/** 33 CFR 183.425 table 5, typed from a second reading of the regulation (federal.elaws.us), independent of `data/`. */
const TABLE_5: Readonly<Record<string, readonly number[]>> = {
  '18 AWG': [10, 10, 15, 20, 20, 25, 25],
  '16 AWG': [15, 15, 20, 25, 25, 30, 35],
  '14 AWG': [20, 20, 25, 30, 35, 40, 45],
  '12 AWG': [25, 25, 35, 40, 45, 50, 55],
  '10 AWG': [40, 40, 50, 55, 60, 70, 70],
  '8 AWG': [55, 65, 70, 70, 80, 90, 100],
  '6 AWG': [80, 95, 100, 100, 120, 125, 135],
  '4 AWG': [105, 125, 130, 135, 160, 170, 180],
  '3 AWG': [120, 145, 150, 155, 180, 195, 210],
  '2 AWG': [140, 170, 175, 180, 210, 225, 240],
  '1 AWG': [165, 195, 210, 210, 245, 265, 280],
  '1/0 AWG': [195, 230, 245, 245, 285, 305, 325],
  '2/0 AWG': [225, 265, 285, 285, 330, 355, 370],
  '3/0 AWG': [260, 310, 330, 330, 385, 410, 430],
  '4/0 AWG': [300, 360, 385, 385, 445, 475, 510],
};
const TABLE_5_DEG_C = [60, 75, 80, 90, 105, 125, 200];

describe('33 CFR 183.425 table 5, all 105 cells', () => {
  it.each(Object.entries(TABLE_5))('%s', (name, amperes) => {
    const answers = TABLE_5_DEG_C.map((insulationDegC) =>
      rated(cable(name, { insulationDegC }), { practice: 'us-marine' }),
    );
    expect(answers.map((answer) => answer.finalA)).toEqual(amperes);
    expect(answers.every((answer) => answer.status === 'published')).toBe(true);
  });
});

describe('112 cells of a boat-cable table, 105 °C, outside and inside engine spaces, by bundle', () => {
  const rows = vectorRows(bundledCsv, 14);
  it.each(rows.map((row) => [row['size'] ?? '', row] as const))('%s', (name, row) => {
    for (const loadedConductors of [2, 3, 5, 10]) {
      for (const [place, run] of [
        ['outside', 'bundle'],
        ['inside', 'engine-space'],
      ] as const) {
        const answer = rated(cable(name, { insulationDegC: 105, run, loadedConductors }), {
          practice: 'us-marine',
          systemV: 60,
        });
        // The print rounds to 0.1 A and cuts some figures off instead (23 for 22.95, 125 for 124.95).
        expect(Math.abs(answer.finalA - numberOf(row, `${place}${loadedConductors}`))).toBeLessThanOrEqual(0.1 + 1e-9);
      }
    }
  });
});

describe('NEC table 310.16 and its predecessor', () => {
  const cell = (edition: 'current' | 'before2011', name: string, column: string) =>
    conductors.usLand[edition].rows.find((row) => sizeText(row.size) === name)?.amperesA.get(column)?.value;

  /** Where the two editions part, as stated by reference pages of each: [size, column, 2011 to 2023, before 2011]. */
  const differences: readonly (readonly [string, string, number, number])[] = [
    ['14 AWG', 'copper-60', 15, 20],
    ['12 AWG', 'copper-60', 20, 25],
    ['3 AWG', 'copper-90', 115, 110],
    ['1 AWG', 'copper-90', 145, 150],
    ['12 AWG', 'aluminium-60', 15, 20],
    ['8 AWG', 'aluminium-60', 35, 30],
    ['6 AWG', 'aluminium-90', 55, 60],
    ['300 kcmil', 'aluminium-60', 195, 190],
    ['300 kcmil', 'aluminium-90', 260, 255],
  ];
  it.each(differences)('%s %s: %i A now, %i A before 2011', (name, column, now, before) => {
    expect(cell('current', name, column)).toBe(now);
    expect(cell('before2011', name, column)).toBe(before);
  });

  it('differ nowhere else', () => {
    const names = new Set(differences.map(([name, column]) => `${name} ${column}`));
    for (const row of conductors.usLand.current.rows) {
      for (const [column, figure] of row.amperesA) {
        const name = sizeText(row.size);
        expect(cell('before2011', name, column) !== figure.value).toBe(names.has(`${name} ${column}`));
      }
    }
  });

  it.each([
    ['14 AWG', 15, 20, 25],
    ['6 AWG', 55, 65, 75],
    ['1/0 AWG', 125, 150, 170],
    ['4/0 AWG', 195, 230, 260],
    ['500 kcmil', 320, 380, 430],
  ])('%s copper carries %i, %i, %i A at 60, 75, 90 °C', (name, at60, at75, at90) => {
    const base = (insulationDegC: number) => rated(cable(name, { insulationDegC }), { practice: 'us-land' }).baseA;
    expect([base(60), base(75), base(90)]).toEqual([at60, at75, at90]);
    // Hotter insulation uses the 90 °C column: there is none above.
    expect(base(105)).toBe(at90);
  });

  it('14, 12 and 10 AWG copper may carry no device above 15, 20 and 30 A, aluminium 15 and 25 A (240.4(D))', () => {
    const caps = tables.practices['us-land'].smallWireCaps?.capsA;
    expect([14, 12, 10].map((gauge) => caps?.get(gauge))).toEqual([15, 20, 30]);
    const aluminium = tables.practices['us-land'].smallAluminiumCaps?.capsA;
    expect([12, 10].map((gauge) => aluminium?.get(gauge))).toEqual([15, 25]);
  });
});

describe('factor tables against the square-root law of heating', () => {
  const law = (ratedDegC: number, ambientDegC: number) =>
    squareRootFactor({ ratedDegC, ambientDegC, tableAmbientDegC: 30 });

  it('every NEC ambient factor is the law at the top of its band, to the 0.01 that is printed', () => {
    for (const band of conductors.usLand.ambient) {
      for (const [column, figure] of band.factors) {
        expect(Math.abs(figure.value - law(Number(column), band.to ?? 0))).toBeLessThanOrEqual(0.0055);
      }
    }
  });

  it('every IEC 60364 ambient factor is the law, to the 0.01 that is printed', () => {
    for (const band of conductors.iecLand.ambient) {
      for (const [column, figure] of band.factors) {
        const ratedDegC = column === 'pvc70' ? 70 : 90;
        expect(Math.abs(figure.value - law(ratedDegC, band.to ?? 0))).toBeLessThanOrEqual(0.0065);
      }
    }
  });

  it('every engine-space factor of 33 CFR note 1 is the law at 50 °C, except that of 200 °C', () => {
    for (const [column, figure] of conductors.usMarine.engineSpace) {
      const agrees = Math.abs(figure.value - law(Number(column), 50)) <= 0.0065;
      expect(agrees).toBe(column !== '200');
    }
  });
});

describe('IEC 60364-5-52, two loaded conductors', () => {
  /** SANS 10142-1:2019 table 6.3(a), two loaded conductors: method, 1 to 16 mm². */
  const seen: Readonly<Record<string, readonly number[]>> = {
    B2: [13, 16.5, 23, 30, 38, 52, 69],
    C: [15, 19.5, 27, 36, 46, 63, 85],
  };
  const sizes = ['1 mm2', '1.5 mm2', '2.5 mm2', '4 mm2', '6 mm2', '10 mm2', '16 mm2'];
  it.each([
    ['conduit', 'B2'],
    ['free-air', 'C'],
  ] as const)('%s is reference method %s', (run, method) => {
    const answers = sizes.map((name) => rated(cable(name, { run, insulationDegC: 70 }), { practice: 'iec-land' }));
    expect(answers.map((answer) => answer.finalA)).toEqual(seen[method]);
    expect(answers.every((answer) => answer.status === 'published')).toBe(true);
  });

  it('flexible cable with 60 °C insulation carries the direct-current ratings of BS 7671', () => {
    const at = (name: string) =>
      rated(cable(name, { run: 'free-air', insulationDegC: 60 }), { practice: 'iec-land' }).finalA;
    expect(['4 mm2', '25 mm2', '70 mm2', '240 mm2'].map(at)).toEqual([30, 97, 216, 471]);
  });
});
