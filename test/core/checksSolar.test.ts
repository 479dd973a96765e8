/** Arrays against their controllers, cables and fuses. Volts and amperes of the label; air where a rule asks for it. */
import { describe, expect, test } from 'vitest';
import { battery, check, found, gaps, passes, type RawPart } from './checksJob.ts';

/** T13: Voc 42 V, beta −0.30 %/K. */
const module = { vocV: 42, iscA: 9.2, vmpV: 34, impA: 8.6, vocPerDegC: -0.003, maxFuseA: 15 };
const array = (id: string, fields: Record<string, unknown> = {}): RawPart => ({
  id,
  kind: 'array',
  plus: 'A+',
  minus: 'A-',
  modulesInSeries: 1,
  stringsInParallel: 1,
  ...module,
  ...fields,
});

/** Array, its cable of so many square millimetres, a controller, a 12 V bank. */
function solar(fields: {
  readonly array?: Record<string, unknown>;
  readonly controller?: Record<string, unknown>;
  readonly cable?: Record<string, unknown>;
  readonly site?: Record<string, unknown>;
  readonly more?: readonly RawPart[];
  readonly practice?: string;
}) {
  const cable = { kind: 'cable', lengthM: 5, size: '10 mm2', run: 'free-air', insulationDegC: 90, ...fields.cable };
  return check({
    ...(fields.practice === undefined ? {} : { practice: fields.practice }),
    site: { ambientMinDegC: -20, ambientDesignDegC: 30, ambientMaxDegC: 40, ...fields.site },
    parts: [
      battery('B1'),
      array('A1', fields.array),
      { id: 'C+', from: 'A+', to: 'K+', ...cable },
      { id: 'C-', from: 'K-', to: 'A-', ...cable },
      {
        id: 'K1',
        kind: 'controller',
        from: { plus: 'K+', minus: 'K-' },
        to: { plus: 'P', minus: 'N' },
        type: 'mppt',
        outputA: 30,
        maxInputV: 100,
        setpointV: 14.2,
        ...fields.controller,
      },
      ...(fields.more ?? []),
    ],
  });
}

describe('pv-volts-cold', () => {
  const cold = (modulesInSeries: number, fields: Record<string, unknown> = {}, site = {}, maxInputV = 100) =>
    solar({ array: { modulesInSeries, ...fields }, site, controller: { maxInputV } });

  test.each([
    // 42 V (1 + 0.003 · 45) = 47.67 V a module.
    [1, 47.67, 47],
    [2, 95.34, 95],
    [3, 143.01, 100],
  ])('%i modules of 42 V at −20 °C give %f V, too much for %f V', (series, volts, maxInputV) => {
    const [finding] = found(cold(series, {}, {}, maxInputV), 'pv-volts-cold');
    expect(finding).toMatchObject({ severity: 'stop', parts: ['K1', 'A1'], limit: { value: maxInputV, unit: 'V' } });
    expect(finding!.measured.value).toBeCloseTo(volts, 9);
    expect(finding!.basis).toContain('690.7(A)');
  });

  test('two in series pass a controller for 100 V, and one for exactly their volts', () => {
    expect(passes(cold(2), 'pv-volts-cold')).toBe(1);
    expect(passes(cold(2, {}, {}, 95.34), 'pv-volts-cold')).toBe(1);
  });

  test('without the coefficient the table for crystalline silicon stands in, and says that it is remembered', () => {
    const noBeta = { vocPerDegC: undefined };
    // 2 · 42 V · 1.18 = 99.12 V.
    expect(passes(cold(2, noBeta), 'pv-volts-cold')).toBe(1);
    const [finding] = found(cold(2, noBeta, {}, 99), 'pv-volts-cold');
    expect(finding!.measured.value).toBeCloseTo(99.12, 9);
    expect(finding!.basisStatus).toBe('from-memory');
    expect(finding!.message).toContain('table for crystalline silicon');
  });

  test('between two rows of the table the colder one holds', () => {
    const [finding] = found(cold(3, { vocPerDegC: undefined }, { ambientMinDegC: -21 }), 'pv-volts-cold');
    expect(finding!.measured.value).toBeCloseTo(3 * 42 * 1.2, 9);
  });

  test('without the coldest air it can fail, but never pass', () => {
    const report = cold(2, {}, { ambientMinDegC: undefined });
    expect(gaps(report, 'pv-volts-cold')).toEqual(['ambientMinDegC of the site: how cold it gets']);
    expect(passes(report, 'pv-volts-cold')).toBe(0);
    expect(found(cold(3, {}, { ambientMinDegC: undefined }), 'pv-volts-cold')).toHaveLength(1);
  });

  test('colder than the table, the coefficient is asked for', () => {
    const report = cold(2, { vocPerDegC: undefined }, { ambientMinDegC: -45 });
    expect(gaps(report, 'pv-volts-cold')[0]).toContain('vocPerDegC of array A1');
  });

  test('arrays drawn one after the other add their volts', () => {
    const chained = check({
      site: { ambientMinDegC: -20 },
      parts: [
        battery('B1'),
        array('A1', { plus: 'K+', minus: 'M' }),
        array('A2', { plus: 'M', minus: 'K-' }),
        {
          id: 'K1',
          kind: 'controller',
          from: { plus: 'K+', minus: 'K-' },
          to: { plus: 'P', minus: 'N' },
          type: 'mppt',
          outputA: 30,
          maxInputV: 95,
          setpointV: 14.2,
        },
      ],
    });
    const [finding] = found(chained, 'pv-volts-cold');
    expect(finding!.measured.value).toBeCloseTo(95.34, 9);
    expect(finding!.parts).toEqual(['K1', 'A2', 'A1']);
  });
});

