/** The join-now check: how it may be asked, and laws that hold for whatever is joined. */
import { describe, expect, it } from 'vitest';
import type { Chemistry } from '../../core/job/part.ts';
import { joiningOf } from '../../core/strings/joining/joining.ts';
import { joinPairs } from '../../core/strings/joining/joinPairs.ts';
import { chargeLine, Settling, type SettlingSide } from '../../core/strings/joining/settling.ts';
import { valueAt } from '../../core/strings/joining/straightLine.ts';
import { tables } from '../../data/index.ts';
import { type SeededRandom, seededRandom } from '../physics/seededRandom.ts';
import { answerOf, ids, jobOf, joint, stringPart } from './joiningJobs.ts';

const bare = jobOf([]);
const block = (chemistry: Chemistry, blockNominalV: number) => ({
  chemistry,
  blocksInSeries: 1,
  blockNominalV,
  capacityAh: 100,
});
const agm = block('agm', 12);
const lfp = block('lfp', 12.8);

describe('asking', () => {
  const job = jobOf([
    stringPart('A', { plus: 'P', minus: 'N' }),
    stringPart('B', { plus: 'P', minus: 'N', stateOfCharge: 0.5 }),
    stringPart('X', { blocksInSeries: 2, minus: 'N' }),
  ]);
  const a = { strings: ids('A') };

  it.each([
    ['a string that is not in the job', { a, b: { strings: ids('Q') } }, /a string called "Q"/],
    ['one string on both sides', { a, b: { strings: ids('A', 'B') } }, /"A" is in both/],
    ['no string and no block', { a, b: {} }, /a string or a block for side 2/],
    ['a charge above full', { a, b: { strings: ids('B'), charge: 1.2 } }, /charge between 0 and 1 of side 2/],
    ['no volts', { a: { ...a, volts: 0 }, b: { strings: ids('B') } }, /volts above 0 of side 1/],
    ['strings that are no one source', { a, b: { strings: ids('B', 'X') } }, /act as one: B\+X/],
    ['a negative lead', { a, b: { strings: ids('B') }, leadOhm: -1 }, /leadOhm/],
    ['a limit of nothing', { a, b: { strings: ids('B') }, limitA: 0 }, /limitA/],
    ['a block of no size', { a, b: { block: { ...agm, capacityAh: 0 } } }, /ampere-hours above 0 of side 2/],
  ])('%s is answered by what to enter', (_, request, missing) => {
    const answer = joiningOf({ job, tables, ...request });
    expect('missing' in answer ? answer.missing : '').toMatch(missing);
  });

  it('as the job has it: both at their own charge, 12.85 V and 12.30 V', () => {
    const answer = answerOf({ job, a, b: { strings: ids('B') } });
    expect(answer.gapV).toBeCloseTo(0.55, 9);
    expect(answer.movedAh).toBeGreaterThan(20);
  });

  it('a reading goes before what the job says, and its charge is read back with its band', () => {
    const answer = answerOf({ job, a: { ...a, volts: 12.6 }, b: { strings: ids('B'), volts: 12.3 } });
    expect(answer.gapV).toBeCloseTo(0.3, 9);
    // 75 % and 50 % of the curve: an eighth of the capacity makes them equal.
    expect(answer.movedAh).toBeCloseTo(12.5, 9);
    expect(answer.assumed.join('\n')).toMatch(
      /that of "A" read back from 12\.6 V at rest: 75 %, between 66 % and 86 %/,
    );
  });

  it('a reading with a charge moves the curve through both', () => {
    const answer = answerOf({ job, a: { ...a, volts: 12.9, charge: 0.75 }, b: { strings: ids('B'), charge: 0.5 } });
    // 12.9 V at 75 % is 0.3 V above the curve: 0.6 V of gap, 12 mV a percent on both sides.
    expect(answer.gapV).toBeCloseTo(0.6, 9);
    expect(answer.movedAh).toBeCloseTo(25, 6);
  });

  it('a limit and a lead of one’s own replace what is found', () => {
    const answer = answerOf({ job, a, b: { strings: ids('B') }, limitA: 7, leadOhm: 0.01 });
    expect(answer.limits.map(({ limitA }) => limitA)).toEqual([7]);
    expect(answer.leadOhm).toBe(0.01);
    expect(answer.safeGapV).toBeCloseTo(7 * answer.loopOhm, 12);
  });

  it('two blocks on a bench have a guessed lead of 2 mohm, and it is said', () => {
    const answer = answerOf({ job: bare, a: { block: agm, charge: 1 }, b: { block: agm, charge: 0.5 } });
    expect(answer.leadOhm).toBe(0.002);
    expect(answer.assumed.join('\n')).toMatch(/leadOhm: 2 mΩ taken .* a guess/);
  });
});

