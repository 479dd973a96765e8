/** The main checks with their working beside the sum. */
import { describe, expect, test } from 'vitest';
import { battery, check, found, oneCircuit, passes, type RawPart } from '../core/checksJob.ts';

/**
 * A panel van with a 2000 W inverter on 12 V. The owner wants a 175 A fuse.
 *
 *   I = P / (eta V) = 2000 W / (0.9 x 11.5 V) = 193.2 A
 *   with margin for hours:  1.25 x 193.2 A = 241.5 A
 *   window for fuse and cable:  241.5 A <= fuse <= ampacity of the cable
 *
 * A cable of 201 A (95 mm², PVC, enclosed: IEC 60364-5-52 method B2) has no fuse in that window; laid in free air (method C)
 * the same cable may carry 258 A, and then 250 A fits.
 */
describe('a 2000 W inverter at 12 V', () => {
  const OHM = 0.0005;
  /** Rest volts that leave 11.5 V at the inverter: 11.5 + 193.2 A x (string + two leads). */
  const CURRENT_A = 2000 / 0.9 / 11.5;
  const emfV = 11.5 + CURRENT_A * 3 * OHM;
  const van = (run: 'conduit' | 'free-air', fuseA: number) => {
    const lead = { kind: 'cable', lengthM: 1.5, size: '95 mm2', run, insulationDegC: 70, resistanceOhm: OHM };
    const parts: RawPart[] = [
      battery('BANK', { emfV, resistanceOhm: OHM }),
      { id: 'FUSE', kind: 'fuse', from: 'P', to: 'Q', ratingA: fuseA },
      { id: 'PLUS', from: 'Q', to: 'L', ...lead },
      { id: 'MINUS', from: 'M', to: 'N', ...lead },
      {
        id: 'INV',
        kind: 'inverter',
        plus: 'L',
        minus: 'M',
        ratedW: 2000,
        acPowerW: 2000,
        efficiency: 0.9,
        cutoffV: 10.5,
      },
    ];
    return check({ practice: 'iec-land', site: { ambientDesignDegC: 30 }, parts });
  };
  /** Rules about fuse and cable that speak against a proposal. */
  const against = (run: 'conduit' | 'free-air', fuseA: number) =>
    [
      'fuse-over-cable',
      'fuse-under-current',
      'fuse-under-continuous',
      'cable-overloaded',
      'cable-under-continuous',
    ].filter((rule) => found(van(run, fuseA), rule).length > 0);

  test('175 A is under the running current and will open in use', () => {
    const [finding] = found(van('free-air', 175), 'fuse-under-current');
    expect(finding!.measured.value).toBeCloseTo(193.236715, 6);
    expect(finding!.message).toBe('Fuse FUSE, 175 A, carries 193.2 A: it will open in use.');
  });

  test('a 250 A fuse does not protect a 201 A cable', () => {
    const [finding] = found(van('conduit', 250), 'fuse-over-cable');
    expect(finding!.message).toContain('Fuse FUSE, 250 A, does not protect cable PLUS (95 mm²), which may carry 201 A');
    expect(finding).toMatchObject({ severity: 'fix', limit: { value: 201, unit: 'A' } });
  });

  test('the fuse must be good for 241.5 A', () => {
    const [finding] = found(van('free-air', 225), 'fuse-under-continuous');
    expect(finding!.measured.value).toBeCloseTo(241.545894, 6);
  });

  test('no fuse of the series suits the enclosed cable, and 250 A alone suits the one in free air', () => {
    const series = [150, 175, 200, 225, 250, 300];
    expect(series.filter((fuseA) => against('conduit', fuseA).length === 0)).toEqual([]);
    expect(series.filter((fuseA) => against('free-air', fuseA).length === 0)).toEqual([250]);
  });
});

/**
 * 33 CFR 183.455(c) and 183.425 table 5: 10 AWG with 105 degC insulation may carry 60 A below 50 V, so a fuse of 150 % = 90 A;
 * in an engine space 0.85 x 60 = 51 A, so 76.5 A. The same wire in a house: NEC 240.4(D) caps it at 30 A.
 */
