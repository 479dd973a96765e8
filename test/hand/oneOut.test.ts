/**
 * One string or device gone, against sums by hand. Scenario S17: three equal blocks of 13.2 V with limits of 100 A, on leads that make
 * R1 = R2, R3. Equal EMFs split by conductance alone: I_k = I (1/R_k)/Σ(1/R_j) over those that are left.
 */
import { describe, expect, it } from 'vitest';
import type { OneOutStudy } from '../../core/api.ts';
import { oneOutOf } from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import type { RawPart, RawString } from './bankJob.ts';
import { caseOf, charger, jobOf, load, star, stringPart } from './bankJob.ts';

type OneLoss = OneOutStudy['losses'][number];

function studies(parts: readonly RawPart[], cases?: readonly object[], caseId = 'as-drawn'): readonly OneOutStudy[] {
  const job = jobOf(parts, cases);
  return oneOutOf({ job, tables, operatingCase: caseOf(job, caseId), model: 'slow' });
}
function study(parts: readonly RawPart[]): OneOutStudy {
  const [first, ...others] = studies(parts);
  expect(others).toEqual([]);
  return first!;
}
function without(of: OneOutStudy, lost: string): OneLoss {
  const found = of.losses.find((loss) => loss.lost === lost);
  if (found === undefined) throw new Error(`${lost} is not lost: ${of.losses.map((loss) => loss.lost).join(' ')}`);
  return found;
}
const currents = (loss: OneLoss) => loss.strings.map(({ currentA }) => currentA);

/** S17: ρ = 0.0172414 Ω mm²/m, 35 mm², two leads of 0.5 m or 1.5 m, four joints of 0.1 mΩ, 2.5 mΩ a block. */
const ohmOf = (leadM: number) => 0.0025 + 4 * 0.0001 + (2 * leadM * 0.0172414) / 35;
const limits = { maxDischargeA: 100, maxChargeA: 50 };
const hut = [0.5, 0.5, 1.5].map((leadM): RawString => ({ emfV: 13.2, ohm: ohmOf(leadM), more: limits }));

describe('S17: three blocks with limits of 100 A, a load of 240 A', () => {
  const found = study([...star(hut), load({ currentA: 240 })]);

  it('each block and each fuse is lost in turn, and a fuse takes its block along', () => {
    expect(found.losses.map(({ lost, kind, without: gone }) => [lost, kind, ...gone])).toEqual([
      ['S1', 'string', 'S1'],
      ['S2', 'string', 'S2'],
      ['S3', 'string', 'S3'],
      ['F1', 'device', 'S1'],
      ['F2', 'device', 'S2'],
      ['F3', 'device', 'S3'],
    ]);
    expect(found.bankA).toBeCloseTo(240, 9);
  });

  it('with block 2 gone the others carry 135.2 A and 104.8 A, with block 3 gone 120 A each', () => {
    for (const lost of ['S2', 'F2']) {
      expect(currents(without(found, lost))).toEqual([expect.closeTo(135.214924, 5), expect.closeTo(104.785076, 5)]);
    }
    expect(currents(without(found, 'S3'))).toEqual([expect.closeTo(120, 9), expect.closeTo(120, 9)]);
    expect(without(found, 'S3').strings.every(({ overLimit, limit }) => overLimit && limit?.limitA === 100)).toBe(true);
  });

  it('277.5 A is the most with all three, 177.5 A the most that survives any one loss', () => {
    // 100 A / 0.36037 and 100 A / 0.56340, the larger shares.
    expect(found.largestA).toBeCloseTo(240 * (100 / 86.487983), 4);
    expect(found.survivesA).toBeCloseTo(240 * (100 / 135.214924), 4);
    expect(without(found, 'S3').largestA).toBeCloseTo(200, 6);
  });

  it('any loss is a cascade: the two that are left are both beyond their limit', () => {
    expect(without(found, 'S1').cascade).toEqual([['S2', 'S3']]);
    expect(without(found, 'S3').cascade).toEqual([['S1', 'S2']]);
  });

  it('at 170 A all losses hold; at the limit exactly nothing cuts out', () => {
    const light = study([...star(hut), load({ currentA: 170 })]);
    expect(
      light.losses.every(({ cascade, strings }) => cascade.length === 0 && strings.every((s) => !s.overLimit)),
    ).toBe(true);
    const exact = study([...star(hut), load({ currentA: 200 })]);
    expect(without(exact, 'S3').cascade).toEqual([]);
    expect(without(exact, 'S3').largestA).toBeCloseTo(200, 6);
  });

  it('on charge the limits are those of charging, and the bank currents negative', () => {
    const charged = study([...star(hut), charger(120)]);
    expect(charged.bankA).toBeCloseTo(-120, 9);
    expect(charged.largestA).toBeCloseTo(-240 * (50 / 86.487983), 4);
    expect(charged.survivesA).toBeCloseTo(-240 * (50 / 135.214924), 4);
    expect(without(charged, 'S2').strings[0]).toMatchObject({ limit: { limitA: 50 }, overLimit: true });
  });
});

