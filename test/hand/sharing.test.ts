/**
 * How strings share, and what flows at rest, against sums done by hand. A star: strings of EMF E_k behind R_k on common bars:
 *
 *   Ē = Σ(E/R)/Σ(1/R),   V = Ē - I/Σ(1/R),   I_k = (E_k - V)/R_k,   and string k carries nothing at I = (Ē - E_k) Σ(1/R).
 *
 * Scenario S01 and the rows T23 and T24 of the table of battery checks give the figures.
 */
import { describe, expect, it } from 'vitest';
import { atRestOf, heaviestCase, operatingPoint, sharingOf } from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import type { RawPart, RawString } from './bankJob.ts';
import { caseOf, charger, jobOf, load, sharedOf, star, stringPart } from './bankJob.ts';

function share(parts: readonly RawPart[], cases?: readonly object[], caseId = 'as-drawn') {
  const job = jobOf(parts, cases);
  return sharingOf({ job, tables, operatingCase: caseOf(job, caseId), model: 'slow' });
}
const rest = (parts: readonly RawPart[], cases?: readonly object[]) => atRestOf({ job: jobOf(parts, cases), tables });

/** T23, T24: 12.73, 12.73, 12.30 V; 6, 6, 9 mΩ. Σ(1/R) = 444.44 S, Ē = 12.6225 V. */
const UNLIKE: readonly RawString[] = [
  { emfV: 12.73, ohm: 0.006 },
  { emfV: 12.73, ohm: 0.006 },
  { emfV: 12.3, ohm: 0.009 },
];
/** S01: strings of two blocks, leads included. A, B old: 25.10 V, 13.93 mΩ; C new: 25.40 V, 7.93 mΩ. */
const CABIN: readonly RawString[] = [
  { emfV: 25.1, ohm: 0.01393, capacityAh: 150, more: { blocksInSeries: 2 } },
  { emfV: 25.1, ohm: 0.01393, capacityAh: 150, more: { blocksInSeries: 2 } },
  { emfV: 25.4, ohm: 0.00793, capacityAh: 200, more: { blocksInSeries: 2 } },
];