describe('limits', () => {
  const cable = (id: string, from: string, to: string, size: string) => ({
    id,
    kind: 'cable',
    from,
    to,
    lengthM: 0.5,
    size,
  });
  const parts = (size: string) => [
    stringPart('A', { maxDischargeA: 90 }),
    stringPart('B', { stateOfCharge: 0.5, maxChargeA: 12 }),
    cable('PLUS', 'A+', 'B+', size),
    cable('MINUS', 'A-', 'B-', '35 mm2'),
    { id: 'BRK', kind: 'breaker', from: 'B+', to: 'X', ratingA: 10 },
  ];
  const sides = { a: { strings: ids('A') }, b: { strings: ids('B') } };

  it('those of the strings’ own, of the thinnest cable on the way, and nothing that is not on the way; the least counts', () => {
    const { limits, limitA } = answerOf({ job: jobOf(parts('10 mm2')), ...sides });
    const names = limits.map(({ what }) => what);
    expect(new Set(names)).toEqual(
      new Set(['charge limit of B', 'C/5 of the smaller', 'cable PLUS', 'discharge limit of A']),
    );
    expect(limitA).toBe(12);
    expect(limits.every((limit, k) => k === 0 || limit.limitA >= limits[k - 1]!.limitA)).toBe(true);
  });

  it('no book named, no ampacity', () => {
    const job = { ...jobOf(parts('10 mm2')), practiceAssumed: true };
    expect(answerOf({ job, ...sides }).limits.map(({ what }) => what)).not.toContain('cable PLUS');
  });

  it('a cable that no table knows is asked for, but not where the blocks are in no drawing', () => {
    const job = jobOf(parts('3 SAE'));
    expect(joiningOf({ job, tables, ...sides })).toHaveProperty('missing', expect.stringContaining('PLUS'));
    expect(answerOf({ job, a: { block: agm }, b: { block: agm, charge: 0.4 } }).inrushA).toBeGreaterThan(0);
  });
});

it('a reading above that of a full string is taken as full, with the remark that it may not have rested', () => {
  const answer = answerOf({ job: bare, a: { block: agm, volts: 13.2 }, b: { block: agm, charge: 0.8 } });
  expect(answer.assumed.join('\n')).toMatch(
    /"block 1" at 13\.2 V lies 350 mV above that of a full one .*may not have rested/,
  );
});

describe('a flat curve', () => {
  it('iron phosphate at 60 % and 40 %: 34 mV apart, and every charge between a third and two thirds reads alike (T30)', () => {
    const answer = answerOf({ job: bare, a: { block: lfp, charge: 0.6 }, b: { block: lfp, charge: 0.4 } });
    // 3.3032 - 3.2948 V in four cells.
    expect(answer.gapV).toBeCloseTo(0.0336, 9);
    expect(answer.within).toBe(true);
    expect(answer.flat).toBe(true);
    const { a, b } = answer.chargeBand!;
    expect(a[0]).toBeLessThan(0.4);
    expect(b[1]).toBeGreaterThan(0.6);
    expect(answer.movedAh).toBeCloseTo(10, 6);
  });

  it.each([
    ['agm', 12],
    ['flooded', 12],
    ['gel', 12],
    ['nmc', 14.8],
  ] as const)('%s is not called flat at any charge', (chemistry, volts) => {
    for (const charge of [0.1, 0.3, 0.5, 0.7, 0.9, 1]) {
      const side = { block: block(chemistry, volts), charge };
      expect(answerOf({ job: bare, a: side, b: side }).flat).toBe(false);
    }
  });
});