describe('one wire, two books', () => {
  const wire = (practice: string, ratingA: number, run?: string) =>
    check(
      oneCircuit({
        practice,
        fuse: { ratingA },
        cable: { size: '10 AWG', insulationDegC: 105, run },
        load: { currentA: 5 },
      }),
    );

  test.each([
    ['in the open', undefined, 60, 90],
    ['in an engine space', 'engine-space', 51, 76.5],
  ])('US boats, %s', (_where, run, ampacityA, fuseA) => {
    expect(passes(wire('us-marine', fuseA, run), 'fuse-over-cable')).toBe(1);
    const [finding] = found(wire('us-marine', fuseA + 0.1, run), 'fuse-over-cable');
    expect(finding!.limit.value).toBeCloseTo(fuseA, 9);
    expect(finding!.message).toContain(`may carry ${ampacityA} A`);
    expect(finding!.basis).toContain('33 CFR 183.455');
  });

  test('US land', () => {
    expect(passes(wire('us-land', 30), 'small-wire-cap')).toBe(1);
    expect(found(wire('us-land', 35), 'small-wire-cap')[0]!.limit.value).toBe(30);
  });
});

/**
 * NEC 240.6 sizes: 42 A for hours need 1.25 x 42 = 52.5 A, so a 60 A fuse; over a 55 A cable (6 AWG, 60 degC column) that is
 * the next standard size up, which 240.4(B) allows.
 */
test('42 A for hours on 6 AWG: 60 A by the next-size-up rule, 50 A is too small, 70 A too large', () => {
  const at = (ratingA: number) =>
    check(
      oneCircuit({
        practice: 'us-land',
        fuse: { ratingA },
        cable: { size: '6 AWG', insulationDegC: 60 },
        load: { currentA: 42, continuous: true },
      }),
    );
  expect(passes(at(60), 'fuse-over-cable')).toBe(1);
  expect(passes(at(60), 'fuse-under-continuous')).toBe(1);
  const [small] = found(at(50), 'fuse-under-continuous');
  expect(small!.measured.value).toBeCloseTo(52.5, 9);
  expect(found(at(70), 'fuse-over-cable')[0]!.limit.value).toBe(60);
});

/**
 * 60 A that last and 100 A that do not: 1.25 x 60 + 100 = 175 A.
 */
test('lasting and brief current add up with the factor on the first alone', () => {
  const more = [{ id: 'L2', kind: 'load', plus: 'L', minus: 'M', currentA: 100, continuous: false }];
  const at = (ratingA: number) =>
    check(oneCircuit({ fuse: { ratingA }, load: { currentA: 60, continuous: true }, more }));
  expect(passes(at(175), 'fuse-under-continuous')).toBe(1);
  expect(found(at(174), 'fuse-under-continuous')[0]!.measured.value).toBeCloseTo(175, 9);
});

/**
 * A start at constant power P behind E and R: V = (E + sqrt(E² - 4 R P)) / 2. For 12.6 V and 6 mohm:
 *
 *   P = 3000 W / 0.9 = 3333 W:  V = 10.737 V, 310.4 A, above a cut-off of 10.5 V
 *   P = 3600 W / 0.9 = 4000 W:  V = 10.261 V, 389.8 A, below it
 *   largest start at 10.5 V:    P = V (E - V)/R = 10.5 x 350 = 3675 W, x 0.9 = 3307.5 W of AC
 *   largest power of all:       E²/(4 R) = 6615 W
 */
describe('an inverter starts a motor', () => {
  const start = (surgeW: number) =>
    check({
      parts: [
        battery('B1', { emfV: 12.6, resistanceOhm: 0.006 }),
        { id: 'I1', kind: 'inverter', plus: 'P', minus: 'N', ratedW: 1500, efficiency: 0.9, surgeW, cutoffV: 10.5 },
      ],
    });

  test('3000 W hold', () => {
    expect(passes(start(3000), 'surge-sag')).toBe(1);
  });

  test('3600 W do not, and the largest start that would is 3.3 kW', () => {
    const [finding] = found(start(3600), 'surge-sag');
    expect(finding!.measured.value).toBeCloseTo((12.6 + Math.sqrt(12.6 ** 2 - 4 * 0.006 * 4000)) / 2, 9);
    expect(finding!.measured.value).toBeCloseTo(10.261, 3);
    const told = Number(/up to ([\d.]+) kW/.exec(finding!.message)![1]);
    // Found by twelve halvings of 3600 W: within 0.9 W, and printed to four digits.
    expect(told).toBeGreaterThan(3.305);
    expect(told).toBeLessThanOrEqual(3.308);
  });

  test('beyond the most that battery and wiring can bring there is no voltage to tell, so the powers are', () => {
    const [finding] = found(start(6000), 'surge-sag');
    expect(finding!.measured.unit).toBe('W');
    expect(finding!.measured.value).toBeCloseTo(6615, 1); // golden-section search to 1e-5 in ln g
    expect(finding!.limit.value).toBeCloseTo(6000 / 0.9, 9);
  });
});