describe('sharing in a star', () => {
  it('T24: at 100 A the low string is charged while its bank discharges', () => {
    const sharing = share([...star(UNLIKE), load({ currentA: 100 })]);
    // V = 12.6225 - 100/444.44 = 12.3975 V; (12.73 - 12.3975)/6 mΩ = 55.417 A; (12.30 - 12.3975)/9 mΩ = -10.833 A.
    expect(sharedOf(sharing, 'S1').currentA).toBeCloseTo(0.3325 / 0.006, 9);
    expect(sharedOf(sharing, 'S3').currentA).toBeCloseTo(-0.0975 / 0.009, 9);
    expect(sharing.strings.map(({ opposes }) => opposes)).toEqual([false, false, true]);
    // Fair is a third each: 0.55417/0.33333 - 1 = 0.6625; -0.10833/0.33333 - 1 = -1.325.
    expect(sharedOf(sharing, 'S1').deviation).toBeCloseTo(0.6625, 9);
    expect(sharing.spread).toBeCloseTo(1.325, 9);
    expect(sharedOf(sharing, 'S3').fairA).toBeCloseTo(100 / 3, 9);
    expect(sharedOf(sharing, 'S3').cRate).toBeCloseTo(0.10833333, 8);
    expect(sharing.banksA[0]).toBeCloseTo(100, 9);
  });

  it('the low string begins to give at (Ē - E) Σ(1/R); the others give from the first ampere', () => {
    const sharing = share([...star(UNLIKE), load({ currentA: 100 })]);
    // (12.6225 - 12.30) · 444.444 = 143.333 A: beyond the 100 A of the case.
    expect(sharedOf(sharing, 'S3').signChangeA).toBeCloseTo(0.3225 * (4 / 0.009), 6);
    expect(sharedOf(sharing, 'S1').signChangeA).toBeNull();
  });

  it('S01: C gives 72 % of the first 80 A, and takes 13 % of a charge of 60 A', () => {
    const loaded = share([...star(CABIN), load({ currentA: 80 })]);
    expect(sharedOf(loaded, 'S3').currentA).toBeCloseTo(57.55, 2);
    expect(sharedOf(loaded, 'S1').currentA).toBeCloseTo(11.23, 2);
    expect(sharedOf(loaded, 'S3').share).toBeCloseTo(0.72, 2);
    // By capacity C is due 200/500.
    expect(sharedOf(loaded, 'S3').fairShare).toBeCloseTo(0.4, 12);
    const charged = share([...star(CABIN), charger(60)]);
    expect(sharedOf(charged, 'S3').currentA).toBeCloseTo(-7.92, 2);
    expect(sharedOf(charged, 'S1').currentA).toBeCloseTo(-26.04, 2);
    expect(sharedOf(charged, 'S3').share).toBeCloseTo(0.13, 2);
    expect(charged.banksA[0]).toBeCloseTo(-60, 9);
  });

  it('on charge the new string goes on giving until (Ē - E) Σ(1/R) flows into the bank; the old ones take from the first ampere', () => {
    const sharing = share([...star(CABIN), charger(60)]);
    const siemens = CABIN.reduce((sum, { ohm }) => sum + 1 / ohm, 0);
    const meanV = CABIN.reduce((sum, { emfV, ohm }) => sum + emfV / ohm, 0) / siemens;
    // (25.2403 - 25.40) · 269.67 = -43.06 A.
    expect(sharedOf(sharing, 'S3').signChangeA).toBeCloseTo((meanV - 25.4) * siemens, 6);
    expect(sharedOf(sharing, 'S1').signChangeA).toBeNull();
  });

  it('a bank that carries less than C/50 has currents but no shares', () => {
    const light = share([...star(CABIN), load({ currentA: 9.9 })]);
    expect(light.strings.map((string) => string.share)).toEqual([null, null, null]);
    expect(light.spread).toBeNull();
    expect(sharedOf(light, 'S3').currentA).toBeGreaterThan(20);
    const heavier = share([...star(CABIN), load({ currentA: 10.1 })]);
    expect(sharedOf(heavier, 'S3').share).not.toBeNull();
  });

  it('limits are those of the direction: as entered, else by chemistry', () => {
    const strings = [
      { ...UNLIKE[0]!, more: { maxDischargeA: 90 } },
      UNLIKE[1]!,
      { ...UNLIKE[2]!, more: { maxChargeA: 25 } },
    ];
    const sharing = share([...star(strings), load({ currentA: 100 })]);
    expect(sharedOf(sharing, 'S1').limit).toEqual({
      limitA: 90,
      basis: { source: 'SRC-JOB-ENTRY', text: 'maxDischargeA of string S1 as entered (label)', status: 'published' },
    });
    // An absorbed-glass-mat string of 100 Ah: one capacity an hour, from memory.
    expect(sharedOf(sharing, 'S2').limit).toMatchObject({ limitA: 100, basis: { status: 'from-memory' } });
    expect(sharedOf(sharing, 'S3').limit).toMatchObject({ limitA: 25 });
  });
});