describe('laws of joining', () => {
  const charges = [0, 0.05, 0.15, 0.3, 0.5, 0.7, 0.9, 1] as const;

  it.each([agm, lfp])('the sides may be told either way round ($chemistry)', (kind) => {
    const high = { block: kind, charge: 0.95 };
    const low = { block: { ...kind, capacityAh: 60 }, charge: 0.2 };
    const one = answerOf({ job: bare, a: high, b: low });
    const other = answerOf({ job: bare, a: low, b: high });
    expect(other.gapV).toBeCloseTo(-one.gapV, 12);
    expect([one.giver, other.giver]).toEqual(['block 1', 'block 2']);
    const figures = ({ inrushA, movedAh, settleS, lostWh }: typeof one) => [inrushA, movedAh, settleS, lostWh];
    // Sums in another order: rounding, and what it does to the time on a flat curve.
    figures(other).forEach((figure, k) => {
      expect(Math.abs(figure / figures(one)[k]! - 1)).toBeLessThan(1e-9);
    });
  });

  it.each([agm, lfp])('a wider gap is a larger inrush and moves more ($chemistry)', (kind) => {
    const full = { block: { ...kind, ageYears: 0 }, charge: 1 };
    const answers = charges.map((charge) =>
      answerOf({ job: bare, a: full, b: { block: kind, charge }, leadOhm: 0.05 }),
    );
    for (const [k, answer] of answers.entries()) {
      if (k === 0) continue;
      expect(answer.inrushA).toBeLessThan(answers[k - 1]!.inrushA);
      expect(answer.movedAh).toBeLessThan(answers[k - 1]!.movedAh);
    }
  });

  it('the resistor holds the first instant to the limit, and what it and the loop turn to heat is what is lost', () => {
    const sides = { a: { block: agm, charge: 1 }, b: { block: agm, charge: 0.3 } };
    const direct = answerOf({ job: bare, ...sides });
    const { ohm, untilS, wh } = direct.resistor!;
    const slowed = answerOf({ job: bare, ...sides, leadOhm: direct.leadOhm + ohm });
    expect(direct.curve[0]!.withResistorA).toBeCloseTo(direct.limitA, 9);
    expect(slowed.inrushA).toBeCloseTo(direct.limitA, 9);
    expect(slowed.lostWh).toBeCloseTo(direct.lostWh, 9);
    expect(wh).toBeLessThan(direct.lostWh);
    expect(untilS).toBeGreaterThan(0);
    expect(direct.resistor!.settleS).toBeCloseTo(slowed.settleS, 6);
  });

  it('equal sides have nothing to say to each other', () => {
    const side = { block: lfp, charge: 0.5 };
    const { inrushA, movedAh, settleS, curve } = answerOf({ job: bare, a: side, b: side });
    expect([inrushA, movedAh, settleS]).toEqual([0, 0, 0]);
    expect(curve.every(({ currentA }) => currentA === 0)).toBe(true);
  });

  it('for any curves and elements both end at one voltage, and all that is lost turns to heat, to 1e-9', () => {
    const resting = randomPairs().filter(({ settling }) => !settling.empties);
    expect(resting.length).toBeGreaterThan(100);
    for (const { a, b, settling } of resting) {
      const givenC = settling.giver === 'a' ? settling.movedC : -settling.movedC;
      expect(Math.abs(valueAt(a.emf, givenC) - valueAt(b.emf, -givenC))).toBeLessThan(1e-9);
      const { squaredA2s, elementsJ } = settling.heat;
      const heatWh = (squaredA2s * settling.loopOhm + elementsJ) / 3600;
      expect(Math.abs(heatWh - settling.lostWh)).toBeLessThan(1e-9 * settling.lostWh);
    }
  });

  it('for any curves and elements the charge moved is the current summed, and never runs back', () => {
    for (const { settling } of randomPairs()) {
      for (const part of [0.01, 0.3, 0.6, 0.95]) {
        const seconds = settling.secondsTo(part * settling.movedC);
        expect(Math.abs(settling.movedAhAt(seconds) - part * settling.movedAh)).toBeLessThan(1e-9 * settling.movedAh);
        // Simpson's rule over a time short beside the fastest element, 0.1 s.
        const short = Math.min(0.01, 1e-3 * seconds);
        const [first, middle, last] = [0, 0.5, 1].map((k) => settling.currentAt(seconds + k * short));
        const summedAh = ((first! + 4 * middle! + last!) * short) / 6 / 3600;
        const movedAh = settling.movedAhAt(seconds + short) - settling.movedAhAt(seconds);
        expect(Math.abs(summedAh - movedAh)).toBeLessThan(1e-5 * summedAh + 1e-11 * settling.movedAh);
        expect(first).toBeGreaterThan(0);
      }
    }
  });
});

