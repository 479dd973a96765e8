/** Where batteries and parts stand: air, sparks, fuel, covers, boxes and reach. */
import { describe, expect, test } from 'vitest';
import { battery, check, found, gaps, oneCircuit, passes } from './checksJob.ts';

const lead = { chemistry: 'flooded', blockNominalV: 12, capacityAh: 400, emfV: 12.7 };

describe('gas-no-vent', () => {
  // Twelve lead cells of 400 Ah at boost: 0.05 x 12 x 20 mA/Ah x 400 Ah / 1000 = 4.8 m3/h, 28 x 4.8 = 134.4 cm2.
  const vented = (fields: Record<string, unknown>, chemistry = 'flooded') =>
    check(oneCircuit({ battery: { ...lead, chemistry, blocksInSeries: 2, emfV: 25.4, ...fields } }));

  test('exactly the air that the standard asks for passes, and so does exactly the opening', () => {
    expect(passes(vented({ ventAirM3PerH: 4.8 }), 'gas-no-vent')).toBe(1);
    expect(passes(vented({ ventOpeningCm2: 134.4 }), 'gas-no-vent')).toBe(1);
  });

  test('less is to be put right, in the unit of what was given', () => {
    expect(found(vented({ ventAirM3PerH: 4.7 }), 'gas-no-vent')[0]).toMatchObject({
      severity: 'fix',
      measured: { value: 4.7, unit: 'm3/h' },
      parts: ['B1'],
    });
    const [finding] = found(vented({ ventOpeningCm2: 100 }), 'gas-no-vent');
    expect(finding!.limit.unit).toBe('cm2');
    expect(finding!.limit.value).toBeCloseTo(134.4, 9);
    expect(finding!.basis).toContain('IEC 62485-2');
  });

  test('valve-regulated cells gas less: 1.92 m3/h, 53.76 cm2', () => {
    expect(passes(vented({ ventOpeningCm2: 53.76 }, 'agm'), 'gas-no-vent')).toBe(1);
    expect(found(vented({ ventAirM3PerH: 1.9 }, 'agm'), 'gas-no-vent')).toHaveLength(1);
  });

  test('strings of one box share its air, those of another have their own', () => {
    const two = (box: string) => [
      battery('B2', { ...lead, enclosure: box, blocksInSeries: 2, emfV: 25.4, ventAirM3PerH: 4.8 }),
    ];
    const job = (box: string) =>
      check(
        oneCircuit({
          battery: { ...lead, blocksInSeries: 2, emfV: 25.4, enclosure: 'left', ventAirM3PerH: 4.8 },
          more: two(box),
        }),
      );
    expect(found(job('left'), 'gas-no-vent')[0]!.limit.value).toBeCloseTo(9.6, 9);
    expect(passes(job('right'), 'gas-no-vent')).toBe(2);
  });

  test('nothing said is not done, and says how much is needed; lithium is not asked', () => {
    expect(gaps(vented({}), 'gas-no-vent')[0]).toContain('134.4 cm² in and out each, or 4.8 m³/h');
    expect(gaps(check(oneCircuit({})), 'gas-no-vent')).toEqual([]);
  });
});

describe('spark-near-gas', () => {
  const job = (fuse: Record<string, unknown>, more: Record<string, unknown> = {}) =>
    check(oneCircuit({ battery: { ...lead, enclosure: 'box' }, fuse, ...more }));

  test('a fuse in the box of the battery is to be put right, one outside passes', () => {
    const [finding] = found(job({ inBatterySpace: true, ignitionProtected: false }), 'spark-near-gas');
    expect(finding).toMatchObject({ severity: 'fix', parts: ['F1'] });
    // 28.8 mm x cube root of 20 x cube root of 400 = 576 mm.
    expect(finding!.message).toContain('0.58 m');
    expect(passes(job({}), 'spark-near-gas')).toBe(1);
  });

  test('the box that both name says where a fuse is; protection makes it pass', () => {
    expect(found(job({ enclosure: 'box', ignitionProtected: false }), 'spark-near-gas')).toHaveLength(1);
    expect(passes(job({ enclosure: 'box', ignitionProtected: true }), 'spark-near-gas')).toBe(1);
    expect(gaps(job({ enclosure: 'box' }), 'spark-near-gas')).toEqual(['ignitionProtected of fuse F1']);
  });

  test('where no box is named one question is asked for all parts', () => {
    const report = check(oneCircuit({ battery: lead }));
    expect(gaps(report, 'spark-near-gas')).toEqual([
      'enclosure of string B1 (the box that it stands in), or inBatterySpace of F1',
    ]);
  });

  test('with petrol in a closed space a part that is not protected is a stop, on any battery', () => {
    const petrol = (fuse: Record<string, unknown>) =>
      check(oneCircuit({ fuse, site: { ambientDesignDegC: 30, gasolineSpace: true }, practice: 'us-marine' }));
    const [finding] = found(petrol({ ignitionProtected: false }), 'spark-near-gas');
    expect(finding).toMatchObject({ severity: 'stop', parts: ['F1'] });
    expect(finding!.basis).toContain('33 CFR 183.410');
    expect(passes(petrol({ ignitionProtected: true }), 'spark-near-gas')).toBe(1);
  });

  test('a boat is asked whether there is petrol, a hut is not', () => {
    expect(gaps(check(oneCircuit({ practice: 'us-marine' })), 'spark-near-gas')[0]).toContain('gasolineSpace');
    expect(gaps(check(oneCircuit({})), 'spark-near-gas')).toEqual([]);
  });
});

