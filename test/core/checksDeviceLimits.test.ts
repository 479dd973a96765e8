/** Devices and cables against what stands on the parts behind them: inverters, limits, marks, interrupting ratings. */
import { describe, expect, test } from 'vitest';
import { lowestVoltsCurrentA } from '../../core/checks/inverterRules.ts';
import type { InverterPart } from '../../core/job/part.ts';
import { tables } from '../../data/index.ts';
import { battery, check, found, gaps, jobOf, oneCircuit, passes, type RawPart } from './checksJob.ts';

/** P - F1 - Q - OUT - L, an inverter from L to M, M - BACK - N. */
function inverterOn(fields: {
  readonly inverter?: Record<string, unknown>;
  readonly fuse?: Record<string, unknown>;
  readonly cable?: Record<string, unknown>;
  readonly practice?: string;
  readonly more?: readonly RawPart[];
}) {
  const cable = { kind: 'cable', lengthM: 1, size: '150 mm2', run: 'free-air', insulationDegC: 90, ...fields.cable };
  return {
    ...(fields.practice === undefined ? {} : { practice: fields.practice }),
    site: { ambientDesignDegC: 30 },
    parts: [
      battery('B1', { blocksInSeries: 2, emfV: 26.4 }),
      { id: 'F1', kind: 'fuse', from: 'P', to: 'Q', ratingA: 200, ...fields.fuse },
      { id: 'OUT', from: 'Q', to: 'L', ...cable },
      { id: 'BACK', from: 'M', to: 'N', ...cable },
      {
        id: 'INV',
        kind: 'inverter',
        plus: 'L',
        minus: 'M',
        ratedW: 2500,
        efficiency: 0.85,
        cutoffV: 22,
        acPowerW: 100,
        ...fields.inverter,
      },
      ...(fields.more ?? []),
    ],
  };
}

describe('inverter-cable', () => {
  const parsed = jobOf(inverterOn({})).parts.find((part): part is InverterPart => part.kind === 'inverter')!;

  test('2500 W at 22 V and 0.85 draw 133.7 A, 167.1 A with the margin, 235.4 A before a factor of 0.71', () => {
    // T5: public lesson on stand-alone solar systems, printed as 134, 167 and 235 A.
    const drawA = lowestVoltsCurrentA(parsed, 22);
    expect(drawA).toBeCloseTo(133.69, 2);
    expect(1.25 * drawA).toBeCloseTo(167.11, 2);
    expect((1.25 * drawA) / 0.71).toBeCloseTo(235.37, 2);
  });

  test('cable and fuse of at least that pass, a fuse of exactly that too', () => {
    expect(passes(check(inverterOn({})), 'inverter-cable')).toBe(3);
    const exactA = (1.25 * 2500) / (0.85 * 22);
    expect(passes(check(inverterOn({ fuse: { ratingA: exactA } })), 'inverter-cable')).toBe(3);
  });

  test('a fuse between the current and the margin is for a person to judge, and a fix by the land code', () => {
    const fuse = { ratingA: 150 };
    const [finding] = found(check(inverterOn({ fuse })), 'inverter-cable');
    expect(finding).toMatchObject({ severity: 'look', parts: ['F1', 'INV'], limit: { value: 150, unit: 'A' } });
    expect(finding!.measured.value).toBeCloseTo(167.11, 2);
    expect(found(check(inverterOn({ fuse, practice: 'us-land' })), 'inverter-cable')[0]!.severity).toBe('fix');
  });

  test('below the current itself it is to be fixed, cables as well', () => {
    const findings = found(check(inverterOn({ cable: { size: '16 mm2' }, fuse: { ratingA: 100 } })), 'inverter-cable');
    const told = new Set(findings.map(({ severity, parts }) => `${severity} ${parts[0]}`));
    expect(told).toEqual(new Set(['fix BACK', 'fix F1', 'fix OUT']));
  });

  test('without a cut-off its largest current is not known', () => {
    const report = check(inverterOn({ inverter: { cutoffV: undefined } }));
    expect(gaps(report, 'inverter-cable')).toEqual(['cutoffV of inverter INV: at its lowest volts it draws the most']);
    expect(passes(report, 'inverter-cable')).toBe(0);
  });
});

