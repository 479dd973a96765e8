/** What must hold of every conductor, and what happens where a figure is not there. */
import * as fc from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  type AmpacityContext,
  ampacity,
  areaOf,
  type ConductorSize,
  conductorResistance,
  equivalentIn,
  heatingLaw,
  nextSizeUp,
  type Practice,
  resistanceAt,
  sameSize,
  sizesOf,
  sizeText,
} from '../../core/api.ts';
import { bandFor } from '../../core/conductor/rating.ts';
import { tables } from '../../data/index.ts';
import { cable, found, size, type TestCable } from '../outside/conductorVectors.ts';

const conductors = tables.conductors;
const PRACTICES: readonly Practice[] = ['us-land', 'us-marine', 'iso-marine', 'iec-land'];
const SYSTEMS: readonly ConductorSize['system'][] = ['mm2', 'awg', 'kcmil', 'sae', 'auto'];

const resistance = (conductor: TestCable, practice: Practice) =>
  conductorResistance(conductor, { practice, tables: conductors });
const rating = (conductor: TestCable, context: Partial<AmpacityContext> & Pick<AmpacityContext, 'practice'>) =>
  ampacity(conductor, { ambientDegC: 30, tables: conductors, ...context });
const finalA = (conductor: TestCable, context: Partial<AmpacityContext> & Pick<AmpacityContext, 'practice'>) =>
  found(rating(conductor, context)).finalA;

describe('a figure that is not there', () => {
  it('no size: no resistance, no ampacity, no heating law', () => {
    const bare = { ...cable('1 AWG'), size: undefined };
    const context = { practice: 'us-land', ambientDegC: 30, tables: conductors } as const;
    expect(conductorResistance(bare, context)).toEqual({ missing: 'size of the conductor' });
    expect(ampacity(bare, context)).toEqual({ missing: 'size of the conductor' });
    expect(heatingLaw(bare, context)).toEqual({ missing: 'size of the conductor' });
  });

  it.each([
    ['7 SAE', 'not in the table of SAE gauges'],
    ['4.5 auto', 'the trade list has no cable of that outside diameter'],
  ])('%s is in no list: said, not guessed', (name, words) => {
    for (const practice of PRACTICES) {
      expect(resistance(cable(name), practice)).toMatchObject({ missing: expect.stringContaining(words) });
      expect(rating(cable(name), { practice })).toMatchObject({ missing: expect.stringContaining(words) });
    }
  });

  it.each([
    ['18 AWG', { insulationDegC: 60 }, 'us-land', 'no figure in column copper-60'],
    ['20 AWG', { insulationDegC: 105 }, 'us-marine', 'smaller than anything in'],
    ['0.5 mm2', { insulationDegC: 70 }, 'iso-marine', 'smaller than anything in'],
    ['10 mm2', { insulationDegC: 70, run: 'buried' }, 'iec-land', 'buried'],
    ['10 mm2', { insulationDegC: 50 }, 'iec-land', '50 °C insulation'],
    ['10 mm2', { insulationDegC: 60, run: 'conduit' }, 'iec-land', 'the table is for cable in air'],
    ['10 mm2', { insulationDegC: 70, run: 'bundle', loadedConductors: 60 }, 'iec-land', 'beyond the table'],
    ['10 AWG', { insulationDegC: 50 }, 'us-land', '50 °C insulation'],
    ['10 AWG', { insulationDegC: 50 }, 'us-marine', '50 °C insulation'],
    ['10 AWG', { metal: 'aluminium' }, 'us-marine', 'use copper'],
    ['10 mm2', { metal: 'aluminium' }, 'iec-land', 'for copper'],
  ] as const)('%s %o under %s: ampacity missing (%s)', (name, fields, practice, words) => {
    expect(rating(cable(name, fields), { practice })).toMatchObject({ missing: expect.stringContaining(words) });
  });
});