describe('banks that are not a plain star', () => {
  it('one string alone has its whole share', () => {
    const sharing = share([...star([UNLIKE[0]!]), load({ currentA: 10 })]);
    expect(sharing.strings).toMatchObject([
      { share: 1, fairShare: 1, deviation: 0, opposes: false, signChangeA: null },
    ]);
  });

  it('strings in series share the current of their branch, and its least capacity makes its fair share', () => {
    const parts = [
      stringPart('A1', { plus: 'am', minus: 'bus-' }, { emfV: 12.6, ohm: 0.005, capacityAh: 80 }),
      stringPart('A2', { plus: 'bus+', minus: 'am' }, { emfV: 12.6, ohm: 0.005, capacityAh: 100 }),
      stringPart(
        'B',
        { plus: 'bus+', minus: 'bus-' },
        { emfV: 25.2, ohm: 0.03, capacityAh: 120, more: { blocksInSeries: 2 } },
      ),
      load({ currentA: 40 }),
    ];
    // Equal EMFs: the split is 30 mΩ to 10 mΩ, 30 A and 10 A. Fair by 80 Ah and 120 Ah: 16 A and 24 A.
    const sharing = share(parts);
    expect(sharing.strings.map(({ id, bank }) => [id, bank])).toEqual([
      ['A1', 0],
      ['A2', 0],
      ['B', 0],
    ]);
    for (const id of ['A1', 'A2']) {
      expect(sharedOf(sharing, id).currentA).toBeCloseTo(30, 9);
      expect(sharedOf(sharing, id).deviation).toBeCloseTo(30 / 16 - 1, 9);
    }
    expect(sharedOf(sharing, 'B').deviation).toBeCloseTo(10 / 24 - 1, 9);
    expect(sharing.banksA[0]).toBeCloseTo(40, 9);
  });

  it('a string behind its open fuse is a bank by itself and carries nothing', () => {
    const sharing = share(
      [...star(UNLIKE), load({ currentA: 60 })],
      [{ id: 'open', set: { F2: { state: 'open' } } }],
      'open',
    );
    expect(sharedOf(sharing, 'S2')).toMatchObject({ bank: 1, currentA: 0, share: null });
    expect(sharing.banksA[0]).toBeCloseTo(60, 9);
    expect(sharing.banksA[1]).toBe(0);
    // The line to rest has the same fuse open: Ē = (12.73/6 + 12.30/9)/(1/6 + 1/9), (Ē - 12.30) · 277.78 = 71.667 A.
    expect(sharedOf(sharing, 'S3').signChangeA).toBeCloseTo(0.43 / 0.006, 6);
  });

  it('a case without an answer has strings and limits, and no figures', () => {
    const sharing = share([...star(UNLIKE), load({ powerW: 50_000 })]);
    expect(sharing.outcome).toBe('collapse');
    expect(sharing.banksA).toEqual([null]);
    expect(sharing.spread).toBeNull();
    expect(sharedOf(sharing, 'S1')).toMatchObject({
      currentA: null,
      share: null,
      cRate: null,
      signChangeA: null,
      opposes: false,
    });
    expect(sharedOf(sharing, 'S1').limit?.limitA).toBe(100);
  });

  it('points that are at hand are used as they are', () => {
    const job = jobOf([...star(UNLIKE), load({ currentA: 100 })]);
    const request = { job, tables, operatingCase: caseOf(job), model: 'slow' as const };
    const atRest = operatingPoint({ ...request, operatingCase: caseOf(job, 'at-rest') });
    const given = sharingOf({ ...request, point: operatingPoint(request), rest: atRest });
    expect(given).toEqual(sharingOf(request));
  });

  it('the heaviest case is the steady one that takes most from the strings', () => {
    const cases = [
      { id: 'light' },
      { id: 'heavy', set: { LOAD: { currentA: 70 } } },
      { id: 'start', surge: 'LOAD' },
      { id: 'off', set: { LOAD: { on: false } } },
    ];
    const job = jobOf([...star(UNLIKE), load({ currentA: 20, surgeW: 3000 })], cases);
    const points = job.cases.map((operatingCase) => operatingPoint({ job, tables, operatingCase, model: 'slow' }));
    expect(heaviestCase({ job, tables, points })?.id).toBe('heavy');
    expect(heaviestCase({ job, tables, points: points.filter((point) => point.case === 'off') })).toBeUndefined();
  });
});

