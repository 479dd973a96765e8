/**
 * Worked examples as printed in public texts, each with its source. Lengths are in feet where the source prints feet. Two prints are
 * wrong; they are here so that nobody brings them into agreement.
 */
import { describe, expect, it } from 'vitest';
import {
  type AmpacityContext,
  ampacity,
  areaOf,
  type ConductorSize,
  circularMilDropV,
  circularMilK,
  circularMilsNeeded,
  conductorDropV,
  conductorResistance,
  lengthForSameDropM,
  millivoltsPerAmpereMetre,
  pairDropV,
  resistanceAt,
  resistanceTo20,
  sizesOf,
  sizeText,
  smallestSize,
} from '../../core/api.ts';
import { MM2_PER_CMIL } from '../../core/conductor/size.ts';
import { tables } from '../../data/index.ts';
import kCsv from './conductor-vectors/circular-mil-temperature.csv?raw';
import faaCsv from './conductor-vectors/faa-table-11-9.csv?raw';
import threeLoadedCsv from './conductor-vectors/iec60364-pvc70-three-loaded.csv?raw';
import { cable, found, M_PER_FT, numberOf, size, type TestCable, vectorRows } from './conductorVectors.ts';

const conductors = tables.conductors;
const copperAlpha = conductors.metals.copper.alphaPerK.value;

const rated = (conductor: TestCable, context: Partial<AmpacityContext> & Pick<AmpacityContext, 'practice'>) =>
  found(ampacity(conductor, { ambientDegC: 30, tables: conductors, ...context }));
const cmilOf = (candidate: ConductorSize) => found(areaOf(candidate, conductors)).value / MM2_PER_CMIL;
const smallestByArea = (system: 'awg' | 'sae', cmil: number) => {
  const chosen = smallestSize(sizesOf(system, conductors), (candidate) => cmilOf(candidate) >= cmil);
  return chosen === undefined ? 'none' : sizeText(chosen);
};

describe('FAA AC 43.13-1B CHG 1, tables 11-7 and 11-8: drop = ohm/ft × ft × A, length being the whole conductor', () => {
  it.each([
    [0.00044, 107, 0.942, 0.001],
    [0.00028, 90, 0.504, 0.001],
    // Printed 3.6 for 3.555: rounded up by 0.045 V.
    [0.00202, 88, 3.6, 0.05],
    [0.00306, 100, 6.12, 0.001],
    [0.00126, 39, 0.98, 0.005],
    [0.00126, 156, 3.93, 0.005],
    [0.00126, 273, 6.88, 0.005],
  ])('%f ohm/ft, %i ft, 20 A: %f V', (ohmPerFt, feet, printedV, tolerance) => {
    const dropV = conductorDropV({ currentA: 20, resistanceOhm: ohmPerFt * feet });
    expect(Math.abs(dropV - printedV)).toBeLessThanOrEqual(tolerance);
  });

  it('misprint, not reproduced: 0.00126 ohm/ft × 19.5 ft × 20 A is 0.491 V, not the printed 0.366 V', () => {
    const dropV = conductorDropV({ currentA: 20, resistanceOhm: 0.00126 * 19.5 });
    expect(dropV).toBeCloseTo(0.4914, 4);
    expect(Math.abs(dropV - 0.366)).toBeGreaterThan(0.1);
  });

  it('example 1 (page 11-26): 50 ft with return, 20 A, 1 V allowed at 28 V: 8 AWG', () => {
    const dropByName = new Map(
      vectorRows(faaCsv, 17).map((row) => [
        row['size'],
        conductorDropV({ currentA: 20, resistanceOhm: (numberOf(row, 'ohmPer1000Ft') / 1000) * 50 }),
      ]),
    );
    const chosen = smallestSize(
      sizesOf('awg', conductors),
      (candidate) => (dropByName.get(sizeText(candidate)) ?? 99) <= 1,
    );
    expect(chosen).toEqual(size('8 AWG'));
    expect(dropByName.get('10 AWG')).toBeCloseTo(1.26, 6);
    expect(dropByName.get('8 AWG')).toBeCloseTo(0.7, 6);
  });
});