describe('what is filled in is said', () => {
  it.each([
    ['us-land', 'stranding stranded', 'insulation 60 °C'],
    ['us-marine', 'stranding stranded', 'insulation 60 °C'],
    ['iso-marine', 'stranding flexible', 'insulation 70 °C'],
    ['iec-land', 'stranding flexible', 'insulation 70 °C'],
  ] as const)('%s', (practice, stranding, insulation) => {
    const bare = cable('10 AWG', { metal: undefined });
    expect(found(resistance(bare, practice)).assumed).toEqual(expect.arrayContaining(['metal copper', stranding]));
    expect(found(rating(bare, { practice })).assumed).toEqual(expect.arrayContaining(['metal copper', insulation]));
  });

  it('nothing is said where nothing was filled in', () => {
    const whole = cable('10 AWG', { stranding: 'stranded', insulationDegC: 90, run: 'conduit', loadedConductors: 2 });
    expect(found(resistance(whole, 'us-land')).assumed).toEqual([]);
    expect(found(rating(whole, { practice: 'us-land', terminalDegC: 60 })).assumed).toEqual([]);
  });

  it('terminals: 60 °C up to 1 AWG, 75 °C above, unless marked', () => {
    const name = (size: string, context: Partial<AmpacityContext> = {}) =>
      found(rating(cable(size, { insulationDegC: 90 }), { practice: 'us-land', ...context })).factors.at(-1)?.name;
    expect(name('1 AWG')).toBe('60 °C terminals: 110 A at most');
    expect(name('1/0 AWG')).toBe('75 °C terminals: 150 A at most');
    expect(name('1 AWG', { terminalDegC: 75 })).toBe('75 °C terminals: 130 A at most');
    expect(name('1 AWG', { terminalDegC: 90 })).toBe('ambient 30 °C');
  });

  it('a bundle with no count is two circuits', () => {
    const bundle = cable('10 AWG', { insulationDegC: 90, run: 'bundle' });
    expect(found(rating(bundle, { practice: 'us-land' })).assumed).toContain(
      '4 loaded conductors in the bundle (two circuits)',
    );
  });

  it('industry bundling below 50 V is remarked on, not applied', () => {
    const bundle = cable('10 AWG', { insulationDegC: 105, run: 'bundle', loadedConductors: 5 });
    const low = found(rating(bundle, { practice: 'us-marine', systemV: 49.9 }));
    expect(low.finalA).toBe(60);
    expect(low.remarks).toEqual(['industry boat practice bundles below 50 V too: times 0.6 for 5 loaded conductors']);
    const high = found(rating(bundle, { practice: 'us-marine', systemV: 50 }));
    expect(high.finalA).toBeCloseTo(36, 12);
    expect(high.remarks).toEqual([]);
  });
});

describe('units never convert silently', () => {
  it('6 of five systems is five different conductors', () => {
    const areas = ['6 mm2', '6 AWG', '6 SAE', '6 auto', '6 kcmil'].map(
      (name) => found(areaOf(size(name), conductors)).value,
    );
    expect(new Set(areas.map((area) => area.toFixed(3))).size).toBe(5);
    expect(sameSize(size('6 AWG'), size('6 SAE'))).toBe(false);
  });

  it.each([
    ['35 mm2', 'us-land', '2 AWG'],
    ['35 mm2', 'us-marine', '2 AWG'],
    ['150 mm2', 'us-land', '250 kcmil'],
    ['150 mm2', 'us-marine', '4/0 AWG'],
    ['6 SAE', 'us-marine', '8 AWG'],
    ['6 auto', 'iec-land', '4 mm²'],
    ['2 AWG', 'iec-land', '25 mm²'],
    ['4/0 AWG', 'iso-marine', '95 mm²'],
    ['5 AWG', 'us-land', '6 AWG'],
  ] as const)('%s under %s is rated as %s, and says so', (name, practice, instead) => {
    const answer = found(rating(cable(name, { insulationDegC: 90 }), { practice }));
    expect(answer.assumed.join()).toContain(`${sizeText(size(name))} rated as ${instead}, the next smaller size`);
    const own = found(rating(cable(instead, { insulationDegC: 90 }), { practice }));
    expect(answer.baseA).toBe(own.baseA);
    expect(own.assumed.join()).not.toContain('rated as');
  });

  it('a size rated as another keeps its own resistance', () => {
    const metric = found(resistance(cable('35 mm2'), 'us-marine'));
    const awg = found(resistance(cable('2 AWG'), 'us-marine'));
    expect(metric.at20Ohm).not.toBeCloseTo(awg.at20Ohm, 6);
    expect(metric.basis.source).toBe('SRC-IEC60228');
  });

  it('next size up stays in its system, and 4/0 goes on in kcmil', () => {
    expect(nextSizeUp(size('10 AWG'), conductors)).toEqual(size('8 AWG'));
    expect(nextSizeUp(size('5 AWG'), conductors)).toEqual(size('4 AWG'));
    expect(nextSizeUp(size('4/0 AWG'), conductors)).toEqual(size('250 kcmil'));
    expect(nextSizeUp(size('35 mm2'), conductors)).toEqual(size('50 mm2'));
    expect(nextSizeUp(size('2 SAE'), conductors)).toEqual(size('1 SAE'));
    expect(nextSizeUp(size('3 auto'), conductors)).toEqual(size('4 auto'));
    expect(nextSizeUp(size('240 mm2'), conductors)).toBeUndefined();
    expect(nextSizeUp(size('7 SAE'), conductors)).toBeUndefined();
  });

  it('neighbours by area and by resistance are both given: 35 mm² flexible is 1 AWG by area, 2 AWG by resistance', () => {
    const make = { metal: 'copper', stranding: 'flexible' } as const;
    const answer = found(
      equivalentIn(
        { size: size('35 mm2'), system: 'awg', make, otherMake: { metal: 'copper', stranding: 'stranded' } },
        { practice: 'us-land', tables: conductors },
      ),
    );
    expect([answer.byArea, answer.byResistance, answer.nextSmaller]).toEqual([
      size('1 AWG'),
      size('2 AWG'),
      size('2 AWG'),
    ]);
  });
});