const flagged = (name: string, value: boolean | undefined, practice: string) =>
  check(oneCircuit({ battery: { [name]: value }, practice }));

describe('battery-loose', () => {
  const held = (value: boolean | undefined, practice = 'us-marine') => flagged('heldDown', value, practice);

  test('held down it passes; loose it is to be put right aboard, by the clause of the book, and looked at on land', () => {
    expect(passes(held(true), 'battery-loose')).toBe(1);
    const [aboard] = found(held(false), 'battery-loose');
    expect(aboard).toMatchObject({ severity: 'fix', parts: ['B1'] });
    expect(aboard!.basis).toContain('183.420, (a)');
    expect(found(held(false, 'iso-marine'), 'battery-loose')[0]!.basis).toContain('5.2');
    expect(found(held(false, 'iec-land'), 'battery-loose')[0]!.severity).toBe('look');
  });
  test('not said, it is asked aboard only', () => {
    expect(gaps(held(undefined), 'battery-loose')).toEqual(['heldDown of string B1']);
    expect(gaps(held(undefined, 'iec-land'), 'battery-loose')).toEqual([]);
  });
});

describe('battery-by-fuel', () => {
  const beside = (value: boolean | undefined, practice = 'us-marine') => flagged('besideFuel', value, practice);

  test('away from fuel it passes; beside it, it is to be put right aboard and looked at on land', () => {
    expect(passes(beside(false), 'battery-by-fuel')).toBe(1);
    const [aboard] = found(beside(true), 'battery-by-fuel');
    expect(aboard).toMatchObject({ severity: 'fix', parts: ['B1'] });
    expect(aboard!.basis).toContain('183.420, (c) and (d)');
    expect(found(beside(true, 'iso-marine'), 'battery-by-fuel')[0]!.basis).toContain('5.6');
    expect(found(beside(true, 'us-land'), 'battery-by-fuel')[0]!.severity).toBe('look');
  });
  test('not said, it is asked aboard only', () => {
    expect(gaps(beside(undefined), 'battery-by-fuel')).toEqual(['besideFuel of string B1']);
    expect(gaps(beside(undefined, 'us-land'), 'battery-by-fuel')).toEqual([]);
  });
});

describe('no-low-cutoff', () => {
  test('a cut-off at exactly the volts at which the cells are empty passes, one below is to be looked at', () => {
    const job = (lowCutoffV: number) => check(oneCircuit({ battery: { ...lead, lowCutoffV } }));
    expect(passes(job(10.5), 'no-low-cutoff')).toBe(1); // six cells of 1.75 V
    const [finding] = found(job(10.4), 'no-low-cutoff');
    expect(finding).toMatchObject({ severity: 'look', measured: { value: 10.4, unit: 'V' }, limit: { value: 10.5 } });
  });

  test('not said, it is not done; an inverter cuts itself off; an idle string is not asked', () => {
    expect(gaps(check(oneCircuit({})), 'no-low-cutoff')[0]).toContain('lowCutoffV of string B1');
    const inverter = {
      id: 'INV',
      kind: 'inverter',
      plus: 'L',
      minus: 'M',
      ratedW: 1000,
      cutoffV: 10.5,
      efficiency: 0.9,
    };
    const parts = oneCircuit({ more: [inverter] }).parts.filter(({ id }) => id !== 'L1');
    expect(passes(check({ parts }), 'no-low-cutoff')).toBe(1);
    const idle = battery('E', { plus: 'ELSEWHERE' });
    expect(gaps(check(oneCircuit({ battery: { lowCutoffV: 11 }, more: [idle] })), 'no-low-cutoff')).toEqual([]);
  });
});

describe('spring-or-crocodile-clip', () => {
  test('a clip is to be put right, a bolted post passes, aboard it is asked', () => {
    const job = (springClip?: boolean) => check(oneCircuit({ battery: { springClip }, practice: 'us-marine' }));
    expect(found(job(true), 'spring-or-crocodile-clip')[0]).toMatchObject({ severity: 'fix', parts: ['B1'] });
    expect(found(job(true), 'spring-or-crocodile-clip')[0]!.basis).toContain('183.420, (g)');
    expect(passes(job(false), 'spring-or-crocodile-clip')).toBe(1);
    expect(gaps(job(), 'spring-or-crocodile-clip')).toEqual(['springClip of string B1']);
  });
});