/** 5 A through 2 x 7.3 m of 12 AWG and 10 AWG at 20 degC: 3.17 % of 12 V fails 3 %, 1.99 % passes. */
describe('a fridge 24 ft away', () => {
  const fridge = (size: string) =>
    check({
      practice: 'us-marine',
      parts: [
        battery('B1', { chemistry: 'agm', blockNominalV: 12, emfV: 12.6 }),
        {
          id: 'RUN',
          kind: 'pair',
          from: { plus: 'P', minus: 'N' },
          to: { plus: 'L', minus: 'M' },
          lengthM: 7.3,
          size,
          stranding: 'solid',
          conductorDegC: 20,
        },
        { id: 'FRIDGE', kind: 'load', plus: 'L', minus: 'M', currentA: 5, dropClass: 'critical' },
      ],
    });

  test('loses 3.17 % of 12 V on 12 AWG, more than 3 %', () => {
    const [finding] = found(fridge('12 AWG'), 'drop-too-big');
    // Worked with plain resistivity and the AWG formula: agrees to half of the last printed digit.
    expect(finding!.measured.value).toBeCloseTo(0.0317, 4);
  });

  test('and passes on 10 AWG', () => {
    expect(passes(fridge('10 AWG'), 'drop-too-big')).toBe(1);
  });
});

/**
 * Open-circuit volts in the cold: 42.0 V x (1 + 0.0030 x 45) = 47.67 V a module; two make 95.34 V, three 143.0 V.
 */
test('two modules stay below a 100 V fuse at -20 degC, three do not', () => {
  const array = (modulesInSeries: number) =>
    check({
      site: { ambientMinDegC: -20 },
      parts: [
        {
          id: 'A1',
          kind: 'array',
          plus: 'X',
          minus: 'Y',
          modulesInSeries,
          stringsInParallel: 1,
          vocV: 42,
          iscA: 9,
          vmpV: 34,
          impA: 8.5,
          vocPerDegC: -0.003,
        },
        { id: 'F1', kind: 'fuse', from: 'X', to: 'Z', ratingA: 15, ratingV: 100 },
        {
          id: 'K1',
          kind: 'controller',
          from: { plus: 'Z', minus: 'Y' },
          to: { plus: 'P', minus: 'N' },
          type: 'mppt',
          outputA: 30,
          maxInputV: 150,
          setpointV: 14.2,
        },
        battery('B1'),
      ],
    });
  expect(passes(array(2), 'volts-rating-low')).toBe(1);
  expect(found(array(3), 'volts-rating-low')[0]!.measured.value).toBeCloseTo(143.01, 9);
});

/**
 * Three lithium blocks with electronic limits of 100 A and leads of 0.5, 0.5 and 1.5 m share 240 A as 86.5, 86.5 and 67.0 A: within
 * the limits. With the second block off the first carries 135 A and the third 105 A: both over.
 */
test('three blocks with 100 A limits: fine together, over the limit when one is off', () => {
  // 35 mm² of copper by plain resistivity (17.2414 nohm m), and four joints of 0.1 mohm a block, two in each pole.
  const PER_M = 0.0172414 / 35;
  const JOINTS = 4 * 0.1e-3;
  const block = (id: string, leadM: number): RawPart[] => [
    battery(id, { plus: `${id}P`, minus: `${id}N`, capacityAh: 200, resistanceOhm: 0.0025, maxDischargeA: 100 }),
    { id: `${id}SW`, kind: 'switch', from: `${id}P`, to: `${id}Q`, ratingA: 200 },
    { id: `${id}L`, kind: 'joint', from: `${id}Q`, to: 'P', resistanceOhm: leadM * PER_M + JOINTS / 2 },
    { id: `${id}M`, kind: 'joint', from: `${id}N`, to: 'N', resistanceOhm: leadM * PER_M + JOINTS / 2 },
  ];
  const parts = [
    ...block('A', 0.5),
    ...block('B', 0.5),
    ...block('C', 1.5),
    { id: 'L1', kind: 'load', plus: 'P', minus: 'N', currentA: 240 },
  ];
  const together = check({ parts });
  expect(found(together, 'string-discharge-high')).toEqual([]);
  expect(passes(together, 'string-discharge-high')).toBe(3);
  const oneOut = check({ parts, cases: [{ id: 'B out', set: { BSW: { state: 'open' } } }] });
  const findings = found(oneOut, 'string-discharge-high');
  expect(findings.map(({ parts }) => parts[0])).toEqual(['A', 'C']);
  expect(findings[0]!.measured.value).toBeCloseTo(135.214924, 6);
  expect(findings[1]!.measured.value).toBeCloseTo(104.785076, 6);
});
