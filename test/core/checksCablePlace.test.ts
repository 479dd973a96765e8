/** Where cables and fuses lie: heat, bundles, least sizes, metals, bonds. */
import { describe, expect, test } from 'vitest';
import { check, found, gaps, oneCircuit, passes } from './checksJob.ts';

describe('hot-place', () => {
  /** 10 mm², 70 °C PVC on a wall, two loaded conductors: 63 A at 30 °C by IEC 60364-5-52, 0.87 of it at 40 °C. */
  const wall = { size: '10 mm2', insulationDegC: 70, run: 'free-air' };
  const hot = (currentA: number, site: Record<string, unknown> = { ambientMaxDegC: 40 }, cable = {}) =>
    check(oneCircuit({ cable: { ...wall, ...cable }, load: { currentA }, site: { ambientDesignDegC: 30, ...site } }));

  test('a cable that carries its current in the hottest air passes, exactly at its ampacity there too', () => {
    expect(passes(hot(50), 'hot-place')).toBe(2);
    expect(passes(hot(63 * 0.87), 'hot-place')).toBe(2);
  });

  test('one that is right only in the air of the case is worth a look', () => {
    const [finding] = found(hot(60), 'hot-place');
    expect(finding).toMatchObject({ severity: 'look', parts: ['OUT'], measured: { unit: 'A' } });
    expect(finding!.measured.value).toBeCloseTo(60, 9);
    expect(finding!.limit.value).toBeCloseTo(63 * 0.87, 9);
    expect(finding!.basis).toContain('B.52.14');
  });

  test('one that is too small in the air of the case already is told by the other rule', () => {
    const report = hot(70);
    expect(found(report, 'cable-overloaded')).toHaveLength(2);
    expect(found(report, 'hot-place')).toEqual([]);
    expect(passes(report, 'hot-place')).toBe(0);
  });

  test('without the hottest air it is asked for once, but for cables whose own air is given', () => {
    const report = hot(50, {});
    expect(gaps(report, 'hot-place')).toEqual(['ambientMaxDegC of the site: how hot it gets around the cables']);
    expect(passes(hot(40, {}, { ambientDegC: 45 }), 'hot-place')).toBe(2);
  });

  test.each([
    ['us-land', '310.15(B)'],
    ['us-marine', '183.425, (c)'],
    ['iso-marine', 'ISO 13297'],
  ])('rests on the clause of %s', (practice, clause) => {
    const job = oneCircuit({ practice, cable: { size: '10 mm2', insulationDegC: 60 }, load: { currentA: 39 } });
    const [finding] = found(check({ ...job, site: { ambientDesignDegC: 30, ambientMaxDegC: 58 } }), 'hot-place');
    expect(finding!.basis).toContain(clause);
  });
});

describe('tight-bundle', () => {
  const bundle = (currentA: number, cable: Record<string, unknown>, practice = 'us-marine', nominalV?: number) =>
    check(
      oneCircuit({
        practice,
        cable: { size: '10 AWG', insulationDegC: 105, ...cable },
        load: { currentA },
        ...(nominalV === undefined ? {} : { settings: { nominalV } }),
      }),
    );

  test('below 50 V boat law binds no bundle: above exactly the factor it is still worth a look', () => {
    // 10 AWG, 105 °C: 60 A; four to six together 0.60 of it.
    expect(passes(bundle(36, { loadedConductors: 4 }), 'tight-bundle')).toBe(2);
    const [finding] = found(bundle(37, { loadedConductors: 4 }), 'tight-bundle');
    expect(finding).toMatchObject({ severity: 'look', parts: ['OUT'], measured: { unit: 'A' } });
    expect(finding!.measured.value).toBeCloseTo(37, 9);
    expect(finding!.limit.value).toBeCloseTo(36, 9);
    expect(finding!.basis).toContain('183.435');
  });

  test('where the factor binds it is in the ampacity, and the rule for overloaded cables speaks', () => {
    const report = bundle(60, { loadedConductors: 6, size: '10 mm2', insulationDegC: 70 }, 'iec-land');
    expect(found(report, 'cable-overloaded')).toHaveLength(2);
    expect(found(report, 'tight-bundle')).toEqual([]);
    expect(
      passes(bundle(20, { loadedConductors: 6, size: '10 mm2', insulationDegC: 70 }, 'iec-land'), 'tight-bundle'),
    ).toBe(2);
  });

  test('a bundle of nobody knows how many is not checked; a cable alone with its return is no bundle', () => {
    const report = bundle(30, { run: 'bundle' });
    expect(gaps(report, 'tight-bundle')[0]).toContain('loadedConductors of cable OUT');
    expect(passes(report, 'tight-bundle')).toBe(0);
    expect(passes(bundle(30, { loadedConductors: 2 }), 'tight-bundle')).toBe(0);
  });
});