describe('fuse-over-device-limit', () => {
  const limited = (maxFuseA: number | undefined, ratingA: number) =>
    check(inverterOn({ inverter: { maxFuseA }, fuse: { ratingA } }));

  test('a fuse of exactly the printed limit passes, a larger one is a fix', () => {
    expect(passes(limited(250, 250), 'fuse-over-device-limit')).toBe(1);
    const [finding] = found(limited(250, 300), 'fuse-over-device-limit');
    expect(finding).toMatchObject({
      severity: 'fix',
      parts: ['INV', 'F1'],
      measured: { value: 300, unit: 'A' },
      limit: { value: 250, unit: 'A' },
    });
    expect(finding!.basis).toContain('110.3(B)');
  });

  test('an inverter without the figure is asked about, a load is not', () => {
    expect(gaps(limited(undefined, 250), 'fuse-over-device-limit')).toEqual([
      'maxFuseA of inverter INV: the largest fuse printed for it',
    ]);
    expect(gaps(check(oneCircuit({})), 'fuse-over-device-limit')).toEqual([]);
  });

  test('of a load on a branch without a fuse of its own, the one that feeds the branch counts', () => {
    const load = { id: 'L2', kind: 'load', plus: 'Q', minus: 'N', currentA: 1, maxFuseA: 10 };
    const [finding] = found(check(oneCircuit({ fuse: { ratingA: 60 }, more: [load] })), 'fuse-over-device-limit');
    expect(finding).toMatchObject({ parts: ['L2', 'F1'], measured: { value: 60, unit: 'A' } });
  });

  test('its own fuse goes before the one of the branch, and a string counts the fuse in its own lead', () => {
    const own = [
      { id: 'F2', kind: 'fuse', from: 'Q', to: 'X', ratingA: 10 },
      { id: 'L2', kind: 'load', plus: 'X', minus: 'N', currentA: 1, maxFuseA: 10 },
    ];
    const report = check(oneCircuit({ fuse: { ratingA: 60 }, battery: { maxFuseA: 50 }, more: own }));
    expect(found(report, 'fuse-over-device-limit').map(({ parts }) => parts)).toEqual([['B1', 'F1']]);
    expect(passes(report, 'fuse-over-device-limit')).toBe(1);
  });
});

describe('ac-part-on-dc', () => {
  const marked = (fuse: Record<string, unknown>, series = 1) =>
    check(oneCircuit({ fuse, battery: { blocksInSeries: series, emfV: 13.2 * series } }));

  test('a part that is said not to be for direct current is a stop', () => {
    const [finding] = found(marked({ dcRated: false, ratingV: 250 }), 'ac-part-on-dc');
    expect(finding).toMatchObject({ severity: 'stop', parts: ['F1'] });
  });

  test('one that is said to be, or whose volts are given on a low system, passes', () => {
    expect(passes(marked({ dcRated: true }), 'ac-part-on-dc')).toBe(1);
    expect(passes(marked({ ratingV: 32 }), 'ac-part-on-dc')).toBe(1);
    expect(passes(marked({ ratingV: 80, type: 'gG' }, 4), 'ac-part-on-dc')).toBe(1);
  });

  test('above 30 V the mark is asked for, at 30 V not; without volts it is always asked for', () => {
    expect(gaps(marked({ ratingV: 80 }, 4), 'ac-part-on-dc')[0]).toContain('dcRated of fuse F1');
    const at30 = check(
      oneCircuit({ fuse: { ratingV: 80 }, battery: { blocksInSeries: 2, blockNominalV: 15, emfV: 29 } }),
    );
    expect(passes(at30, 'ac-part-on-dc')).toBe(1);
    const none = marked({});
    expect(gaps(none, 'ac-part-on-dc')).toEqual(['dcRated of fuse F1: is it marked for direct current?']);
    expect(passes(none, 'ac-part-on-dc')).toBe(0);
  });
});

describe('interrupt-unknown', () => {
  test('a device with the figure passes, one without is worth a look, with what its type usually breaks', () => {
    expect(passes(check(oneCircuit({ fuse: { interruptA: 1000 } })), 'interrupt-unknown')).toBe(1);
    const [finding] = found(check(oneCircuit({ fuse: { type: 'blade' } })), 'interrupt-unknown');
    expect(finding).toMatchObject({ severity: 'look', parts: ['F1'] });
    expect(finding!.message).toContain('1 kA up to 32 V');
    expect(finding!.basis).toContain('240.60(C)');
  });
});