describe('circular-mil form of the marine trade: K = 10.75, length out and back', () => {
  it.each([
    // 3 % of 12 V, positive run 11 ft and negative run 10 ft.
    [0.36, 21, 10, 6271],
    // 3 % of 32 V.
    [0.96, 21, 10, 2352],
  ])('%f V over %i ft at %i A asks for %i circular mils', (allowedDropV, feet, currentA, printed) => {
    const cmil = circularMilsNeeded({ kOhmCmilPerFt: 10.75, currentA, outAndBackM: feet * M_PER_FT, allowedDropV });
    expect(Math.abs(cmil - printed)).toBeLessThanOrEqual(1);
  });

  it('6271 circular mils is 12 AWG, but 10 of SAE-sized wire', () => {
    expect(smallestByArea('awg', 6271)).toBe('12 AWG');
    expect(smallestByArea('sae', 6271)).toBe('10 SAE');
  });

  it('12 V, 10 %, 10 A, 21 ft in all: 16 AWG', () => {
    const cmil = circularMilsNeeded({
      kOhmCmilPerFt: 10.75,
      currentA: 10,
      outAndBackM: 21 * M_PER_FT,
      allowedDropV: 1.2,
    });
    expect(smallestByArea('awg', cmil)).toBe('16 AWG');
  });

  it('starter cable, K = 12.2 at 65 °C, 300 A, 4.5 + 4 ft, 0.36 V: 86.42 kcmil, so 1/0 AWG', () => {
    const cmil = circularMilsNeeded({
      kOhmCmilPerFt: 12.2,
      currentA: 300,
      outAndBackM: 8.5 * M_PER_FT,
      allowedDropV: 0.36,
    });
    expect(Math.abs(cmil / 1000 - 86.42)).toBeLessThanOrEqual(0.01);
    expect(smallestByArea('awg', cmil)).toBe('1/0 AWG');
  });

  it('feet times amperes: 12 V, 10 %, 40 ft in all, 45 A: 8 AWG; 8 SAE would fail', () => {
    const cmil = circularMilsNeeded({
      kOhmCmilPerFt: 10.75,
      currentA: 45,
      outAndBackM: 40 * M_PER_FT,
      allowedDropV: 1.2,
    });
    expect(smallestByArea('awg', cmil)).toBe('8 AWG');
    expect(smallestByArea('sae', cmil)).toBe('6 SAE');
  });

  it('feet times amperes: 24 V, 3 %, 10 ft in all, 100 A, 105 °C: drop asks for 8 AWG, ampacity for 6 AWG', () => {
    const cmil = circularMilsNeeded({
      kOhmCmilPerFt: 10.75,
      currentA: 100,
      outAndBackM: 10 * M_PER_FT,
      allowedDropV: 0.72,
    });
    expect(smallestByArea('awg', cmil)).toBe('8 AWG');
    const carries = (candidate: ConductorSize) =>
      rated(cable('1 AWG', { size: candidate, insulationDegC: 105 }), { practice: 'us-marine', systemV: 24 }).finalA;
    const chosen = smallestSize(
      sizesOf('awg', conductors),
      (candidate) => cmilOf(candidate) >= cmil && carries(candidate) >= 100,
    );
    expect(chosen).toEqual(size('6 AWG'));
    expect([carries(size('8 AWG')), carries(size('6 AWG'))]).toEqual([80, 120]);
  });

  it('misprint, not reproduced: a printed table gives 12 AWG for 10 ft × 20 A but 10 AWG for 20 ft × 10 A', () => {
    const area = (feet: number, currentA: number) =>
      circularMilsNeeded({ kOhmCmilPerFt: 10.75, currentA, outAndBackM: feet * M_PER_FT, allowedDropV: 0.36 });
    expect(area(10, 20)).toBeCloseTo(area(20, 10), 6);
    expect(area(10, 20)).toBeCloseTo(5972, 0);
    expect([smallestByArea('awg', area(10, 20)), smallestByArea('awg', area(20, 10))]).toEqual(['12 AWG', '12 AWG']);
  });
});

