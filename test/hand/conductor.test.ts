/** Sums that a person can follow on paper: the working stands beside the answer. */
import { describe, expect, it } from 'vitest';
import {
  type AmpacityContext,
  ampacity,
  conductorResistance,
  dropFromMillivoltsV,
  heatingLaw,
  pairDropV,
  resistanceAt,
  temperatureAt,
} from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import { cable, found, type TestCable } from '../outside/conductorVectors.ts';

const conductors = tables.conductors;
const rated = (conductor: TestCable, context: Partial<AmpacityContext> & Pick<AmpacityContext, 'practice'>) =>
  found(ampacity(conductor, { ambientDegC: 30, tables: conductors, ...context }));
const law = (conductor: TestCable, context: Partial<AmpacityContext> & Pick<AmpacityContext, 'practice'>) =>
  found(heatingLaw(conductor, { ambientDegC: 30, tables: conductors, ...context }));

describe('resistance', () => {
  const iec = { practice: 'iec-land', tables: conductors } as const;

  it('3 m of 35 mm² flexible copper', () => {
    const lead = found(conductorResistance(cable('35 mm2', { lengthM: 3 }), iec));
    // IEC 60228 class 5: 0.554 mohm/m × 3 m = 1.662 mohm at 20 °C
    expect(lead.at20Ohm).toBeCloseTo(0.001662, 12);
    // at 50 °C: 1.662 × (1 + 0.00393 × 30) = 1.662 × 1.1179 = 1.858 mohm
    expect(resistanceAt(lead, 50)).toBeCloseTo(0.001662 * 1.1179, 12);
    expect(lead.working.at(-1)).toBe('0.554 mΩ/m × 3 m = 1.662 mΩ at 20 °C');
  });

  it('two in parallel have half the resistance of one', () => {
    const two = found(conductorResistance(cable('35 mm2', { lengthM: 3, inParallel: 2 }), iec));
    // 1.662 / 2 = 0.831 mohm
    expect(two.at20Ohm).toBeCloseTo(0.000831, 12);
  });

  it('5 m of stranded 2/0 AWG on US land', () => {
    const lead = found(
      conductorResistance(cable('2/0 AWG', { lengthM: 5 }), { practice: 'us-land', tables: conductors }),
    );
    // table 8: 0.0967 ohm/1000 ft at 75 °C / 0.3048 = 0.31726 mohm/m
    // / (1 + 0.00393 × 55 = 1.21615) = 0.26087 mohm/m; × 5 m = 1.30435 mohm
    expect(lead.at20Ohm).toBeCloseTo(0.00130435, 8);
  });

  it('aluminium 50 mm², 10 m', () => {
    const lead = found(conductorResistance(cable('50 mm2', { lengthM: 10, metal: 'aluminium' }), iec));
    // 0.641 mohm/m × 10 m = 6.41 mohm; at 75 °C × (1 + 0.00403 × 55 = 1.22165) = 7.831 mohm
    expect(resistanceAt(lead, 75)).toBeCloseTo(0.00641 * 1.22165, 9);
  });

  it('tinned 4/0 AWG of 19 wires on a boat', () => {
    const lead = found(
      conductorResistance(cable('4/0 AWG', { metal: 'tinned-copper' }), { practice: 'us-marine', tables: conductors }),
    );
    // 107.219 mm² / 19 = 5.643 mm², wires of 2.68 mm: tin leaves 0.97
    // 17.24138 × 1.02 / 107.219 / 0.97 = 0.169094 mohm/m
    expect(lead.at20Ohm).toBeCloseTo(0.000169094, 9);
  });

  it('6 mm "auto" cable is 4.6 mm² of copper, not 6', () => {
    const auto = found(conductorResistance(cable('6 auto', { lengthM: 10 }), iec));
    // 17.24138 / 4.6 × 1.02 = 3.8231 mohm/m; × 10 m = 38.231 mohm
    expect(auto.at20Ohm).toBeCloseTo(0.038231, 6);
    expect(auto.basis.status).toBe('common-practice');
  });

  it('300 mm² flexible, which the table does not hold', () => {
    const lead = found(conductorResistance(cable('300 mm2'), iec));
    // 240 mm²: 0.0801 × 240 / 17.24138 = 1.11499 times its nominal area
    // 17.24138 / 300 × 1.11499 = 0.06408 mohm/m
    expect(lead.at20Ohm).toBeCloseTo(0.00006408, 9);
    expect(lead.assumed.join()).toContain('1.115 times that of its nominal area');
  });

  it('8 mm² flexible, between 6 and 10 of the table: the worse of the two ratios', () => {
    const lead = found(conductorResistance(cable('8 mm2'), iec));
    // 6 mm²: 3.30 × 6 / 17.24138 = 1.14840; 10 mm²: 1.91 × 10 / 17.24138 = 1.10780
    // 17.24138 / 8 × 1.14840 = 2.4750 mohm/m
    expect(lead.at20Ohm).toBeCloseTo(0.002475, 9);
  });

  it('a run out of 3.5 m and back over 3 m, 20 A', () => {
    const out = found(conductorResistance(cable('6 mm2', { lengthM: 3.5 }), iec)).at20Ohm;
    const back = found(conductorResistance(cable('6 mm2', { lengthM: 3 }), iec)).at20Ohm;
    // 3.30 mohm/m × 6.5 m = 21.45 mohm; × 20 A = 0.429 V
    expect(pairDropV({ currentA: 20, plusOhm: out, minusOhm: back })).toBeCloseTo(0.429, 9);
  });
});

