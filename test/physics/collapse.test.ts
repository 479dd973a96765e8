/** Constant-power loads near and beyond what a network can deliver; of two solutions always the one of higher volts. */
import { describe, expect, it } from 'vitest';
import { ownComplaints } from './againstReference.ts';
import { denseReference, NoSolution } from './denseReference.ts';
import type { JobValue, PartValue } from './jobDraft.ts';
import { outsideLaws } from './outsideLaws.ts';
import { randomJob, seeds } from './randomJob.ts';
import { seededRandom } from './seededRandom.ts';
import { answered, checked, jobOf, stringOf, voltsAt } from './solveValue.ts';

/** One string, one cable out, one load of given watts. */
function simplest(at: {
  readonly emfV: number;
  readonly insideOhm: number;
  readonly cableOhm: number;
  readonly powerW: number;
}): JobValue {
  return jobOf([
    stringOf('bank', { plus: 'P', minus: 'N', emfV: at.emfV, resistanceOhm: at.insideOhm }),
    { id: 'out', kind: 'joint', from: 'P', to: 'L', resistanceOhm: at.cableOhm },
    { id: 'heater', kind: 'load', plus: 'L', minus: 'N', powerW: at.powerW },
  ]);
}

const SIMPLE = seeds({ first: 5001, count: 40 }).map((seed) => {
  const random = seededRandom(seed);
  const emfV = random.between([10, 60]);
  const insideOhm = random.logBetween([1e-3, 0.3]);
  const cableOhm = random.logBetween([1e-3, 0.5]);
  return { emfV, insideOhm, cableOhm, largestW: emfV ** 2 / (4 * (insideOhm + cableOhm)) };
});

describe('one source, one constant-power load', () => {
  it('settles on V = E/2 (1 + sqrt(1 - P/Pmax)), the larger root of V² - E V + P R = 0', () => {
    for (const { largestW, ...rest } of SIMPLE) {
      for (const share of [1e-6, 0.1, 0.5, 0.9, 0.99, 0.9999]) {
        const { point } = answered(simplest({ ...rest, powerW: share * largestW }));
        expect(point.outcome).toBe('solved');
        const rootV = (rest.emfV / 2) * (1 + Math.sqrt(1 - share));
        // Near the nose the root itself moves by a digit of P over sqrt(1 - share).
        expect(Math.abs(voltsAt(point, 'L') - rootV) / rootV).toBeLessThan(1e-11 / Math.sqrt(1 - share));
      }
    }
  });

  it('collapses beyond E²/(4 R), names the load, and says within 0.1 % how much it could have', () => {
    for (const { largestW, ...rest } of SIMPLE) {
      for (const share of [1.001, 1.1, 2, 50]) {
        const { point } = answered(simplest({ ...rest, powerW: share * largestW }));
        expect(point.outcome).toBe('collapse');
        expect(point.collapse?.load).toBe('heater');
        expect(point.collapse?.wantedW).toBeCloseTo(share * largestW, 6);
        expect(Math.abs(point.collapse!.largestDeliverableW / largestW - 1)).toBeLessThan(1e-3);
        expect(point.collapse?.message).toContain('heater');
      }
    }
  });

  it('drops the load out instead where its minimum volts end the fall first', () => {
    for (const { largestW, ...rest } of SIMPLE.slice(0, 10)) {
      const value = simplest({ ...rest, powerW: 1.5 * largestW });
      const parts = value.parts.map((part) => (part.id === 'heater' ? { ...part, minimumV: 0.8 * rest.emfV } : part));
      const { point } = answered({ ...value, parts });
      expect(point.outcome).toBe('solved');
      const heater = [...point.parts.values()].find(({ id }) => id === 'heater');
      expect(heater).toMatchObject({ state: 'dropped-out', currentA: 0 });
    }
  });
});

/** A random linear job and a place in it, seen from there as one source behind one resistance (by the dense reference). */
function thevenin(seed: number): {
  readonly value: JobValue;
  readonly place: PartValue;
  readonly openV: number;
  readonly ohm: number;
} {
  const drawn = randomJob({ seed, partCount: 8 + (seed % 30), linear: true });
  const place = drawn.parts.find(({ kind }) => kind === 'load')!;
  const value = { ...drawn, parts: drawn.parts.filter((part) => part !== place) };
  const across = (amps: number): number => {
    const probe = { id: 'probe', kind: 'load', plus: place['plus'], minus: place['minus'], currentA: amps };
    const { job, operatingCase } = checked({ ...value, parts: [...value.parts, probe] });
    const { volts } = denseReference({ job, operatingCase, laws: outsideLaws(job) });
    const named = new Map<string, number>(volts);
    return named.get(String(place['plus']))! - named.get(String(place['minus']))!;
  };
  const openV = across(0);
  return { value, place, openV, ohm: (openV - across(100)) / 100 };
}