describe('drop by the building trade', () => {
  it('16 AWG, 100 ft one way, 4 A (electrician2.com): 4.0 V', () => {
    const wire = found(
      conductorResistance(cable('16 AWG', { lengthM: 100 * M_PER_FT }), { practice: 'us-land', tables: conductors }),
    );
    const ohm = resistanceAt(wire, 75);
    const dropV = pairDropV({ currentA: 4, plusOhm: ohm, minusOhm: ohm });
    expect(Math.abs(dropV - 4.0)).toBeLessThanOrEqual(0.01);
    // Printed 16.7 % of 24 V; exactly 16.63 %.
    expect(Math.abs((100 * dropV) / 24 - 16.7)).toBeLessThanOrEqual(0.1);
  });

  it.each([
    [10380, 4.97, 0.005],
    // Printed 3.1 for 3.125.
    [16510, 3.1, 0.05],
  ])(
    '2 K I L / CM with K = 12.9, 20 A, 100 ft one way, %i circular mils (licence-exam text): %f V',
    (areaCmil, printedV, tolerance) => {
      const dropV = circularMilDropV({ kOhmCmilPerFt: 12.9, currentA: 20, oneWayM: 100 * M_PER_FT, areaCmil });
      expect(Math.abs(dropV - printedV)).toBeLessThanOrEqual(tolerance);
    },
  );

  it('400 ft of 18 AWG (electricianmath.com): 2.602 ohm, which is solid wire at 25 °C though the text does not say so', () => {
    const wire = found(
      conductorResistance(cable('18 AWG', { lengthM: 400 * M_PER_FT, stranding: 'solid' }), {
        practice: 'us-marine',
        tables: conductors,
      }),
    );
    // The text's 6.505 ohm/kft is itself rounded from a 25 °C table: 0.1 %.
    expect(Math.abs(resistanceAt(wire, 25) - 2.602)).toBeLessThanOrEqual(0.003);
  });
});

describe('ampacity with its factors', () => {
  const land = { practice: 'us-land', terminalDegC: 90 } as const;
  it('six 10 AWG, 90 °C (licence-exam text): 40 A × 0.80 = 32 A, below the 35 A of 75 °C terminals', () => {
    const six = cable('10 AWG', { insulationDegC: 90, loadedConductors: 6, run: 'conduit' });
    expect(rated(six, land).finalA).toBeCloseTo(32, 9);
    expect(rated(six, { ...land, terminalDegC: 75 }).finalA).toBeCloseTo(32, 9);
  });

  it('8 AWG, 90 °C, in 40 °C (licence-exam text): 55 A × 0.91 = 50.05 A', () => {
    expect(rated(cable('8 AWG', { insulationDegC: 90 }), { ...land, ambientDegC: 40 }).finalA).toBeCloseTo(50.05, 9);
  });

  it.each([
    [1, 23.2],
    [5, 18.56],
    [9, 16.24],
    [10, 11.6],
  ])('10 AWG, 90 °C, in 70 °C, %i conductors (source-circuit example): %f A', (loadedConductors, printed) => {
    const wire = cable('10 AWG', { insulationDegC: 90, loadedConductors });
    expect(rated(wire, { ...land, ambientDegC: 70 }).finalA).toBeCloseTo(printed, 9);
  });

  it('1/0 AWG boat cable, 105 °C, engine space, four to six bundled (cable trade table): 145.4 A', () => {
    const wire = cable('1/0 AWG', { insulationDegC: 105, run: 'engine-space', loadedConductors: 4 });
    expect(Math.abs(rated(wire, { practice: 'us-marine', systemV: 60 }).finalA - 145.4)).toBeLessThanOrEqual(0.1);
  });

  it.each([
    ['4 mm2', 'B2', 40, 23, Math.floor],
    ['16 mm2', 'C', 50, 54, Math.round],
    ['16 mm2', 'B2', 50, 44, Math.round],
  ] as const)(
    '%s PVC, three loaded, method %s, in %i °C (tables computed to IEC 60364-5-52): %i A',
    (name, method, ambientDegC, printed, whole) => {
      const row = vectorRows(threeLoadedCsv, 12).find((candidate) => candidate['size'] === name) ?? {};
      const two = rated(cable(name, { insulationDegC: 70, run: 'free-air' }), { practice: 'iec-land', ambientDegC });
      const ambient = two.factors.find((factor) => factor.kind === 'ambient')?.factor ?? 0;
      expect(whole(numberOf(row, method) * ambient)).toBe(printed);
    },
  );

  it('33 CFR 183.455(c)(1): 10 AWG, 105 °C, below 50 V may have a device of 1.5 × 60 A = 90 A, which is a standard rating', () => {
    const practice = tables.practices['us-marine'];
    const limitA =
      practice.fuseOverCableBelow50V.value *
      rated(cable('10 AWG', { insulationDegC: 105 }), { practice: 'us-marine' }).finalA;
    expect(limitA).toBe(90);
    const ratings = tables.devices.ratings.get(practice.standardRatings)?.ratingsA ?? [];
    expect(Math.max(...ratings.filter((rating) => rating <= limitA))).toBe(90);
  });
});