it('a cascade runs in waves: the next gives way under what the first left', () => {
  // Equal strings of 100 A, 120 A and 150 A and a fourth: 260 A is 65 A each, then 86.7 A, and so on.
  const strings = [100, 100, 140, 200].map(
    (maxDischargeA): RawString => ({ emfV: 12.8, ohm: 0.005, more: { maxDischargeA } }),
  );
  // 320 A over three: 106.7 A, beyond 100 A. Without S4: S1 and S2 go, S3 alone has 320 A and goes too.
  const found = study([...star(strings), load({ currentA: 320 })]);
  expect(without(found, 'S4').cascade).toEqual([['S1', 'S2'], ['S3']]);
  // Without S1: S2 goes at 106.7 A, S3 and S4 have 160 A each: S3 goes, S4 alone has 320 A.
  expect(without(found, 'S1').cascade).toEqual([['S2'], ['S3'], ['S4']]);
});

describe('what flows at rest counts too', () => {
  const strings: readonly RawString[] = [
    { emfV: 12.8, ohm: 0.01, more: { maxDischargeA: 50, maxChargeA: 20 } },
    { emfV: 12.6, ohm: 0.01, more: { maxDischargeA: 50, maxChargeA: 20 } },
    { emfV: 12.6, ohm: 0.01, more: { maxDischargeA: 50, maxChargeA: 20 } },
  ];

  it('the largest bank current lies on the line I_k = (E_k - Ē)/R + I/3', () => {
    // Ē = 12.6667 V. S1 has 13.333 A at rest: 13.333 + I/3 = 50 at I = 110 A. Without S2, Ē = 12.7: 10 + I/2 = 50 at 80 A.
    const found = study([...star(strings), load({ currentA: 60 })]);
    expect(found.largestA).toBeCloseTo(110, 6);
    expect(without(found, 'S2').largestA).toBeCloseTo(80, 6);
    // Without S1 the two that are left are equal: 100 A.
    expect(without(found, 'S1').largestA).toBeCloseTo(100, 6);
    expect(found.survivesA).toBeCloseTo(80, 6);
  });

  it('where one string gives too much from rest on, no current of the bank will do', () => {
    const high = [{ ...strings[0]!, emfV: 14.2 }, ...strings.slice(1)];
    // Without S3: (14.2 - 12.6)/20 mΩ = 80 A at rest already.
    const found = study([...star(high), load({ currentA: 60 })]);
    expect(without(found, 'S3').largestA).toBe(0);
    expect(found.survivesA).toBe(0);
  });

  it('S19: with the dead block out the other two rest', () => {
    const found = study(
      star([
        { emfV: 12.6, ohm: 0.0058 },
        { emfV: 12.6, ohm: 0.0058 },
        { emfV: 10.6, ohm: 0.0088 },
      ]),
    );
    expect(currents(without(found, 'S3'))).toEqual([0, 0]);
    expect(without(found, 'S1').strings[1]).toMatchObject({ id: 'S3', overLimit: true });
    // At rest and loaded are one and the same point: no line, no largest current.
    expect(found.largestA).toBeNull();
  });
});