describe('drop from a printed figure', () => {
  it('1.31 mV/A/m already counts the return: 100 A over a 5 m run', () => {
    // 1.31 × 100 × 5 / 1000 = 0.655 V
    expect(dropFromMillivoltsV({ millivoltsPerAmpereMetre: 1.31, currentA: 100, oneWayM: 5 })).toBeCloseTo(0.655, 12);
  });
});

describe('ampacity', () => {
  it('4/0 AWG, 90 °C, in 40 °C, on 75 °C terminals: the terminals decide', () => {
    const answer = rated(cable('4/0 AWG', { insulationDegC: 90 }), { practice: 'us-land', ambientDegC: 40 });
    // 260 A × 0.91 = 236.6 A; 75 °C column 230 A
    expect(answer.finalA).toBeCloseTo(230, 9);
    expect(answer.factors.map((factor) => factor.kind)).toEqual(['ambient', 'terminal']);
    expect(answer.factors.at(-1)?.factor).toBeCloseTo(230 / 236.6, 12);
  });

  it('two 2 AWG in parallel in an engine space of a boat', () => {
    const pair = cable('2 AWG', { insulationDegC: 105, inParallel: 2, run: 'engine-space' });
    // 210 A × 0.85 × 2 = 357 A
    expect(rated(pair, { practice: 'us-marine', systemV: 12 }).finalA).toBeCloseTo(357, 9);
  });

  it('10 mm² PVC, three circuits in a conduit, in 40 °C', () => {
    const wire = cable('10 mm2', { insulationDegC: 70, run: 'conduit', loadedConductors: 6 });
    // B2: 52 A × 0.87 × 0.70 = 31.668 A
    expect(rated(wire, { practice: 'iec-land', ambientDegC: 40 }).finalA).toBeCloseTo(31.668, 9);
  });

  it('three loaded conductors are two circuits', () => {
    const wire = cable('10 mm2', { insulationDegC: 70, run: 'conduit', loadedConductors: 3 });
    // B2: 52 A × 0.80 = 41.6 A
    expect(rated(wire, { practice: 'iec-land' }).finalA).toBeCloseTo(41.6, 9);
  });

  it('a boat cable in 60 °C, where the law gives no factor', () => {
    // 10 AWG, 105 °C: 60 A × sqrt((105 − 60)/(105 − 30)) = 60 × 0.774597 = 46.476 A
    const answer = rated(cable('10 AWG', { insulationDegC: 105, ambientDegC: 60 }), { practice: 'us-marine' });
    expect(answer.finalA).toBeCloseTo(46.4758, 4);
    expect(answer.status).toBe('common-practice');
  });
});

describe('a conductor warmed by its own current', () => {
  const wire = cable('10 AWG', { insulationDegC: 105 });

  it('stands at its rated temperature at its ampacity, and a quarter of the way up at half of it', () => {
    const heating = law(wire, { practice: 'us-marine' });
    expect(heating).toMatchObject({ ambientDegC: 30, riseAtRatedK: 75, ampacityA: 60 });
    expect(temperatureAt(heating, 60)).toBeCloseTo(105, 12);
    // 30 + 75 × (30/60)² = 48.75 °C
    expect(temperatureAt(heating, 30)).toBeCloseTo(48.75, 12);
  });

  it('in an engine space starts from 50 °C with the same ampacity: the engine-space factor does not count twice', () => {
    const heating = law({ ...wire, run: 'engine-space' }, { practice: 'us-marine' });
    expect(heating).toMatchObject({ ambientDegC: 50, riseAtRatedK: 75, ampacityA: 60 });
    // at the reduced 60 × 0.85 = 51 A: 50 + 75 × 0.7225 = 104.2 °C, the rated 105 but for the rounding of 0.85
    expect(temperatureAt(heating, 51)).toBeCloseTo(104.1875, 9);
  });

  it('is warmed by its neighbours in a bundle even where the law does not bind', () => {
    const bundled = { ...wire, run: 'bundle', loadedConductors: 6 } as const;
    // 60 A × 0.60 = 36 A
    expect(law(bundled, { practice: 'us-marine', systemV: 12 }).ampacityA).toBeCloseTo(36, 12);
    expect(rated(bundled, { practice: 'us-marine', systemV: 12 }).finalA).toBe(60);
  });

  it('is not cooled by cool terminals', () => {
    const heating = law(cable('4 AWG', { insulationDegC: 90 }), { practice: 'us-land' });
    // 90 °C column 95 A, though 60 °C terminals allow 70 A
    expect(heating.ampacityA).toBe(95);
    expect(rated(cable('4 AWG', { insulationDegC: 90 }), { practice: 'us-land' }).finalA).toBeCloseTo(70, 12);
  });
});
