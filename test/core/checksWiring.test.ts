/** What the drawing says: shorts, crossed leads, what is not fed, not connected, never used, not protected. */
import { describe, expect, test } from 'vitest';
import { battery, check, found, gaps, oneCircuit, passes, type RawPart } from './checksJob.ts';

const lamp: RawPart = { id: 'L1', kind: 'load', plus: 'P', minus: 'N', currentA: 5 };
const link = (id: string, from: string, to: string, resistanceOhm = 0): RawPart => ({
  id,
  kind: 'joint',
  from,
  to,
  resistanceOhm,
});

describe('dead-short', () => {
  test('a sound bank has none', () => {
    const report = check({ parts: [battery('B1'), battery('B2', { emfV: 13.1 }), lamp] });
    expect(found(report, 'dead-short')).toEqual([]);
    expect(passes(report, 'dead-short')).toBe(2);
  });

  test('a link of no resistance across the poles is a stop, with the whole short-circuit current', () => {
    const [finding] = found(check({ parts: [battery('B1'), link('J1', 'P', 'N'), lamp] }), 'dead-short');
    expect(finding).toMatchObject({ severity: 'stop', parts: ['B1'] });
    expect(finding!.measured.value).toBeCloseTo(13.2 / 0.002, 6);
    expect(finding!.message).toContain('closed wiring parts join its plus (P) and minus (N)');
  });

  test('an open switch in the path makes it none, and a case that closes it is told', () => {
    const parts = [battery('B1'), { id: 'SW', kind: 'switch', from: 'P', to: 'N', state: 'open' }, lamp];
    expect(found(check({ parts }), 'dead-short')).toEqual([]);
    const cases = [{ id: 'day' }, { id: 'oops', set: { SW: { state: 'closed' } } }];
    expect(found(check({ parts, cases }), 'dead-short')[0]).toMatchObject({ severity: 'stop', case: 'oops' });
  });

  test('a fifth of the short-circuit current is the line: exactly at it a leak to be fixed, above it a stop', () => {
    // R of the path = 4 R of the string gives exactly a fifth: 13.2 V / 10 mohm = 1320 A.
    const at = (milliohm: number) =>
      found(
        check({ parts: [battery('B1', { maxDischargeA: 2000 }), link('J1', 'P', 'N', milliohm / 1000), lamp] }),
        'dead-short',
      )[0]!;
    expect(at(8).severity).toBe('fix');
    expect(at(8).measured.value).toBeCloseTo(1320, 6);
    expect(at(8).message).toContain('8 mΩ');
    expect(at(7.9).severity).toBe('stop');
  });

  test('a path that takes more than the string may give for long is a stop too', () => {
    const parts = [battery('B1', { maxDischargeA: 100 }), link('J1', 'P', 'N', 0.1), lamp];
    const [finding] = found(check({ parts }), 'dead-short'); // 13.2 V / 102 mohm = 129 A
    expect(finding).toMatchObject({ severity: 'stop', limit: { value: 100, unit: 'A' } });
  });

  test('strings of 12 and 24 V side by side drive each other like a short', () => {
    const parts = [battery('B1'), battery('B2', { blocksInSeries: 2, emfV: 26.4, resistanceOhm: 0.004 }), lamp];
    const findings = found(check({ parts }), 'dead-short');
    expect(findings.map(({ parts }) => parts[0])).toEqual(['B1', 'B2']);
    expect(findings[0]!.message).toContain('reversed or of other volts');
  });

  test('a dead cell evens out far below the line: that is another matter', () => {
    // Three 12 V blocks, one with a dead cell: 171 A into it, against 1325 A of short-circuit current.
    const parts = [
      battery('B1', { emfV: 12.6, resistanceOhm: 0.005794 }),
      battery('B2', { emfV: 12.6, resistanceOhm: 0.005794 }),
      battery('B3', { emfV: 10.6, resistanceOhm: 0.008794 }),
      lamp,
    ];
    expect(found(check({ parts }), 'dead-short')).toEqual([]);
  });

  test('a charger with its poles joined is told by the drawing', () => {
    const parts = [
      battery('B1'),
      { id: 'C1', kind: 'charger', plus: 'X', minus: 'Y', outputA: 10, setpointV: 14 },
      link('J1', 'X', 'Y'),
      lamp,
    ];
    expect(found(check({ parts }), 'dead-short')[0]).toMatchObject({ severity: 'stop', parts: ['C1'] });
  });
});