describe('loads of constant power', () => {
  const pair: readonly RawString[] = [
    { emfV: 12, ohm: 0.02, more: { maxDischargeA: 150 } },
    { emfV: 12, ohm: 0.02, more: { maxDischargeA: 150 } },
  ];

  it('a load that one string cannot carry alone collapses: no currents, and the largest current by its amps', () => {
    // E²/4R = 3600 W from both, 1800 W from one.
    const found = study([...star(pair), load({ powerW: 2000 })]);
    const loss = without(found, 'S1');
    expect(loss).toMatchObject({ outcome: 'collapse', cascade: [] });
    expect(loss.strings).toMatchObject([{ id: 'S2', currentA: null, overLimit: false }]);
    expect(loss.largestA).toBeCloseTo(150, 6);
    expect(found.survivesA).toBeCloseTo(150, 6);
    expect(found.largestA).toBeCloseTo(300, 6);
  });

  it('a load that drops out with a string gone is named, and the largest current is still that of its amps', () => {
    // 100 A from both: 11 V at the bar; from one alone 10 V, below what the load needs.
    const found = study([...star(pair), load({ currentA: 100, minimumV: 10.5 })]);
    const loss = without(found, 'S1');
    expect(loss).toMatchObject({ outcome: 'solved', droppedOut: ['LOAD'], cascade: [] });
    expect(currents(loss)).toEqual([0]);
    expect(loss.largestA).toBeCloseTo(150, 6);
    const kept = study([...star(pair), load({ currentA: 100, minimumV: 9.9 })]);
    expect(without(kept, 'S1').droppedOut).toEqual([]);
  });

  it('a case that has no answer even with all strings has no study', () => {
    expect(studies([...star(pair), load({ powerW: 5000 })])).toEqual([]);
  });
});

describe('which devices are of the strings', () => {
  it('a main fuse, an open fuse and the fuse of a load are not', () => {
    const parts = [
      ...star(hut.slice(0, 2)),
      { id: 'MAIN', kind: 'fuse', from: 'bus+', to: 'out+', ratingA: 300 },
      { id: 'SPARE', kind: 'switch', from: 'bus+', to: 'spare', state: 'open' },
      { id: 'F-LOAD', kind: 'breaker', from: 'out+', to: 'load+', ratingA: 100 },
      load({ currentA: 50 }, { plus: 'load+', minus: 'bus-' }),
    ];
    expect(study(parts).losses.map(({ lost }) => lost)).toEqual(['S1', 'S2', 'F1', 'F2']);
  });

  it('one that cuts off two of three is, though these go on feeding each other', () => {
    const parts = [
      stringPart('A', { plus: 'bus+', minus: 'bus-' }, hut[0]!),
      stringPart('B', { plus: 'far+', minus: 'bus-' }, hut[1]!),
      stringPart('C', { plus: 'far+', minus: 'bus-' }, hut[2]!),
      { id: 'TIE', kind: 'breaker', from: 'far+', to: 'bus+', ratingA: 300 },
      load({ currentA: 50 }),
    ];
    const found = study(parts);
    expect(found.losses.map(({ lost, without: gone }) => [lost, ...gone])).toEqual([
      ['A', 'A'],
      ['B', 'B'],
      ['C', 'C'],
      ['TIE', 'B', 'C'],
    ]);
    expect(currents(without(found, 'TIE'))).toEqual([expect.closeTo(50, 9)]);
  });

  it('a branch of two strings in series is lost as one', () => {
    const parts = [
      stringPart('A1', { plus: 'am', minus: 'bus-' }, { emfV: 12.6, ohm: 0.005 }),
      { id: 'F-MID', kind: 'fuse', from: 'am', to: 'am2', ratingA: 200 },
      stringPart('A2', { plus: 'bus+', minus: 'am2' }, { emfV: 12.6, ohm: 0.005 }),
      stringPart('B', { plus: 'bus+', minus: 'bus-' }, { emfV: 25.2, ohm: 0.01, more: { blocksInSeries: 2 } }),
      load({ currentA: 40 }),
    ];
    expect(study(parts).losses.map(({ lost, without: gone }) => [lost, ...gone])).toEqual([
      ['A1', 'A1', 'A2'],
      ['B', 'B'],
      ['F-MID', 'A1', 'A2'],
    ]);
  });

  it('a bank of one string has no study', () => {
    expect(studies([...star(hut.slice(0, 1)), load({ currentA: 5 })])).toEqual([]);
  });
});