describe('bare-live-stud', () => {
  const job = (string: boolean | undefined, fuse: boolean | undefined, bar: boolean | undefined) =>
    check(
      oneCircuit({
        practice: 'us-marine',
        battery: { covered: string },
        fuse: { covered: fuse },
        more: [{ id: 'BAR', kind: 'busbar', junctions: ['Q', 'Q2'], covered: bar }],
      }),
    );

  test('bare before the first fuse is to be put right; behind it nobody asks', () => {
    expect(found(job(false, true, false), 'bare-live-stud').map(({ parts }) => parts)).toEqual([['B1']]);
    expect(passes(job(true, true, undefined), 'bare-live-stud')).toBe(2);
  });
  test('not said, all of them are one question', () => {
    expect(gaps(job(undefined, undefined, undefined), 'bare-live-stud')).toEqual([
      'covered of string B1 and covered of fuse F1',
    ]);
  });
});

describe('stud-crowded', () => {
  const job = (count: number) =>
    check(
      oneCircuit({
        more: Array.from({ length: count - 1 }, (_, n) => ({
          id: `W${String(n)}`,
          kind: 'cable',
          from: 'Q',
          to: `X${String(n)}`,
          lengthM: 1,
          size: '6 mm2',
        })),
      }),
    );
  test('exactly four rings on a stud pass, five are to be looked at', () => {
    expect(found(job(4), 'stud-crowded')).toEqual([]);
    expect(passes(job(4), 'stud-crowded')).toBe(1);
    expect(found(job(5), 'stud-crowded')[0]).toMatchObject({
      severity: 'look',
      measured: { value: 5 },
      limit: { value: 4 },
    });
  });
  test('a place of a busbar is no stud', () => {
    const { parts, ...rest } = oneCircuit({});
    const bar = { id: 'BAR', kind: 'busbar', junctions: ['Q', 'Q2'] };
    const wires = Array.from({ length: 5 }, (_, n) => ({
      id: `W${String(n)}`,
      kind: 'cable',
      from: 'Q',
      to: `X${String(n)}`,
      lengthM: 1,
      size: '6 mm2',
    }));
    expect(found(check({ ...rest, parts: [...parts, bar, ...wires] }), 'stud-crowded')).toEqual([]);
  });
});

describe('two-source-box', () => {
  const charger = { id: 'CH', kind: 'charger', plus: 'Q', minus: 'N', outputA: 10, setpointV: 14.4 };
  const job = (sourceSign: boolean | undefined, more = [charger], enclosure: string | null = 'panel') =>
    check(
      oneCircuit({ fuse: enclosure === null ? {} : { enclosure }, more, site: { ambientDesignDegC: 30, sourceSign } }),
    );
  test('two sources and no sign is to be looked at, a sign passes, not said is not done', () => {
    const [finding] = found(job(false), 'two-source-box');
    expect(finding).toMatchObject({ severity: 'look', parts: ['F1'] });
    expect(finding!.message).toContain('B1 and CH');
    expect(passes(job(true), 'two-source-box')).toBe(1);
    expect(gaps(job(undefined), 'two-source-box')[0]).toContain('sourceSign of the site');
  });
  test('one source needs no sign, and a job that names no box is not asked', () => {
    expect(passes(job(undefined, []), 'two-source-box')).toBe(1);
    expect(gaps(job(undefined, [charger], null), 'two-source-box')).toEqual([]);
  });
});

describe('isolator-out-of-reach', () => {
  const job = (fields: Record<string, unknown>, practice = 'us-land') => {
    const { parts, ...rest } = oneCircuit({ practice });
    const moved = parts.map((part) => (part.id === 'F1' ? { ...part, from: 'P2' } : part));
    return check({ ...rest, parts: [...moved, { id: 'SW', kind: 'switch', from: 'P', to: 'P2', ...fields }] });
  };
  test('within reach passes, out of reach is to be looked at, not said is not done', () => {
    expect(passes(job({ accessible: true }), 'isolator-out-of-reach')).toBe(1);
    expect(found(job({ accessible: false }), 'isolator-out-of-reach')[0]).toMatchObject({ severity: 'look' });
    expect(gaps(job({}), 'isolator-out-of-reach')[0]).toContain('accessible of switch SW');
  });
  test('on land in the United States within sight ends at exactly 15.24 m', () => {
    const at = (distanceFromSourceM: number, practice?: string) =>
      job({ accessible: true, distanceFromSourceM }, practice);
    expect(passes(at(15.24), 'isolator-out-of-reach')).toBe(1);
    expect(found(at(15.3), 'isolator-out-of-reach')[0]!.limit.value).toBe(15.24);
    expect(found(at(15.3, 'iec-land'), 'isolator-out-of-reach')).toEqual([]);
  });
});