describe('pv-volts-hot', () => {
  test('a module whose hot best point lies above the charge volts with the margin passes', () => {
    expect(passes(solar({}), 'pv-volts-hot')).toBe(1);
  });

  test('one that falls short is worth a look, exactly at the wanted volts it passes', () => {
    const [finding] = found(solar({ controller: { setpointV: 29.2 } }), 'pv-volts-hot');
    expect(finding).toMatchObject({ severity: 'look', parts: ['K1', 'A1'], limit: { value: 30.2, unit: 'V' } });
    const bestV = finding!.measured.value;
    expect(bestV).toBeLessThan(30.2);
    expect(passes(solar({ controller: { setpointV: bestV - 1 } }), 'pv-volts-hot')).toBe(1);
    expect(found(solar({ controller: { setpointV: bestV - 1 + 1e-6 } }), 'pv-volts-hot')).toHaveLength(1);
  });

  test('at a switching controller the current left at the set-point counts', () => {
    const small = { vocV: 21, vmpV: 17, vocPerDegC: -0.0035 };
    const pwm = (setpointV: number) => solar({ array: small, controller: { type: 'pwm', setpointV } });
    expect(passes(pwm(13), 'pv-volts-hot')).toBe(1);
    const [finding] = found(pwm(17), 'pv-volts-hot');
    expect(finding!.measured.unit).toBe('A');
    expect(finding!.measured.value).toBeLessThan(finding!.limit.value);
  });

  test('without the hottest air it is not checked, unless the design air is too hot already', () => {
    const none = { ambientMaxDegC: undefined };
    expect(gaps(solar({ site: none }), 'pv-volts-hot')).toEqual(['ambientMaxDegC of the site: how hot it gets']);
    expect(found(solar({ site: none, controller: { setpointV: 35 } }), 'pv-volts-hot')).toHaveLength(1);
  });
});

describe('controller-amps', () => {
  const pwm = (outputA: number) => solar({ controller: { type: 'pwm', outputA } });

  test('a switching controller is to take 1.25 times the short-circuit current, exactly that passes', () => {
    // 1.25 · 9.2 A = 11.5 A.
    expect(passes(pwm(11.5), 'controller-amps')).toBe(1);
    const [finding] = found(pwm(11), 'controller-amps');
    expect(finding).toMatchObject({ severity: 'fix', parts: ['K1', 'A1'], limit: { value: 11, unit: 'A' } });
    expect(finding!.measured.value).toBeCloseTo(11.5, 9);
  });

  test('a tracking controller limits its own output: the current that it stands at its input counts', () => {
    const mppt = (maxInputA: number | undefined) => solar({ controller: { outputA: 5, maxInputA } });
    expect(passes(mppt(11.5), 'controller-amps')).toBe(1);
    expect(found(mppt(11.4), 'controller-amps')).toHaveLength(1);
    expect(gaps(mppt(undefined), 'controller-amps')[0]).toContain('maxInputA of controller K1');
    expect(passes(mppt(undefined), 'controller-amps')).toBe(0);
  });
});