describe('polarity-crossed', () => {
  test.each([{ currentA: 5 }, { powerW: 50 }, { resistanceOhm: 2 }])(
    'a load with its leads swapped is a stop (%j)',
    (draws) => {
      const parts = [battery('B1'), { id: 'L1', kind: 'load', plus: 'N', minus: 'P', ...draws }];
      const [finding] = found(check({ parts }), 'polarity-crossed');
      expect(finding).toMatchObject({ severity: 'stop', parts: ['L1'], limit: { value: 0, unit: 'V' } });
      expect(finding!.measured.value).toBeLessThan(-13);
    },
  );

  test('the right way round passes, whether the part is on or off', () => {
    const parts = [
      battery('B1'),
      { ...lamp, on: false },
      { id: 'C1', kind: 'charger', plus: 'P', minus: 'N', outputA: 5, setpointV: 14 },
    ];
    const report = check({ parts });
    expect(found(report, 'polarity-crossed')).toEqual([]);
    expect(passes(report, 'polarity-crossed')).toBe(3);
  });

  test('a charger that is off is told too', () => {
    const parts = [
      battery('B1'),
      { id: 'C1', kind: 'charger', plus: 'N', minus: 'P', outputA: 5, setpointV: 14, on: false },
    ];
    expect(found(check({ parts }), 'polarity-crossed')[0]!.parts).toEqual(['C1']);
  });

  test('a string joined the wrong way round to another is told for both', () => {
    const report = check({ parts: [battery('B1'), battery('B2', { plus: 'N', minus: 'P' })] });
    expect(found(report, 'polarity-crossed').map(({ parts }) => parts)).toEqual([
      ['B1', 'B2'],
      ['B2', 'B1'],
    ]);
    expect(found(report, 'dead-short')).toHaveLength(2);
  });

  test('strings in series are not crossed', () => {
    const parts = [battery('LOW', { plus: 'X' }), battery('HIGH', { minus: 'X' }), lamp];
    expect(found(check({ parts }), 'polarity-crossed')).toEqual([]);
  });

  test('an array joined the wrong way round to its controller is told by the drawing', () => {
    const parts = [
      battery('B1'),
      {
        id: 'A1',
        kind: 'array',
        plus: 'X',
        minus: 'Y',
        modulesInSeries: 1,
        stringsInParallel: 1,
        vocV: 40,
        iscA: 9,
        vmpV: 33,
        impA: 8.5,
      },
      {
        id: 'K1',
        kind: 'controller',
        from: { plus: 'Y', minus: 'X' },
        to: { plus: 'P', minus: 'N' },
        type: 'mppt',
        outputA: 30,
        maxInputV: 100,
        setpointV: 14.2,
      },
    ];
    expect(found(check({ parts }), 'polarity-crossed').map(({ parts }) => parts)).toContainEqual(['A1', 'K1']);
  });
});

describe('load-collapse', () => {
  test('a load beyond what the network can deliver is a stop, with both powers', () => {
    // E²/(4 R) = 13.2²/(4 x 10 mohm) = 4356 W.
    const parts = [
      battery('B1', { resistanceOhm: 0.01 }),
      { id: 'L1', kind: 'load', plus: 'P', minus: 'N', powerW: 5000 },
    ];
    const report = check({ parts });
    const [finding] = found(report, 'load-collapse');
    expect(finding).toMatchObject({ severity: 'stop', parts: ['L1'], limit: { value: 5000, unit: 'W' } });
    expect(finding!.measured.value).toBeCloseTo(4356, 2); // golden-section search to 1e-5 in ln g
    // What needs an operating point says that it was not done.
    expect(gaps(report, 'load-starved')).toEqual([
      'operating point of case as-drawn: a load asks for more than the network can deliver',
    ]);
    expect(passes(report, 'load-starved')).toBe(0);
  });

  test('a case that solves is a pass', () => {
    expect(passes(check({ parts: [battery('B1'), lamp], cases: [{ id: 'a' }, { id: 'b' }] }), 'load-collapse')).toBe(2);
  });
});

describe('load-unfed', () => {
  test('a load whose return is missing is told with the side that is', () => {
    const parts = [battery('B1'), { ...lamp, minus: 'NOWHERE' }];
    const [finding] = found(check({ parts }), 'load-unfed');
    expect(finding).toMatchObject({ severity: 'fix', parts: ['L1'] });
    expect(finding!.message).toContain('NOWHERE');
  });

  test('a load that is fed in one case of two is as it was meant', () => {
    const parts = [
      battery('B1'),
      { id: 'SW', kind: 'switch', from: 'P', to: 'L', state: 'open' },
      { ...lamp, plus: 'L' },
    ];
    expect(found(check({ parts }), 'load-unfed')).toHaveLength(1);
    const cases = [{ id: 'day' }, { id: 'night', set: { SW: { state: 'closed' } } }];
    const report = check({ parts, cases });
    expect(found(report, 'load-unfed')).toEqual([]);
    expect(passes(report, 'load-unfed')).toBe(1);
  });

  test('a job without any source feeds nothing', () => {
    const report = check({ parts: [lamp] });
    expect(found(report, 'load-unfed')[0]).toMatchObject({ severity: 'fix', parts: ['L1'] });
    expect(gaps(report, 'load-starved')).toEqual(['operating point of case as-drawn: no source in it']);
  });
});

