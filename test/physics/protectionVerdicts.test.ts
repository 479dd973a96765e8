/** Verdicts on fault current only ever move one way: more source, more cable, more age. */
import { assert, double, integer, property, record } from 'fast-check';
import { describe, expect, test } from 'vitest';
import { CheckContext } from '../../core/checks/checkContext.ts';
import { faultTooWeak } from '../../core/checks/clearingRules.ts';
import { faultsOf } from '../../core/checks/faultFigures.ts';
import { interruptTooLow } from '../../core/checks/interruptRule.ts';
import { runRules } from '../../core/checks/runChecks.ts';
import { tables } from '../../data/index.ts';
import { jobOf, type RawPart } from '../core/checksJob.ts';

interface Bench {
  readonly emfV: number;
  readonly ohm: number;
  readonly strings: number;
  readonly lengthM: number;
  readonly ratingA: number;
  readonly interruptA: number;
}

const drawn = record<Bench>({
  emfV: double({ min: 11.8, max: 13.4, noNaN: true }),
  ohm: double({ min: 0.001, max: 0.02, noNaN: true }),
  strings: integer({ min: 1, max: 3 }),
  lengthM: double({ min: 0.5, max: 30, noNaN: true }),
  ratingA: integer({ min: 10, max: 200 }),
  interruptA: double({ min: 500, max: 30_000, noNaN: true }),
});

/** Strings through a switch each to a bar, a fuse, a run to a load; figures of the strings entered unless they are left out. */
function contextOf({ emfV, ohm, strings, lengthM, ratingA, interruptA }: Bench, string: Record<string, unknown> = {}) {
  const bank = Array.from({ length: strings }, (_, k): RawPart[] => [
    {
      id: `S${k}`,
      kind: 'string',
      plus: `p${k}`,
      minus: 'N',
      chemistry: 'agm',
      blocksInSeries: 1,
      blockNominalV: 12,
      capacityAh: 100,
      emfV,
      resistanceOhm: ohm,
      ...string,
    },
    { id: `SW${k}`, kind: 'switch', from: `p${k}`, to: 'BAR', resistanceOhm: 0.0001 },
  ]).flat();
  const run = { kind: 'pair', from: { plus: 'Q', minus: 'N' }, to: { plus: 'L', minus: 'M' }, lengthM, size: '10 mm2' };
  const job = jobOf({
    parts: [
      ...bank,
      { id: 'F1', kind: 'fuse', from: 'BAR', to: 'Q', ratingA, interruptA, type: 'strip_large', resistanceOhm: 0 },
      { id: 'RUN', ...run },
      { id: 'L1', kind: 'load', plus: 'L', minus: 'M', currentA: 1 },
    ],
  });
  return new CheckContext({ job, tables });
}

function verdictsOf(context: CheckContext) {
  const { findings } = runRules(context, [interruptTooLow, faultTooWeak]);
  const fault = faultsOf(context).devices.get('F1' as never)!;
  const fails = (rule: string) => findings.some((finding) => finding.rule === rule);
  return {
    highestA: fault.highestA,
    lowestA: fault.lowestA!,
    breaksTooLittle: fails('interrupt-too-low'),
    tooWeak: fails('fault-too-weak'),
  };
}

function implies(first: boolean, then: boolean): boolean {
  return !first || then;
}

/** Rounding of two solves of unlike size. */
const SLACK = 1 + 1e-9;
const runs = { numRuns: 25 };

describe('a source more', () => {
  test('never lowers what a device must break, and never raises its weakest fault', () => {
    assert(
      property(drawn, (bench) => {
        const one = verdictsOf(contextOf(bench));
        const more = verdictsOf(contextOf({ ...bench, strings: bench.strings + 1 }));
        expect(more.highestA * SLACK).toBeGreaterThanOrEqual(one.highestA);
        expect(more.lowestA).toBeLessThanOrEqual(one.lowestA * SLACK);
        expect(implies(one.breaksTooLittle, more.breaksTooLittle)).toBe(true);
        expect(implies(one.tooWeak, more.tooWeak)).toBe(true);
      }),
      runs,
    );
  });
});

describe('a longer cable', () => {
  test('never raises the weakest fault, and leaves what the fuse at the bar must break', () => {
    assert(
      property(drawn, double({ min: 0.1, max: 50, noNaN: true }), (bench, moreM) => {
        const one = verdictsOf(contextOf(bench));
        const longer = verdictsOf(contextOf({ ...bench, lengthM: bench.lengthM + moreM }));
        expect(longer.lowestA).toBeLessThanOrEqual(one.lowestA * SLACK);
        expect(longer.highestA).toBeCloseTo(one.highestA, 3);
        expect(longer.breaksTooLittle).toBe(one.breaksTooLittle);
      }),
      runs,
    );
  });

  test('never makes the weakest fault open a fuse in time that it did not open before', () => {
    // Nor through what the cable stands, k²S²/I²: a fuse lets the more heat through the slower it is.
    assert(
      property(drawn, double({ min: 0.1, max: 50, noNaN: true }), (bench, moreM) => {
        const short = { ...bench, ratingA: Math.max(100, bench.ratingA) };
        const longer = verdictsOf(contextOf({ ...short, lengthM: short.lengthM + moreM }));
        expect(implies(verdictsOf(contextOf(short)).tooWeak, longer.tooWeak)).toBe(true);
      }),
      runs,
    );
  });
});

describe('an older battery', () => {
  test('never raises either fault: it asks no more of the interrupting rating, and no less of the opening', () => {
    assert(
      property(drawn, double({ min: 1, max: 8, noNaN: true }), (bench, ageing) => {
        const fresh = verdictsOf(contextOf(bench));
        const old = verdictsOf(contextOf({ ...bench, ohm: bench.ohm * ageing }));
        expect(old.highestA).toBeLessThanOrEqual(fresh.highestA * SLACK);
        expect(old.lowestA).toBeLessThanOrEqual(fresh.lowestA * SLACK);
        expect(implies(old.breaksTooLittle, fresh.breaksTooLittle)).toBe(true);
        expect(implies(fresh.tooWeak, old.tooWeak)).toBe(true);
      }),
      runs,
    );
  });

  test('with figures assumed from its kind and age neither', () => {
    assert(
      property(drawn, integer({ min: 0, max: 8 }), (bench, years) => {
        const assumed = (ageYears: number) =>
          verdictsOf(contextOf(bench, { emfV: undefined, resistanceOhm: undefined, ageYears }));
        expect(assumed(years + 1).highestA).toBeLessThanOrEqual(assumed(years).highestA * SLACK);
        expect(assumed(years + 1).lowestA).toBeLessThanOrEqual(assumed(years).lowestA * SLACK);
      }),
      runs,
    );
  });

  test('the highest is never below the lowest', () => {
    assert(
      property(drawn, (bench) => {
        const { highestA, lowestA } = verdictsOf(contextOf(bench, { resistanceOhm: undefined }));
        expect(highestA).toBeGreaterThanOrEqual(lowestA);
      }),
      runs,
    );
  });
});