describe('pv-cable-156', () => {
  test('by the US land code a cable is to carry 1.5625 times before and 1.25 times after correction, exactly that passes', () => {
    // 14 AWG copper, 90 °C: 25 A in the table, 15 A at 60 °C terminals.
    const cable = { size: '14 AWG' };
    const report = (iscA: number) => solar({ practice: 'us-land', cable, array: { iscA, impA: iscA - 0.3 } });
    expect(passes(report(9.6), 'pv-cable-156')).toBe(2); // 1.5625 · 9.6 = 15.0
    const [finding] = found(report(9.7), 'pv-cable-156');
    expect(finding!.measured.value).toBeCloseTo(1.5625 * 9.7, 9);
    expect(finding).toMatchObject({ severity: 'fix', limit: { value: 15, unit: 'A' } });
    expect(finding!.message).toContain('before correction');
  });

  test('elsewhere 1.25 times after correction is asked for', () => {
    const report = solar({ array: { stringsInParallel: 8 }, cable: { size: '10 mm2' } });
    // 1.25 · 8 · 9.2 A = 92 A.
    expect(found(report, 'pv-cable-156').map(({ parts }) => parts[0])).toEqual(['C+', 'C-']);
    expect(found(report, 'pv-cable-156')[0]!.measured.value).toBeCloseTo(92, 9);
  });

  test('arrays that meet at a bar add up in the cable behind it, and not before', () => {
    const lead = { kind: 'cable', lengthM: 2, size: '2.5 mm2', insulationDegC: 90, run: 'free-air' };
    const controller = {
      id: 'K1',
      kind: 'controller',
      from: { plus: 'K+', minus: 'K-' },
      to: { plus: 'P', minus: 'N' },
      type: 'mppt',
      outputA: 30,
      maxInputV: 100,
      setpointV: 14.2,
    };
    const report = check({
      site: { ambientDesignDegC: 30 },
      parts: [
        battery('B1'),
        ...[1, 2, 3].map((k) => array(`A${k}`, { plus: `A${k}+`, minus: 'K-' })),
        ...[1, 2, 3].map((k) => ({ id: `C${k}`, from: `A${k}+`, to: `BAR${k}`, ...lead })),
        { id: 'BAR', kind: 'busbar', junctions: ['BAR1', 'BAR2', 'BAR3', 'OUT'] },
        { id: 'C4', from: 'OUT', to: 'K+', ...lead },
        controller,
      ],
    });
    const findings = found(report, 'pv-cable-156');
    expect(findings.map(({ parts }) => parts[0])).toEqual(['C4']);
    expect(findings[0]!.measured.value).toBeCloseTo(1.25 * 3 * 9.2, 9);
    expect(passes(report, 'pv-cable-156')).toBe(3);
  });

  test('a cable of no stated size is not checked', () => {
    const report = solar({ cable: { size: undefined, resistanceOhm: 0.01 } });
    expect(gaps(report, 'pv-cable-156')).toEqual(['size of cable C+', 'size of cable C-']);
  });
});