describe('big-bank-needs-more', () => {
  const bank = (string: Record<string, unknown>, fuse: Record<string, unknown>, practice = 'us-marine') =>
    check(oneCircuit({ practice, battery: string, fuse }));
  const large = { capacityAh: 600, shortCircuitA: 8000 };

  test('of a bank of 500 Ah and no more nothing is asked', () => {
    const report = bank({ capacityAh: 500, shortCircuitA: 8000 }, { interruptA: 1000 });
    expect(found(report, 'big-bank-needs-more')).toEqual([]);
    expect(passes(report, 'big-bank-needs-more')).toBe(0);
  });

  test('of a larger one the main device is to break what the maker gives, exactly that passes', () => {
    expect(passes(bank(large, { interruptA: 8000 }), 'big-bank-needs-more')).toBe(1);
    const [finding] = found(bank(large, { interruptA: 5000 }), 'big-bank-needs-more');
    expect(finding).toMatchObject({
      severity: 'fix',
      parts: ['F1', 'B1'],
      measured: { value: 8000, unit: 'A' },
      limit: { value: 5000, unit: 'A' },
    });
    expect(finding!.basis).toContain('ABYC E-11');
    expect(found(bank(large, { interruptA: 5000 }, 'iec-land'), 'big-bank-needs-more')[0]!.severity).toBe('look');
  });

  test('above 10 kA, 20 kA at 125 V will do', () => {
    const huge = { capacityAh: 900, shortCircuitA: 30_000 };
    expect(passes(bank(huge, { interruptA: 20_000, ratingV: 125 }), 'big-bank-needs-more')).toBe(1);
    expect(found(bank(huge, { interruptA: 20_000, ratingV: 80 }), 'big-bank-needs-more')).toHaveLength(1);
  });

  test('more than 2200 cranking amperes make a bank large as well', () => {
    const starting = { capacityAh: 200, shortCircuitA: 6000 };
    expect(found(bank({ ...starting, crankingA: 2201 }, { interruptA: 5000 }), 'big-bank-needs-more')).toHaveLength(1);
    expect(found(bank({ ...starting, crankingA: 2200 }, { interruptA: 5000 }), 'big-bank-needs-more')).toEqual([]);
  });

  test("without the maker's short-circuit current it is not checked, unless the fuse breaks enough for any", () => {
    const unsaid = { capacityAh: 600 };
    expect(gaps(bank(unsaid, { interruptA: 5000 }), 'big-bank-needs-more')[0]).toContain('shortCircuitA of string B1');
    expect(passes(bank(unsaid, { interruptA: 20_000, ratingV: 125 }), 'big-bank-needs-more')).toBe(1);
  });

  test('strings side by side add up, and a fuse in a string breaks what the others send', () => {
    const string = (id: string, plus: string) => battery(id, { plus, capacityAh: 300, shortCircuitA: 3000 });
    const job = (main: readonly RawPart[]) =>
      check({
        practice: 'us-marine',
        parts: [...main, { id: 'L1', kind: 'load', plus: 'L', minus: 'N', currentA: 1 }],
      });
    const oneMain = job([
      string('B1', 'P'),
      string('B2', 'P'),
      string('B3', 'P'),
      { id: 'F1', kind: 'fuse', from: 'P', to: 'L', ratingA: 100, interruptA: 5000 },
    ]);
    expect(found(oneMain, 'big-bank-needs-more')[0]!.measured.value).toBe(9000);
    const each = job(
      [1, 2, 3].flatMap((k) => [
        string(`B${k}`, `P${k}`),
        { id: `F${k}`, kind: 'fuse', from: `P${k}`, to: 'L', ratingA: 100, interruptA: 5000 },
      ]),
    );
    expect(found(each, 'big-bank-needs-more').map(({ measured }) => measured.value)).toEqual([6000, 6000, 6000]);
  });

  test('its figures stand in the table of the trade rule', () => {
    const { crankingA, capacityAh, mainA, fromShortA, mainV } = tables.devices.largeBank;
    expect([crankingA, capacityAh, mainA, fromShortA, mainV].map(({ value }) => value)).toEqual([
      2200, 500, 20_000, 10_000, 125,
    ]);
  });
});