describe('fuse-warm', () => {
  const warm = (currentA: number, fuse: Record<string, unknown>, site: Record<string, unknown> = {}) =>
    check(
      oneCircuit({
        fuse: { ratingA: 100, type: 'gG', ...fuse },
        load: { currentA },
        site: { ambientDesignDegC: 30, ...site },
      }),
    );

  test('a gG fuse loses half a percent a kelvin above 40 °C; exactly what is left passes', () => {
    // At 60 °C 90 A are left of 100 A.
    expect(passes(warm(90, { ambientDegC: 60 }), 'fuse-warm')).toBe(1);
    const [finding] = found(warm(91, { ambientDegC: 60 }), 'fuse-warm');
    expect(finding).toMatchObject({ severity: 'look', parts: ['F1'], measured: { unit: 'A' } });
    expect(finding!.measured.value).toBeCloseTo(91, 9);
    expect(finding!.limit.value).toBeCloseTo(90, 9);
    expect(finding!.basisStatus).toBe('published');
  });

  test('up to 40 °C it holds its rating', () => {
    expect(passes(warm(100, { ambientDegC: 40 }), 'fuse-warm')).toBe(1);
  });

  test('for another type the same figure is trade practice, and says so', () => {
    const [finding] = found(warm(95, { ambientDegC: 60, type: 'blade' }), 'fuse-warm');
    expect(finding!.basisStatus).toBe('common-practice');
  });

  test('without a place of its own the hottest air of the site counts; without that it is asked for where it matters', () => {
    expect(found(warm(95, {}, { ambientMaxDegC: 55 }), 'fuse-warm')).toHaveLength(1);
    expect(passes(warm(95, {}, { ambientMaxDegC: 45 }), 'fuse-warm')).toBe(1);
    expect(gaps(warm(95, {}), 'fuse-warm')).toEqual(['ambientMaxDegC of the site, or ambientDegC of fuse F1']);
    // 80 A is what is left at 80 °C.
    expect(passes(warm(80, {}), 'fuse-warm')).toBe(1);
  });
});

describe('cable-too-thin', () => {
  const thin = (practice: string, cable: Record<string, unknown>, more: Record<string, unknown> = {}) =>
    check(oneCircuit({ practice, cable, load: { currentA: 1 }, ...more }));

  test.each([
    ['us-land', '12 AWG', '14 AWG', '720.4'],
    ['us-marine', '16 AWG', '18 AWG', '183.425'],
    ['iso-marine', '1 mm2', '0.75 mm2', 'ISO 10133'],
    ['iec-land', '1.5 mm2', '1 mm2', '60364-5-52'],
  ])('by %s exactly %s passes and %s alone does not', (practice, enough, less, clause) => {
    expect(passes(thin(practice, { size: enough }), 'cable-too-thin')).toBe(2);
    const [finding] = found(thin(practice, { size: less, sheathed: false }), 'cable-too-thin');
    expect(finding).toMatchObject({ severity: 'fix', parts: ['OUT'] });
    expect(finding!.basis).toContain(clause);
  });

  test('inside a sheath boats allow a thinner one; where nobody said, the sheath is asked for', () => {
    expect(passes(thin('us-marine', { size: '18 AWG', sheathed: true }), 'cable-too-thin')).toBe(2);
    expect(gaps(thin('us-marine', { size: '18 AWG' }), 'cable-too-thin')[0]).toContain('sheathed of cable OUT');
    expect(found(thin('us-marine', { size: '20 AWG' }), 'cable-too-thin')).toHaveLength(2);
  });

  test('the land code asks for 12 AWG below 50 V only', () => {
    const nominal = (nominalV: number) => thin('us-land', { size: '14 AWG' }, { settings: { nominalV } });
    expect(found(nominal(48), 'cable-too-thin')).toHaveLength(2);
    expect(found(nominal(50), 'cable-too-thin')).toEqual([]);
  });

  test('a cable of no stated size is not checked', () => {
    expect(gaps(thin('iec-land', { size: undefined }), 'cable-too-thin')).toContain('size of cable OUT');
  });
});

describe('wrong-metal-or-solid', () => {
  const metal = (cable: Record<string, unknown>, practice = 'us-marine') =>
    check(oneCircuit({ practice, cable, load: { currentA: 1 } }));

  test('on a boat stranded copper passes, solid and aluminium do not', () => {
    expect(passes(metal({ metal: 'tinned-copper', stranding: 'stranded' }), 'wrong-metal-or-solid')).toBe(2);
    const [solid] = found(metal({ metal: 'copper', stranding: 'solid' }), 'wrong-metal-or-solid');
    expect(solid).toMatchObject({ severity: 'fix', parts: ['OUT'] });
    expect(solid!.basis).toContain('183.425');
    const [aluminium] = found(metal({ metal: 'aluminium', stranding: 'solid' }), 'wrong-metal-or-solid');
    expect(aluminium!.message).toContain('aluminium and solid');
  });

  test('the small-craft standard asks for the same, from memory; on land nobody does', () => {
    expect(found(metal({ stranding: 'solid' }, 'iso-marine'), 'wrong-metal-or-solid')[0]!.basisStatus).toBe(
      'from-memory',
    );
    expect(found(metal({ stranding: 'solid' }, 'iec-land'), 'wrong-metal-or-solid')).toEqual([]);
  });

  test('what nobody said is asked for in one line', () => {
    const report = metal({ metal: 'copper' });
    expect(gaps(report, 'wrong-metal-or-solid')).toEqual(['stranding of cable OUT and stranding of cable BACK']);
    expect(passes(report, 'wrong-metal-or-solid')).toBe(0);
  });
});