describe('resistance with temperature and geometry', () => {
  const made = (name: string, practice: 'us-marine' | 'iec-land', fields: Partial<TestCable>) =>
    found(conductorResistance(cable(name, fields), { practice, tables: conductors }));
  const kft = 1000 * M_PER_FT;

  it.each([
    ['35 mm2', 1.31],
    ['120 mm2', 0.38],
  ])('%s class 5 tinned at 60 °C, out and back (BS 7671): %f mV/A/m', (name, printed) => {
    const { at20Ohm, alphaPerK } = made(name, 'iec-land', { metal: 'tinned-copper', stranding: 'flexible' });
    const millivolts = millivoltsPerAmpereMetre({ ohmPerKmAt20: at20Ohm * 1000, alphaPerK, conductorDegC: 60 });
    expect(Math.abs(millivolts - printed)).toBeLessThanOrEqual(0.005);
  });

  it('R20/R75 (IEC 60228): 0.82', () => {
    const ratio = resistanceTo20({ resistanceOhm: 1, conductorDegC: 75, alphaPerK: copperAlpha });
    expect(Math.abs(ratio - 0.82)).toBeLessThanOrEqual(0.004);
  });

  it.each([
    ['10 AWG', 0.9989, 0.0005],
    ['14 AWG', 2.525, 0.002],
  ])('1000 ft of solid %s at 20 °C (HyperPhysics): %f ohm', (name, printed, tolerance) => {
    const wire = made(name, 'us-marine', { lengthM: kft, stranding: 'solid' });
    expect(Math.abs(wire.at20Ohm - printed)).toBeLessThanOrEqual(tolerance);
  });

  it('1000 ft of stranded 4/0 copper and 2 AWG aluminium at 75 °C (NEC chapter 9 table 8): 0.0608 and 0.319 ohm', () => {
    const copper = made('4/0 AWG', 'us-marine', { lengthM: kft });
    expect(Math.abs(resistanceAt(copper, 75) - 0.0608)).toBeLessThanOrEqual(0.0001);
    const aluminium = made('2 AWG', 'us-marine', { lengthM: kft, metal: 'aluminium' });
    expect(Math.abs(resistanceAt(aluminium, 75) - 0.319)).toBeLessThanOrEqual(0.001);
  });

  it('20.0 m of 12 gauge copper of 1.68e-8 ohm m (university physics textbook): 0.1016 ohm', () => {
    const softer = { value: 0.0168, basis: conductors.metals.copper.resistivityOhmMm2PerM.basis };
    const textbook = {
      ...conductors,
      metals: { ...conductors.metals, copper: { ...conductors.metals.copper, resistivityOhmMm2PerM: softer } },
    };
    const wire = cable('12 AWG', { lengthM: 20, stranding: 'solid' });
    const answer = found(conductorResistance(wire, { practice: 'us-marine', tables: textbook }));
    // The printed answer carries a small squaring slip; exactly 0.1015.
    expect(Math.abs(answer.at20Ohm - 0.1016)).toBeLessThanOrEqual(0.0002);
  });

  it('100 ft allowed at 20 °C are 82.2 ft at 75 °C (FAA AC 43.13-1B, page 11-22, formula)', () => {
    const lengthM = lengthForSameDropM({ lengthM: 100, allowedAtDegC: 20, conductorDegC: 75, alphaPerK: copperAlpha });
    // 0.00393/K and 234.5 °C part by 0.01 %.
    expect(Math.abs(lengthM - 82.23)).toBeLessThanOrEqual(0.02);
  });
});

describe('K of the circular-mil form is copper (or aluminium) at a temperature', () => {
  it.each(vectorRows(kCsv, 11).map((row) => [numberOf(row, 'k'), row] as const))('K = %f', (k, row) => {
    const metal = row['metal'] === 'aluminium' ? 'aluminium' : 'copper';
    const at = (conductorDegC: number, layFactor: number) =>
      circularMilK({ metal, conductorDegC, layFactor }, conductors);
    // Degrees are given to 0.1: 0.04 % of K.
    expect(Math.abs(at(numberOf(row, 'solidDegC'), 1) / k - 1)).toBeLessThan(0.0005);
    expect(Math.abs(at(numberOf(row, 'strandedDegC'), 1.02) / k - 1)).toBeLessThan(0.0005);
    expect(conductors.circularMilConstants.some((constant) => constant.k.value === k && constant.metal === metal)).toBe(
      true,
    );
  });
});