describe('one constant-power load among several sources and other loads', () => {
  const cases = seeds({ first: 5101, count: 40 }).map(thevenin);
  const withWatts = (at: (typeof cases)[number], powerW: number): JobValue => {
    const load = { id: 'heavy', kind: 'load', plus: at.place['plus'], minus: at.place['minus'], powerW };
    return { ...at.value, parts: [...at.value.parts, load] };
  };

  it('settles on the larger root of its Thévenin source just below Voc²/(4 R)', () => {
    for (const at of cases) {
      const largestW = at.openV ** 2 / (4 * at.ohm);
      for (const share of [0.3, 0.9, 0.999]) {
        const { point } = answered(withWatts(at, share * largestW));
        expect(point.outcome).toBe('solved');
        const volts = voltsAt(point, String(at.place['plus'])) - voltsAt(point, String(at.place['minus']));
        const rootV = (at.openV / 2) * (1 + Math.sqrt(1 - share));
        // The Thévenin resistance comes from a difference of volts: good to about 1e-9 of itself.
        expect(Math.abs(volts - rootV) / rootV).toBeLessThan(1e-8 / Math.sqrt(1 - share));
      }
    }
  });

  it('collapses just above it, with the largest power within 0.1 %', () => {
    for (const at of cases) {
      const largestW = at.openV ** 2 / (4 * at.ohm);
      for (const share of [1.002, 3]) {
        const { point } = answered(withWatts(at, share * largestW));
        expect(point.outcome).toBe('collapse');
        expect(point.collapse).toMatchObject({ load: 'heavy' });
        expect(Math.abs(point.collapse!.largestDeliverableW / largestW - 1)).toBeLessThan(1e-3);
      }
    }
  });
});

/** A linear job whose loads all draw fixed watts, `share` times those drawn. */
function powerJob(seed: number, share: number): JobValue {
  const drawn = randomJob({ seed, partCount: 8 + (seed % 30), linear: true });
  const emfV = Number(drawn.parts.find(({ kind }) => kind === 'string')!['emfV']);
  const parts = drawn.parts.map((part): PartValue => {
    if (part.kind !== 'load') return part;
    const { currentA, resistanceOhm, ...rest } = part;
    const watts = currentA === undefined ? emfV ** 2 / Number(resistanceOhm) : emfV * Number(currentA);
    return { ...rest, id: part.id, kind: part.kind, powerW: share * watts };
  });
  return { ...drawn, parts };
}

function referenceFeeds(value: JobValue): boolean {
  const { job, operatingCase } = checked(value);
  try {
    denseReference({ job, operatingCase, laws: outsideLaws(job) });
    return true;
  } catch (error) {
    if (error instanceof NoSolution) return false;
    throw error;
  }
}

/** Largest share of all loads together that the reference can still feed, within 1 %. */
function largestShare(seed: number): number {
  let fed = 1;
  while (referenceFeeds(powerJob(seed, 2 * fed))) fed *= 2;
  let lost = 2 * fed;
  while (lost / fed > 1.01) {
    const middle = Math.sqrt(fed * lost);
    if (referenceFeeds(powerJob(seed, middle))) fed = middle;
    else lost = middle;
  }
  return fed;
}

describe('many constant-power loads', () => {
  const cases = seeds({ first: 5201, count: 20 }).map((seed) => ({ seed, share: largestShare(seed) }));

  it('are all fed just below the largest share that the reference can feed, and collapse just above it', () => {
    for (const { seed, share } of cases) {
      const below = answered(powerJob(seed, 0.97 * share));
      expect(below.point.outcome, `seed ${seed} at 0.97 of ${share}`).toBe('solved');
      expect(ownComplaints(below)).toEqual([]);
      const above = answered(powerJob(seed, 1.03 * share));
      expect(above.point.outcome, `seed ${seed} at 1.03 of ${share}`).toBe('collapse');
      const { load, largestDeliverableW, message } = above.point.collapse!;
      expect(message).toContain(load);
      expect(largestDeliverableW).toBeGreaterThan(0);
    }
  });

  it('see their volts fall, each of them, with every rise of all powers from none to the largest', () => {
    for (const { seed, share } of cases) {
      let before = new Map<string, number>();
      for (const part of [1e-6, 0.2, 0.4, 0.6, 0.8, 0.97]) {
        const { point } = answered(powerJob(seed, part * share));
        expect(point.outcome).toBe('solved');
        const now = new Map<string, number>();
        for (const load of powerJob(seed, 1).parts.filter(({ kind }) => kind === 'load')) {
          const volts = voltsAt(point, String(load['plus'])) - voltsAt(point, String(load['minus']));
          const wasV = before.get(load.id) ?? Infinity;
          expect(volts, `seed ${seed}, ${load.id}`).toBeLessThan(wasV);
          now.set(load.id, volts);
        }
        before = now;
      }
    }
  });
});