describe('bond-too-small', () => {
  const bonded = (size: string | undefined, practice = 'us-land', fields: Record<string, unknown> = {}) =>
    check(oneCircuit({ practice, more: [{ id: 'E1', kind: 'bond', from: 'M', to: 'earth', size, ...fields }] }));

  test.each([
    ['us-land', '8 AWG', '10 AWG', '552.10'],
    ['us-marine', '8 AWG', '10 AWG', 'ABYC'],
    ['iso-marine', '6 mm2', '4 mm2', '60364-5-54'],
    ['iec-land', '6 mm2', '4 mm2', '60364-5-54'],
  ])('by %s exactly %s is enough and %s is not', (practice, enough, less, clause) => {
    const least = (size: string) =>
      found(bonded(size, practice), 'bond-too-small').filter(({ message }) => message.includes('smallest'));
    expect(least(enough)).toEqual([]);
    const [finding] = least(less);
    expect(finding).toMatchObject({ severity: 'fix', parts: ['E1'], measured: { unit: 'mm2' } });
    expect(finding!.basis).toContain(clause);
  });

  test('a bond of no stated size is not checked', () => {
    expect(gaps(bonded(undefined), 'bond-too-small')).toEqual(['size of bond E1']);
  });

  test('by the land code a bond at the pole of a battery is no smaller than its other lead', () => {
    const atPole = (size: string, lead: string) =>
      found(
        check({
          practice: 'us-land',
          parts: [
            {
              id: 'B1',
              kind: 'string',
              plus: 'P',
              minus: 'N',
              chemistry: 'flooded',
              blocksInSeries: 1,
              blockNominalV: 12,
              capacityAh: 60,
            },
            { id: 'LEAD', kind: 'cable', from: 'P', to: 'Q', lengthM: 1, size: lead },
            { id: 'F1', kind: 'fuse', from: 'Q', to: 'L', ratingA: 10 },
            { id: 'L1', kind: 'load', plus: 'L', minus: 'N', currentA: 1 },
            { id: 'E1', kind: 'bond', from: 'N', to: 'earth', size },
          ],
        }),
        'bond-too-small',
      ).filter(({ message }) => message.includes('battery lead'));
    expect(atPole('4 AWG', '4 AWG')).toEqual([]);
    const [finding] = atPole('6 AWG', '4 AWG');
    expect(finding).toMatchObject({ severity: 'fix', parts: ['E1', 'LEAD'] });
    expect(finding!.basis).toContain('552.10');
  });

  describe('while a fault to earth flows through it', () => {
    /** A fuse that has opened by a tenth of a second at any fault, and surely holds a hundredth. */
    const tenth = [
      [500, 0.01, 0.1],
      [50_000, 0.01, 0.1],
    ];
    const exact = { range: { emfV: [13.2, 13.2], resistanceOhm: [0.002, 0.002] } };
    const stressed = (size: string, fuse: Record<string, unknown> = { curvePoints: tenth }) => {
      const more = [{ id: 'E1', kind: 'bond', from: 'N', to: 'earth', size }];
      return check(oneCircuit({ practice: 'iec-land', battery: exact, fuse, more }));
    };

    test('it is to stand the current until the device next to the battery opens, S = √(I²t)/k', () => {
      const [finding] = found(stressed('6 mm2'), 'bond-too-small');
      expect(finding).toMatchObject({ severity: 'fix', parts: ['E1', 'F1'] });
      // 13.2 V behind 2 mΩ: 6600 A for 0.1 s, k 115 A √s/mm².
      expect(finding!.limit.value).toBeCloseTo((6600 * Math.sqrt(0.1)) / 115, 1);
      expect(finding!.basis).toContain('clause 543');
      expect(passes(stressed(`${finding!.limit.value} mm2`), 'bond-too-small')).toBe(1);
      expect(found(stressed(`${0.999 * finding!.limit.value} mm2`), 'bond-too-small')).toHaveLength(1);
    });

    test('without a band of the device it is not checked', () => {
      expect(gaps(stressed('35 mm2', {}), 'bond-too-small')).toEqual([
        'type of fuse F1: how long a fault to earth lasts in the bond',
      ]);
    });

    test('a generic band that leaves it open asks for the points of the maker', () => {
      const report = stressed('16 mm2', { type: 'class_T' });
      expect(gaps(report, 'bond-too-small')[0]).toContain('curvePoints of fuse F1');
      expect(passes(stressed('240 mm2', { type: 'class_T' }), 'bond-too-small')).toBe(1);
    });
  });
});