describe('circulating at rest', () => {
  it('T23: the two high strings feed the low one, half each', () => {
    const atRest = rest([...star(UNLIKE), load({ currentA: 100 })]);
    // V = 12.6225: (12.73 - 12.6225)/6 mΩ = 17.917 A twice, (12.30 - 12.6225)/9 mΩ = -35.833 A.
    expect(atRest.strings.map(({ currentA }) => currentA)).toEqual([
      expect.closeTo(0.1075 / 0.006, 9),
      expect.closeTo(0.1075 / 0.006, 9),
      expect.closeTo(-0.3225 / 0.009, 9),
    ]);
    // G_13 = (1/6)(1/9)/(4/9) · 1000 = 41.667 S; · 0.43 V = 17.917 A. S1 and S2 have the same EMF: nothing between them.
    expect(atRest.pairs).toEqual([
      { from: 'S1', to: 'S3', currentA: expect.closeTo(0.43 / 0.024, 9) },
      { from: 'S2', to: 'S3', currentA: expect.closeTo(0.43 / 0.024, 9) },
    ]);
    expect(atRest.remainderA).toBeLessThan(1e-9);
    // 2 · 17.917² · 6 mΩ + 35.833² · 9 mΩ = 15.408 W; 35.833 A · 24 h = 860 Ah.
    expect(atRest.lostW).toBeCloseTo(2 * 0.1075 ** 2 * (1 / 0.006) + 0.3225 ** 2 / 0.009, 6);
    expect(atRest.givenA).toBeCloseTo(35.8333, 4);
    expect(atRest.givenAhPerDay).toBeCloseTo(860, 6);
  });

  it('S01: C pours 20.14 A into A and B, 10.07 A each', () => {
    const atRest = rest(star(CABIN));
    expect(atRest.pairs).toEqual([
      { from: 'S3', to: 'S1', currentA: expect.closeTo(10.07, 2) },
      { from: 'S3', to: 'S2', currentA: expect.closeTo(10.07, 2) },
    ]);
    expect(atRest.givenA).toBeCloseTo(20.14, 2);
  });

  it('S19: two good blocks pour 85.53 A each into the one with a dead cell', () => {
    const cableOhm = 0.0007940891428571429;
    const block = (emfV: number, ohm: number): RawString => ({
      emfV,
      ohm,
      more: { chemistry: 'flooded', linkOhm: cableOhm },
    });
    const atRest = rest(star([block(12.6, 0.005), block(12.6, 0.005), block(10.6, 0.008)]));
    // Σ(1/R) = 2/5.794 + 1/8.794 per mΩ; V = 12.1044; (12.6 - 12.1044)/5.794 mΩ.
    expect(atRest.strings[0]!.currentA).toBeCloseTo(85.534904, 5);
    expect(atRest.strings[2]!.currentA).toBeCloseTo(-171.069808, 5);
    expect(atRest.pairs.map(({ from, to }) => `${from} ${to}`)).toEqual(['S1 S3', 'S2 S3']);
  });

  it('equal strings give each other nothing at all', () => {
    const atRest = rest(star([UNLIKE[0]!, UNLIKE[1]!]));
    expect(atRest).toMatchObject({ outcome: 'solved', pairs: [], lostW: 0, givenA: 0, givenAhPerDay: 0 });
    expect(atRest.remainderA).toBeLessThan(1e-9);
  });

  it('banks that nothing joins have no pair', () => {
    const apart = [
      ...star([UNLIKE[0]!, UNLIKE[2]!]),
      stringPart('E', { plus: 'e+', minus: 'bus-' }, { emfV: 12, ohm: 0.004 }),
      { id: 'LINK', kind: 'switch', from: 'e+', to: 'bus+', state: 'open' },
    ];
    const names = (parts: readonly RawPart[]) => rest(parts).pairs.map(({ from, to }) => `${from} ${to}`);
    expect(names(apart)).toEqual(['S1 S2']);
    const linked = apart.map((part) => (part.id === 'LINK' ? { ...part, state: 'closed' } : part));
    expect(names(linked)).toEqual(['S1 E', 'S2 E', 'S1 S2']);
  });

  it('strings in series go by the first of them, with the EMF of the branch', () => {
    const atRest = rest([
      stringPart('A1', { plus: 'am', minus: 'bus-' }, { emfV: 12.8, ohm: 0.005 }),
      stringPart('A2', { plus: 'bus+', minus: 'am' }, { emfV: 12.6, ohm: 0.005 }),
      stringPart('B', { plus: 'bus+', minus: 'bus-' }, { emfV: 25.2, ohm: 0.03, more: { blocksInSeries: 2 } }),
    ]);
    // (12.8 + 12.6 - 25.2)/(10 + 30 mΩ) = 5 A.
    expect(atRest.pairs).toEqual([{ from: 'A1', to: 'B', currentA: expect.closeTo(5, 9) }]);
    expect(atRest.strings.map(({ id }) => id)).toEqual(['A1', 'A2', 'B']);
    expect(atRest.givenA).toBeCloseTo(5, 9);
    expect(atRest.remainderA).toBeLessThan(1e-9);
  });
});

it('a job without strings, and one string that nothing feeds, have nothing to share', () => {
  const none = jobOf([charger(10), load({ currentA: 1 })]);
  expect(atRestOf({ job: none, tables }).pairs).toEqual([]);
  expect(sharingOf({ job: none, tables, operatingCase: caseOf(none), model: 'slow' })).toMatchObject({
    strings: [],
    banksA: [],
    spread: null,
  });
  const alone = atRestOf({ job: jobOf(star([UNLIKE[0]!])), tables });
  expect(alone).toMatchObject({ pairs: [], remainderA: 0, lostW: 0, givenA: 0 });
});