describe('laws', () => {
  const anyPractice = fc.constantFrom(...PRACTICES);
  const anyStranding = fc.constantFrom('solid' as const, 'stranded' as const, 'flexible' as const);
  const anyMetal = fc.constantFrom('copper' as const, 'tinned-copper' as const, 'aluminium' as const);

  it('thicker resists less, in every system, practice, metal and stranding', () => {
    fc.assert(
      fc.property(
        anyPractice,
        anyStranding,
        anyMetal,
        fc.constantFrom(...SYSTEMS),
        (practice, stranding, metal, system) => {
          const ohms = sizesOf(system, conductors).map(
            (each) => found(resistance(cable('1 AWG', { size: each, stranding, metal }), practice)).at20Ohm,
          );
          expect(ohms.length).toBeGreaterThan(4);
          for (const [index, ohm] of ohms.slice(1).entries()) expect(ohm).toBeLessThan(ohms[index] ?? 0);
        },
      ),
      { seed: 7, numRuns: 180 },
    );
  });

  it('hotter resists more; twice as long twice as much; three in parallel a third', () => {
    fc.assert(
      fc.property(
        anyPractice,
        anyMetal,
        fc.double({ min: 0.1, max: 100, noNaN: true }),
        fc.double({ min: -40, max: 120, noNaN: true }),
        (practice, metal, lengthM, degC) => {
          const one = found(resistance(cable('4 AWG', { metal, lengthM }), practice));
          const two = found(resistance(cable('4 AWG', { metal, lengthM: 2 * lengthM }), practice));
          const three = found(resistance(cable('4 AWG', { metal, lengthM, inParallel: 3 }), practice));
          expect(resistanceAt(one, degC + 1)).toBeGreaterThan(resistanceAt(one, degC));
          // Rounding of two multiplications.
          expect(two.at20Ohm / one.at20Ohm).toBeCloseTo(2, 12);
          expect(three.at20Ohm * 3).toBeCloseTo(one.at20Ohm, 12);
          expect(resistanceAt(one, 20)).toBe(one.at20Ohm);
        },
      ),
      { seed: 11, numRuns: 200 },
    );
  });

  it('tinned never resists less than plain', () => {
    for (const practice of PRACTICES) {
      for (const stranding of ['solid', 'stranded', 'flexible'] as const) {
        for (const system of SYSTEMS) {
          for (const each of sizesOf(system, conductors)) {
            const plain = found(resistance(cable('1 AWG', { size: each, stranding }), practice)).at20Ohm;
            const tinned = found(
              resistance(cable('1 AWG', { size: each, stranding, metal: 'tinned-copper' }), practice),
            ).at20Ohm;
            expect(tinned).toBeGreaterThanOrEqual(plain);
          }
        }
      }
    }
  });

  it('the final figure is the base times every listed factor times the conductors in parallel', () => {
    fc.assert(
      fc.property(
        anyPractice,
        fc.constantFrom('10 AWG', '2/0 AWG', '16 mm2', '6 SAE'),
        fc.constantFrom(70, 75, 90, 105),
        fc.constantFrom('conduit' as const, 'bundle' as const, 'engine-space' as const, 'free-air' as const, undefined),
        fc.integer({ min: 1, max: 20 }),
        fc.integer({ min: 1, max: 3 }),
        fc.integer({ min: -20, max: 90 }),
        (practice, name, insulationDegC, run, loadedConductors, inParallel, ambientDegC) => {
          const conductor = cable(name, { insulationDegC, run, loadedConductors, inParallel });
          const answer = found(rating(conductor, { practice, ambientDegC, systemV: 24 }));
          const product = answer.factors.reduce((soFar, factor) => soFar * factor.factor, answer.baseA * inParallel);
          expect(answer.finalA).toBeCloseTo(product, 9);
          const hotter = found(rating(conductor, { practice, ambientDegC: ambientDegC + 5, systemV: 24 }));
          expect(hotter.finalA).toBeLessThanOrEqual(answer.finalA + 1e-9);
          const crowded = found(
            rating({ ...conductor, loadedConductors: loadedConductors + 5 }, { practice, ambientDegC, systemV: 24 }),
          );
          expect(crowded.finalA).toBeLessThanOrEqual(answer.finalA + 1e-9);
        },
      ),
      { seed: 13, numRuns: 400 },
    );
  });

  it('thicker carries at least as much, in every practice', () => {
    for (const practice of PRACTICES) {
      for (const system of ['mm2', 'awg'] as const) {
        let before = 0;
        for (const each of sizesOf(system, conductors)) {
          const answer = rating(cable('1 AWG', { size: each, insulationDegC: 90 }), { practice, terminalDegC: 90 });
          if ('missing' in answer) continue;
          expect(answer.finalA).toBeGreaterThanOrEqual(before);
          before = answer.finalA;
        }
        expect(before).toBeGreaterThan(200);
      }
    }
  });

  it('where no current is allowed the figure is 0 and the factor says why', () => {
    const hot = found(rating(cable('10 AWG', { insulationDegC: 60 }), { practice: 'us-land', ambientDegC: 60 }));
    expect(hot.finalA).toBe(0);
    expect(hot.factors.at(0)?.name).toBe('ambient 60 °C: no current allowed on 60 °C insulation');
    const engine = cable('10 mm2', { insulationDegC: 60, run: 'engine-space' });
    const banned = found(rating(engine, { practice: 'iso-marine' }));
    expect(banned.finalA).toBe(0);
    expect(banned.factors.at(0)?.name).toContain('60 °C insulation is not allowed there');
  });

  it('between two printed degrees the warmer band holds', () => {
    expect(bandFor(conductors.usLand.ambient, 30.5)?.to).toBe(35);
    expect(bandFor(conductors.usLand.ambient, -20)?.to).toBe(10);
    expect(bandFor(conductors.usLand.ambient, 86)).toBeUndefined();
    expect(
      finalA(cable('10 AWG', { insulationDegC: 90 }), { practice: 'us-land', ambientDegC: 30.5, terminalDegC: 90 }),
    ).toBeCloseTo(38.4, 9);
  });

  it("the cable's own ambient goes before that of the case", () => {
    const own = cable('10 AWG', { insulationDegC: 90, ambientDegC: 50 });
    expect(finalA(own, { practice: 'us-land', ambientDegC: 20, terminalDegC: 90 })).toBeCloseTo(40 * 0.82, 9);
  });
});