describe('pv-string-fuse', () => {
  const strings = (practice: string, fields: Record<string, unknown>) => solar({ practice, array: fields });

  test.each(['us-land', 'iec-land'])('three strings of 5 A on modules for 15 A need none by %s', (practice) => {
    // 2 · 1.25 · 5 A = 12.5 A; the land code allows 15 A, the IEC rule 1.35 · 15 = 20.25 A.
    const report = strings(practice, { stringsInParallel: 3, iscA: 5, impA: 4.7 });
    expect(found(report, 'pv-string-fuse')).toEqual([]);
    expect(passes(report, 'pv-string-fuse')).toBe(1);
  });

  test.each([
    ['us-land', 15],
    ['iec-land', 20.25],
  ])('four strings of 9.2 A need them by %s: 34.5 A against %f A', (practice, limit) => {
    const [finding] = found(strings(practice, { stringsInParallel: 4 }), 'pv-string-fuse');
    expect(finding!.measured.value).toBeCloseTo(34.5, 9);
    expect(finding!.limit.value).toBeCloseTo(limit, 9);
    // 1.5625 · 9.2 = 14.375 A (printed to four digits) and 1.5 · 9.2 = 13.8 A: a 15 A fuse fits both.
    expect(finding!.message).toContain(practice === 'us-land' ? '14.37 A and 15 A' : '13.8 A and 15 A');
  });

  test('exactly what the modules stand passes', () => {
    expect(found(strings('us-land', { stringsInParallel: 2, iscA: 12, impA: 11 }), 'pv-string-fuse')).toEqual([]);
    expect(found(strings('us-land', { stringsInParallel: 2, iscA: 12.1, impA: 11 }), 'pv-string-fuse')).toHaveLength(1);
    // By the IEC rule two strings never need them.
    expect(passes(strings('iec-land', { stringsInParallel: 2, iscA: 40, impA: 30 }), 'pv-string-fuse')).toBe(1);
  });

  test('without the largest fuse of the module it is not checked, and one string needs none', () => {
    const report = strings('us-land', { stringsInParallel: 3, maxFuseA: undefined });
    expect(gaps(report, 'pv-string-fuse')[0]).toContain('maxFuseA of array A1');
    expect(passes(strings('us-land', { maxFuseA: undefined }), 'pv-string-fuse')).toBe(1);
  });

  /** Three strings drawn one by one on a common pair of junctions, each with its own fuse. */
  const drawnApart = (ratingA: number, practice = 'iec-land') =>
    check({
      practice,
      site: { ambientDesignDegC: 30 },
      parts: [
        battery('B1'),
        ...[1, 2, 3].map((k) => array(`A${k}`, { plus: `A${k}+`, minus: 'K-' })),
        ...[1, 2, 3].map((k) => ({ id: `F${k}`, kind: 'fuse', from: `A${k}+`, to: 'K+', ratingA })),
        {
          id: 'K1',
          kind: 'controller',
          from: { plus: 'K+', minus: 'K-' },
          to: { plus: 'P', minus: 'N' },
          type: 'mppt',
          outputA: 30,
          maxInputV: 100,
          setpointV: 14.2,
        },
      ],
    });

  test('string fuses within the window pass, at its ends too', () => {
    expect(passes(drawnApart(15), 'pv-string-fuse')).toBe(3); // the most that the module allows
    expect(passes(drawnApart(13.8), 'pv-string-fuse')).toBe(3); // 1.5 · 9.2 A
    expect(passes(drawnApart(14.375, 'us-land'), 'pv-string-fuse')).toBe(3); // 1.5625 · 9.2 A
  });

  test('a smaller one opens on a bright day, a larger one does not protect the modules', () => {
    const small = found(drawnApart(12), 'pv-string-fuse');
    expect(small.map(({ parts }) => parts)).toEqual([
      ['A1', 'F1'],
      ['A2', 'F2'],
      ['A3', 'F3'],
    ]);
    expect(small[0]!.message).toContain('bright day');
    const [large] = found(drawnApart(20), 'pv-string-fuse');
    expect(large!.limit).toEqual({ value: 15, unit: 'A' });
  });
});

describe('pv-wrong-way', () => {
  const straight = (more: readonly RawPart[], plus = 'P') =>
    check({ parts: [battery('B1'), array('A1', { plus, minus: 'N', vocV: 21, vmpV: 17 }), ...more] });

  test('an array straight on the battery is worth a look', () => {
    const [finding] = found(straight([]), 'pv-wrong-way');
    expect(finding).toMatchObject({ severity: 'look', parts: ['A1', 'B1'] });
  });

  test('with a blocking diode it passes, with one the wrong way round it does not', () => {
    const diode = (from: string, to: string) => straight([{ id: 'D1', kind: 'diode', from, to, forwardV: 0.5 }], 'X');
    expect(found(diode('X', 'P'), 'pv-wrong-way')).toEqual([]);
    expect(passes(diode('X', 'P'), 'pv-wrong-way')).toBe(1);
    expect(found(diode('P', 'X'), 'pv-wrong-way')).toHaveLength(1);
  });

  test('behind a controller it is the controller that has to block', () => {
    expect(passes(solar({ controller: { blocksAtNight: true } }), 'pv-wrong-way')).toBe(1);
    const [finding] = found(solar({ controller: { blocksAtNight: false } }), 'pv-wrong-way');
    expect(finding).toMatchObject({ severity: 'look', parts: ['A1', 'K1'] });
    expect(gaps(solar({}), 'pv-wrong-way')[0]).toContain('blocksAtNight of controller K1');
  });

  test('an array on its controller the wrong way round is told by the rule about crossed leads', () => {
    const report = solar({ array: { plus: 'A-', minus: 'A+' } });
    expect(found(report, 'pv-wrong-way')).toEqual([]);
    expect(passes(report, 'pv-wrong-way')).toBe(0);
    expect(found(report, 'polarity-crossed').map(({ severity, parts }) => [severity, parts[0]])).toContainEqual([
      'stop',
      'A1',
    ]);
  });
});