describe('group-unconnected', () => {
  test('a group with no source is a note, once for all cases', () => {
    const parts = [battery('B1'), lamp, link('J1', 'X', 'Y', 1), link('J2', 'Y', 'X', 1)];
    const cases = [{ id: 'a' }, { id: 'b' }];
    const findings = found(check({ parts, cases }), 'group-unconnected');
    expect(findings).toHaveLength(1);
    expect(findings[0]).toMatchObject({ severity: 'note', parts: ['J1', 'J2'] });
  });

  test('a job in one piece passes', () => {
    expect(passes(check(oneCircuit({})), 'group-unconnected')).toBe(1);
  });
});

describe('part-never-used', () => {
  test('what is off or open in every case is a note; once on is enough', () => {
    const parts = [
      battery('B1'),
      { ...lamp, on: false },
      { id: 'SW', kind: 'switch', from: 'P', to: 'X', state: 'open' },
    ];
    const findings = found(check({ parts }), 'part-never-used');
    expect(findings.map(({ parts, severity }) => [...parts, severity])).toEqual([
      ['L1', 'note'],
      ['SW', 'note'],
    ]);
    const cases = [{ id: 'a' }, { id: 'b', set: { L1: { on: true }, SW: { state: 'closed' } } }];
    expect(passes(check({ parts, cases }), 'part-never-used')).toBe(2);
  });
});

describe('end-open', () => {
  test('a cable that ends in the air is a note that names the junction', () => {
    const parts = [battery('B1'), lamp, { id: 'W1', kind: 'cable', from: 'P', to: 'TYPO', lengthM: 1, size: '6 mm2' }];
    const findings = found(check({ parts }), 'end-open');
    expect(findings).toHaveLength(1);
    expect(findings[0]).toMatchObject({ severity: 'note', parts: ['W1'] });
    expect(findings[0]!.message).toContain('TYPO');
  });

  test('spare places on a busbar and a midpoint for a meter are no loose ends', () => {
    const parts = [
      battery('B1', { midpoint: 'MID' }),
      { id: 'BAR', kind: 'busbar', junctions: ['P', 'SPARE1', 'SPARE2'] },
      lamp,
    ];
    expect(found(check({ parts }), 'end-open')).toEqual([]);
  });
});

describe('no-fuse-on-source', () => {
  test('a fuse in either conductor is enough for this rule', () => {
    expect(passes(check(oneCircuit({})), 'no-fuse-on-source')).toBe(1);
    const inMinus = [
      battery('B1'),
      { id: 'F1', kind: 'breaker', from: 'N', to: 'M', ratingA: 50 },
      { ...lamp, minus: 'M' },
    ];
    expect(passes(check({ parts: inMinus }), 'no-fuse-on-source')).toBe(1);
  });

  test('a load or charger joined straight to the string is a stop that names it', () => {
    const more = [{ id: 'C1', kind: 'charger', plus: 'P', minus: 'N', outputA: 20, setpointV: 14.4 }];
    const [finding] = found(check(oneCircuit({ more })), 'no-fuse-on-source');
    expect(finding).toMatchObject({ severity: 'stop', parts: ['B1', 'C1'] });
    expect(finding!.message).toBe('String B1 is joined to C1 with no fuse or breaker in between.');
  });

  test('a tap on part of a bank counts: the midpoint of a string, the middle of two in series', () => {
    const mid = [battery('B1', { midpoint: 'MID' }), { ...lamp, plus: 'MID' }];
    expect(found(check({ parts: mid }), 'no-fuse-on-source')).toHaveLength(1);
    const series = [
      battery('LOW', { plus: 'X' }),
      battery('HIGH', { minus: 'X' }),
      { id: 'F1', kind: 'fuse', from: 'P', to: 'Q', ratingA: 10 },
      { ...lamp, plus: 'Q' },
      { ...lamp, id: 'TAP', plus: 'X' },
    ];
    expect(found(check({ parts: series }), 'no-fuse-on-source').map(({ parts }) => parts)).toEqual([['LOW', 'TAP']]);
  });

  test('a string behind a fuse of its own is not joined to what hangs bare on another with the same minus', () => {
    const parts = [
      battery('B1'),
      { id: 'F1', kind: 'fuse', from: 'P', to: 'Q', ratingA: 10 },
      { ...lamp, plus: 'Q' },
      battery('B2', { plus: 'P2' }),
      { ...lamp, id: 'BARE', plus: 'P2' },
    ];
    const report = check({ parts });
    expect(found(report, 'no-fuse-on-source').map(({ parts: ids }) => ids)).toEqual([['B2', 'BARE']]);
    expect(passes(report, 'no-fuse-on-source')).toBe(1);
  });

  test('two strings joined before a common fuse feed nothing without it', () => {
    const parts = [
      battery('B1'),
      battery('B2'),
      { id: 'F1', kind: 'fuse', from: 'P', to: 'Q', ratingA: 10 },
      { ...lamp, plus: 'Q' },
    ];
    expect(passes(check({ parts }), 'no-fuse-on-source')).toBe(2);
  });
});