describe('status of an answer is that of its weakest figure', () => {
  const status = (conductor: TestCable, context: Partial<AmpacityContext> & Pick<AmpacityContext, 'practice'>) =>
    found(rating(conductor, context)).status;

  it.each([
    ['16 mm2', 70, 'conduit', 30, 'published'],
    ['16 mm2', 70, 'conduit', 40, 'published'],
    ['16 mm2', 70, 'conduit', 60, 'from-memory'],
    ['25 mm2', 70, 'conduit', 30, 'from-memory'],
    ['16 mm2', 90, 'conduit', 30, 'from-memory'],
  ] as const)('IEC %s, %i °C insulation, %s, %i °C: %s', (name, insulationDegC, run, ambientDegC, expected) => {
    expect(status(cable(name, { insulationDegC, run }), { practice: 'iec-land', ambientDegC })).toBe(expected);
  });

  it('IEC A1 and B1 are remembered beside seen A2, B2 and C', () => {
    const row = conductors.iecLand.pvc70.rows.find((each) => sizeText(each.size) === '6 mm²');
    const statuses = ['A1', 'A2', 'B1', 'B2', 'C'].map((method) => row?.amperesA.get(method)?.basis.status);
    expect(statuses).toEqual(['from-memory', 'published', 'from-memory', 'published', 'published']);
  });

  it('boat engine space: 105 °C seen, 75 °C remembered', () => {
    const at = (insulationDegC: number) =>
      status(cable('10 AWG', { insulationDegC, run: 'engine-space' }), { practice: 'us-marine' });
    expect([at(105), at(75)]).toEqual(['published', 'from-memory']);
  });

  it('18 and 16 AWG of the current land table are remembered, 14 AWG seen', () => {
    const at = (name: string) => status(cable(name, { insulationDegC: 90 }), { practice: 'us-land' });
    expect([at('18 AWG'), at('16 AWG'), at('14 AWG')]).toEqual(['from-memory', 'from-memory', 'published']);
    expect(conductors.usLand.before2011.rows[0]?.amperesA.get('copper-90')?.basis.status).toBe('published');
  });

  it('every ISO boat figure is remembered', () => {
    const statuses = conductors.isoMarine.table.rows.flatMap((row) =>
      [...row.amperesA.values()].map((cell) => cell.basis.status),
    );
    expect(new Set(statuses)).toEqual(new Set(['from-memory']));
  });
});