function randomPairs() {
  const random = seededRandom(20_261);
  return Array.from({ length: 200 }, () => {
    const [a, b] = [randomSide(random), randomSide(random)];
    return { a, b, settling: new Settling({ a, b, leadOhm: random.between([0, 0.01]) }) };
  });
}

/** A side with a curve of random stretches, some of them level, and up to three elements of 0.1 to 10 000 s. */
function randomSide(random: SeededRandom): SettlingSide {
  let volts = random.between([11.5, 12.5]);
  const curve = [0, 0.1, 0.25, 0.5, 0.8, 0.95, 1].map((x) => {
    volts += random.chance(0.2) ? 0 : random.between([0.01, 0.4]);
    return { x, y: volts };
  });
  const state = { capacityAh: random.between([20, 400]), stateOfCharge: random.between([0.05, 1]) };
  const elements = Array.from({ length: random.whole([0, 3]) }, () => ({
    resistanceOhm: random.between([0.0005, 0.02]),
    tauS: random.logBetween([0.1, 10_000]),
  }));
  const givesC = state.capacityAh * state.stateOfCharge * 3600;
  return { instantOhm: random.between([0.001, 0.02]), elements, emf: chargeLine(curve, state), givesC };
}

describe('pairs worth telling', () => {
  const beside = (...names: readonly string[]) => names.map((id) => stringPart(id, { plus: 'P', minus: 'N' }));
  const told = (parts: Parameters<typeof jobOf>[0]) =>
    joinPairs(jobOf(parts)).map((pair) => pair.map((side) => side.join('+')));

  it('branches of a bank two by two, neighbours first', () => {
    expect(told(beside('A', 'B', 'C'))).toEqual([
      ['A', 'B'],
      ['B', 'C'],
      ['A', 'C'],
    ]);
  });

  it('never more than ten', () => {
    expect(told(beside('A', 'B', 'C', 'D', 'E', 'F'))).toHaveLength(10);
  });

  it('banks that an open switch keeps apart', () => {
    const other = stringPart('C', { plus: 'Q', minus: 'N' });
    const parallel = { id: 'S', kind: 'switch', from: 'P', to: 'Q', state: 'open' };
    expect(told([...beside('A', 'B'), other, parallel])).toEqual([
      ['A', 'B'],
      ['A+B', 'C'],
    ]);
  });

  it('two banks that nothing joins yet, but not a 12 V and a 24 V one, nor the halves of a tapped string', () => {
    const a = stringPart('A');
    expect(told([a, stringPart('B')])).toEqual([['A', 'B']]);
    expect(told([a, stringPart('B', { blocksInSeries: 2 })])).toEqual([]);
    const load = { id: 'L', kind: 'load', plus: 'A+', minus: 'A-', currentA: 1 };
    expect(told([a, stringPart('B', { minus: 'A+' }), load, joint('J', 'B+', 'OUT', 0.001)])).toEqual([]);
  });
});
