/** Joins worked by hand, with the working beside the sum. */
import { describe, expect, it } from 'vitest';
import { answerOf, ids, jobOf, joint, stringPart } from '../core/joiningJobs.ts';

/** Strings on a star, each through a fuse and a pair of leads of 0.5 mohm a conductor. */
function star(strings: readonly ReturnType<typeof stringPart>[], fuseA: number) {
  return jobOf([
    ...strings,
    ...strings.flatMap(({ id }) => [
      joint(`L${String(id)}+`, `${String(id)}+`, `${String(id)} fused`, 0.0005),
      { id: `F-${String(id)}`, kind: 'fuse', from: `${String(id)} fused`, to: 'PLUS', ratingA: fuseA },
      joint(`L${String(id)}-`, `${String(id)}-`, 'MINUS', 0.0005),
    ]),
  ]);
}

const goodA = stringPart('A', { emfV: 12.6, resistanceOhm: 0.005 });
const goodB = stringPart('B', { emfV: 12.6, resistanceOhm: 0.005 });
const dead = stringPart('C', { emfV: 10.6, resistanceOhm: 0.008 });

describe('a block with a dead cell beside good ones', () => {
  const job = star([goodA, goodB, dead], 40);

  it('10.6 V beside 12.6 V: the first instant, its limit, and the resistor that keeps to it', () => {
    const answer = answerOf({ job, a: { strings: ids('A') }, b: { strings: ids('C') } });
    // 5 + 8 mohm, and two leads of two conductors of 0.5 mohm: 15 mohm; 2 V / 15 mohm = 133.333 A.
    expect(answer.loopOhm).toBeCloseTo(0.015, 12);
    expect(answer.leadOhm).toBeCloseTo(0.002, 12);
    expect(answer.inrushA).toBeCloseTo(400 / 3, 8);
    expect(answer.giver).toBe('A');
    // Fifth of 100 Ah is 20 A, under the fuses of 40 A and AGM's 0.4 C charge limit of 40 A.
    expect(answer.limits.map(({ what, limitA }) => [what, Math.round(limitA)])).toEqual([
      ['C/5 of the smaller', 20],
      ['charge limit of C', 40],
      ['fuse F-A', 40],
      ['fuse F-C', 40],
    ]);
    // 20 A x 15 mohm = 0.3 V; 2 V / 20 A = 100 mohm, less 15: 85 mohm, and 400 A2 x 85 mohm = 34 W.
    expect(answer.within).toBe(false);
    expect(answer.safeGapV).toBeCloseTo(0.3, 10);
    expect(answer.resistor?.ohm).toBeCloseTo(0.085, 10);
    expect(answer.resistor?.w).toBeCloseTo(34, 7);
  });

  it('says that a cell may be dead, and that the good one would be empty before the two come to rest', () => {
    const { assumed, movedAh, resistor } = answerOf({ job, a: { strings: ids('A') }, b: { strings: ids('C') } });
    // An empty AGM block rests at 11.8 V: 1.2 V above this one.
    expect(assumed.join('\n')).toMatch(/"C" at 10\.6 V lies 1\.2 V below that of an empty one.*a cell may be dead/);
    expect(assumed.join('\n')).toMatch(/A would be empty before the two come to rest/);
    // 12.6 V is 75 % by the curve, all of which goes.
    expect(movedAh).toBeCloseTo(75, 6);
    expect(resistor?.untilS).toBeNull();
  });

  it('two good ones together are one source of half the resistance', () => {
    const answer = answerOf({ job, a: { strings: ids('A', 'B') }, b: { strings: ids('C') } });
    // (5 + 1)/2 + 8 + 1 = 12 mohm; 2 V / 12 mohm = 166.667 A. Of the strings alone 5/2 + 8 = 10.5 mohm.
    expect(answer.a).toBe('A+B');
    expect(answer.loopOhm).toBeCloseTo(0.012, 12);
    expect(answer.leadOhm).toBeCloseTo(0.0015, 12);
    expect(answer.inrushA).toBeCloseTo(500 / 3, 8);
    // Half of the current in the fuse of each good one: 80 A of the joint make its 40 A.
    expect(answer.limits.find(({ what }) => what === 'fuse F-A')?.limitA).toBeCloseTo(80, 8);
  });
});

it('unlike strings of a bank weigh in the gap by their conductances, as Thévenin has it', () => {
  const job = star(
    [
      stringPart('A', { emfV: 12.8, resistanceOhm: 0.005 }),
      stringPart('B', { emfV: 12.5, resistanceOhm: 0.011 }),
      goodCopy(),
    ],
    200,
  );
  const answer = answerOf({ job, a: { strings: ids('A', 'B') }, b: { strings: ids('G') } });
  // Branches of 6 and 12 mohm: shares 2/3 and 1/3, E = (2 x 12.8 + 12.5)/3 = 12.7 V; R = 4 mohm beside 6 mohm.
  expect(answer.gapV).toBeCloseTo(12.7 - 12.2, 9);
  expect(answer.inrushA).toBeCloseTo(0.5 / 0.01, 6);
});

function goodCopy() {
  return stringPart('G', { emfV: 12.2, resistanceOhm: 0.005 });
}

it('two strings in series read 25.2 V and stand against one of two blocks at 24.0 V', () => {
  const job = jobOf([
    stringPart('L', { resistanceOhm: 0.004, plus: 'MIDDLE', minus: 'MINUS' }),
    stringPart('U', { resistanceOhm: 0.004, plus: 'U+', minus: 'MIDDLE' }),
    stringPart('W', { blocksInSeries: 2, resistanceOhm: 0.008, minus: 'MINUS' }),
    { id: 'S', kind: 'switch', from: 'U+', to: 'W+', state: 'open', ratingA: 50 },
  ]);
  const answer = answerOf({
    job,
    a: { strings: ids('L', 'U'), volts: 25.2 },
    b: { strings: ids('W'), volts: 24 },
  });
  // 4 + 4 + 8 mohm, no leads drawn; 1.2 V / 16 mohm = 75 A.
  expect(answer.gapV).toBeCloseTo(1.2, 9);
  expect(answer.loopOhm).toBeCloseTo(0.016, 12);
  expect(answer.inrushA).toBeCloseTo(75, 7);
  // Half of 25.2 V is 75 % of an AGM block, half of 24.0 V 25 %: both end at half charge, 25 Ah later.
  expect(answer.movedAh).toBeCloseTo(25, 6);
  expect(answer.limits.find(({ what }) => what === 'switch S')?.limitA).toBeCloseTo(50, 8);
  expect(answer.assumed).toContain('state: the switch "S" taken as closed by the joint');
});
