/** A whole job from a handful of figures: what it holds, what it marks, and that nothing about it is to be stopped or fixed. */
import { describe, expect, it } from 'vitest';
import { draftOf, draftText, operatingPoint, originOf, runChecks, type SmallJob, startSmall } from '../../core/api.ts';
import { tables } from '../../data/index.ts';

const hut: SmallJob = {
  title: 'Hut',
  practice: 'iec-land',
  systemV: 12,
  chemistry: 'agm',
  blockNominalV: 12,
  blocksInParallel: 1,
  capacityAh: 100,
  loadW: 60,
  supply: 'dc',
  bankToMainM: 2,
  mainToLoadM: 5,
};

function made(small: Partial<SmallJob>) {
  const edited = startSmall({ ...hut, ...small }, tables);
  if (!edited.ok) throw new Error(edited.issues.map(({ path, message }) => `${path}: ${message}`).join('\n'));
  return edited.value;
}

function seriousOf(small: Partial<SmallJob>) {
  const { findings } = runChecks({ job: made(small).job, tables });
  return findings.filter(({ severity }) => severity === 'stop' || severity === 'fix');
}

/** Of the run from the switch to the load. */
function areaOf(small: Partial<SmallJob>): number {
  const run = made(small).job.parts.find(({ id }) => id === 'W2');
  return run?.kind === 'pair' && run.size?.system === 'mm2' ? run.size.areaMm2 : Number.NaN;
}

const blocks = [
  ['agm', 12, [12, 24, 48]],
  ['flooded', 6, [12, 24, 48]],
  ['lfp', 12.8, [12, 24, 48]],
  ['lfp', 25.6, [24, 48]],
] as const;
/** Banks that can give what the load asks of them. */
const loads = [
  { loadW: 20, supply: 'dc', capacityAh: 60 },
  { loadW: 200, supply: 'dc', capacityAh: 200 },
  { loadW: 1000, supply: 'ac', capacityAh: 300 },
] as const;

/** Questions about the place and the makers' sheets, which five answers do not hold. */
const ABOUT_THE_PLACE: ReadonlySet<string> = new Set([
  'ac-part-on-dc',
  'backfeed-into-bad-string',
  'bare-live-stud',
  'battery-by-fuel',
  'battery-loose',
  'big-bank-needs-more',
  'busbar-fault',
  'cable-cooks',
  'cable-too-thin',
  'drop-added-up',
  'fault-too-weak',
  'fuse-over-device-limit',
  'gas-no-vent',
  'hot-place',
  'isolator-out-of-reach',
  'no-low-cutoff',
  'spark-near-gas',
  'spring-or-crocodile-clip',
  'wrong-metal-or-solid',
]);

describe('starting small', () => {
  for (const practice of ['us-land', 'us-marine', 'iso-marine', 'iec-land'] as const) {
    for (const [chemistry, blockNominalV, systems] of blocks) {
      it(`leaves nothing to stop or to fix, and asks only what nobody told it: ${practice}, blocks of ${blockNominalV} V ${chemistry}`, () => {
        for (const systemV of systems) {
          for (const blocksInParallel of [1, 3]) {
            for (const load of loads) {
              const small = { ...hut, ...load, practice, chemistry, blockNominalV, systemV, blocksInParallel };
              const { job } = made(small);
              const { findings, notChecked } = runChecks({ job, tables });
              const serious = findings.filter(({ severity }) => severity === 'stop' || severity === 'fix');
              const asked = new Set(notChecked.map(({ rule }) => rule).filter((rule) => !ABOUT_THE_PLACE.has(rule)));
              expect([small, serious, [...asked]]).toStrictEqual([small, [], []]);
            }
          }
        }
      });
    }
  }

  it('marks every figure that was not asked for', () => {
    for (const small of [{}, { blocksInParallel: 2, supply: 'ac' as const, blockNominalV: 6 }]) {
      const { job } = made(small);
      const asked = new Set(['chemistry', 'blocksInSeries', 'blockNominalV', 'capacityAh', 'powerW', 'acPowerW']);
      const touching = new Set(['plus', 'minus', 'from', 'to', 'junctions']);
      const unmarked = job.parts.flatMap((part) =>
        [...part.given]
          .filter((field) => !asked.has(field) && !touching.has(field) && originOf(part, field) === 'label')
          .map((field) => `${part.id} ${field}`),
      );
      expect(unmarked).toStrictEqual(['W1 lengthM', 'W2 lengthM']);
    }
  });

  it('lists under its answer what it assumed', () => {
    const { job } = made({});
    const point = operatingPoint({ job, operatingCase: job.cases[0]!, tables, model: 'slow' });
    expect(point.outcome).toBe('solved');
    expect(point.assumptions.map(({ field }) => field)).toEqual(expect.arrayContaining(['emfV', 'resistanceOhm']));
  });

  it('takes a thicker cable for a longer way, and a larger fuse for a larger load', () => {
    expect(areaOf({ mainToLoadM: 20 })).toBeGreaterThan(areaOf({}));
    const rating = (small: Partial<SmallJob>) => {
      const fuse = made(small).job.parts.find(({ id }) => id === 'F1');
      return fuse?.kind === 'fuse' ? fuse.ratingA : Number.NaN;
    };
    expect(rating({ loadW: 150 })).toBeGreaterThan(rating({}));
  });

  it('says by findings where no listed size will do, and where the bank is too small for the load', () => {
    expect(seriousOf({ loadW: 9000, mainToLoadM: 30 })).not.toHaveLength(0);
    const tooSmall = { loadW: 400, supply: 'ac', capacityAh: 20 } as const;
    expect(seriousOf(tooSmall).map(({ rule }) => rule)).toContain('load-starved');
    // The cable is no thicker than for a bank that is large enough.
    expect(areaOf(tooSmall)).toBeLessThanOrEqual(areaOf({ ...tooSmall, capacityAh: 300 }));
  });

  it('says what is wrong with a figure that no job can hold', () => {
    for (const wrong of [{ mainToLoadM: -1 }, { loadW: Number.NaN }, { capacityAh: 0 }, { title: '\u0000' }]) {
      const refused = startSmall({ ...hut, ...wrong }, tables);
      expect(refused.ok ? [] : refused.issues).not.toHaveLength(0);
    }
  });

  it('is a job file like any other', () => {
    const { draft } = made({ blocksInParallel: 2 });
    const again = draftOf(draftText(draft));
    expect(again.ok && again.value.draft).toStrictEqual(draft);
  });
});
