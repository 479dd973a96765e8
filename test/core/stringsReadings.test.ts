/** What readings do not tell, and what to read next: sentences for a person with a meter in the hand. */
import { describe, expect, it } from 'vitest';
import { fromReadings, type PartId, seriesOf } from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import { type BankString, bankJob, jobOf, readAt, solvedAt } from './bankJobs.ts';

const drawn: readonly BankString[] = ['A', 'B', 'C'].map((id) => ({ id, emfV: 25.4, ohm: 0.009, leadOhm: 0.001 }));
/** The bank as it really is: string C otherwise than drawn. */
const really = (c: Partial<BankString>) =>
  bankJob({ strings: drawn.map((one) => (one.id === 'C' ? { ...one, ...c } : one)) });
const pointsOf = (job: ReturnType<typeof jobOf>, cases: readonly string[]) => cases.map((id) => solvedAt(job, id));

/** The bank as drawn, with what meters say of the bank as it is. */
function found(
  c: Partial<BankString>,
  cases: readonly string[],
  keep: (id: string) => boolean = () => true,
  more: object[] = [],
) {
  const job = really(c);
  const readings = [
    ...readAt(job, pointsOf(job, cases)).filter(({ id }) => keep(id)),
    ...(more as Record<string, unknown>[]),
  ];
  return fromReadings({ job: bankJob({ strings: drawn, readings }), tables });
}

/** Volts across the lead of a string or the string itself in a case of the real bank. */
function voltage(c: Partial<BankString>, caseId: string, plus: string, minus: string) {
  const { junctions } = solvedAt(really(c), caseId);
  const volts = new Map([...junctions].map(([name, value]) => [name as string, value ?? 0]));
  return {
    id: `${caseId} ${plus}`,
    case: caseId,
    quantity: 'voltage',
    plus,
    minus,
    valueV: volts.get(plus)! - volts.get(minus)!,
  };
}

const verdicts = (answer: ReturnType<typeof fromReadings>) =>
  Object.fromEntries(answer.tieBreaks[0]!.rows.map(({ cause, agrees }) => [cause, agrees]));

describe('what is missing', () => {
  it('no reading at all: one sentence for the bank', () => {
    const { strings, missing } = fromReadings({ job: bankJob({ strings: drawn }), tables });
    expect(strings).toStrictEqual([]);
    expect(missing).toHaveLength(1);
    expect(missing[0]).toMatch(/^Nothing was read of A, B and C: read the volts.*case at-rest.*at least 30 %/);
  });

  it('one load only: a second is asked for', () => {
    const { strings, missing } = found({}, ['heavy']);
    expect(strings).toStrictEqual([]);
    expect(missing[1]).toMatch(/^B: volts and amps were both read in case heavy only\. Read both in a second case/);
  });

  it('a string whose amps were not read is asked for by its name and cases', () => {
    const { strings, missing } = found({}, ['light', 'heavy'], (id) => !id.endsWith(' B'));
    expect(strings.map(({ string }) => string)).toStrictEqual(['A', 'C']);
    expect(missing).toHaveLength(1);
    expect(missing[0]).toMatch(/^B: its volts were read, its amps were not\. Read its amps in cases light and heavy/);
  });

  it('no volts: where the probes go is said', () => {
    const { missing } = found({}, ['light', 'heavy'], (id) => !id.endsWith('bus'));
    expect(missing[0]).toMatch(/^A: its amps were read in cases light and heavy.*from A\+ to bus-/);
  });

  it('a load that hardly changes gives no number', () => {
    const job = bankJob({ strings: drawn });
    const readings = readAt(job, pointsOf(job, ['light', 'heavy'])).map((reading) =>
      'part' in reading && reading.case === 'heavy' ? { ...reading, valueA: 8 } : reading,
    );
    const { strings, missing } = fromReadings({ job: bankJob({ strings: drawn, readings }), tables });
    expect(strings).toStrictEqual([]);
    // 20 A over three strings is 6.7 A; to 8 A is a change of 17 % of the larger.
    expect(missing[0]).toMatch(
      /^A: its amps changed too little between light \(6\.7 A\) and heavy \(8\.0 A\), by 17 %/,
    );
  });

  it('a change within what a clamp may be off gives no number either', () => {
    const job = bankJob({ strings: drawn });
    const readings = readAt(job, pointsOf(job, ['light', 'heavy'])).map((reading) =>
      'part' in reading ? { ...reading, valueA: reading.case === 'heavy' ? 1 : 0 } : reading,
    );
    const { strings, missing } = fromReadings({ job: bankJob({ strings: drawn, readings }), tables });
    expect(strings).toStrictEqual([]);
    // Two readings of 0.5 A / sqrt 3 each: 0.41 A; the change of 1 A is under three of those.
    expect(missing[0]).toMatch(/^A: its amps changed by 1\.0 A from light to heavy, which is within/);
  });

  it('volts that rise with the amps are refused', () => {
    const job = bankJob({ strings: drawn });
    const readings = readAt(job, pointsOf(job, ['light', 'heavy'])).map((reading) =>
      'part' in reading ? reading : { ...reading, valueV: reading.case === 'heavy' ? 25.6 : 25.2 },
    );
    const { missing } = fromReadings({ job: bankJob({ strings: drawn, readings }), tables });
    expect(missing[0]).toMatch(/^A: its volts do not fall from light to heavy/);
  });

  it('as found and as left are not mixed', () => {
    const job = bankJob({ strings: drawn });
    const readings = readAt(job, pointsOf(job, ['light', 'heavy'])).map((reading) => ({
      ...reading,
      set: reading.case === 'heavy' ? 'as-left' : 'as-found',
    }));
    expect(fromReadings({ job: bankJob({ strings: drawn, readings }), tables }).strings).toStrictEqual([]);
  });
});

describe('the sum at rest', () => {
  it('strings that feed each other add up to nothing', () => {
    const { restSumA, restText } = found({ emfV: 25.7 }, ['at-rest']);
    // The solve balances; three clamp readings of 0.29 A each, and the scale of one clamp that drops out of the sum.
    expect(Math.abs(restSumA!.value)).toBeLessThan(1e-9);
    expect(restSumA!.standard).toBeCloseTo((Math.sqrt(3) * 0.5) / Math.sqrt(3), 6);
    expect(restText).toContain('nothing, as they must');
  });

  it('a reading with its sign turned shows', () => {
    const job = really({ emfV: 25.7 });
    const readings = readAt(job, pointsOf(job, ['at-rest'])).map((reading) =>
      'part' in reading && reading.part === 'C' ? { ...reading, valueA: -reading.valueA } : reading,
    );
    expect(fromReadings({ job: bankJob({ strings: drawn, readings }), tables }).restText).toMatch(
      /−40\.0 A.*wrong way round/,
    );
  });
});

describe('fuller, or sick?', () => {
  it('a string that shares fairly has no table', () => {
    expect(found({}, ['at-rest', 'heavy', 'charge']).tieBreaks).toStrictEqual([]);
  });

  it('charge alone read: only the shorted cell is out, and the amps at rest are asked for', () => {
    const answer = found({ ohm: 0.018 }, ['charge']);
    expect(answer.tieBreaks.map(({ string }) => string)).toStrictEqual(['C']);
    expect(verdicts(answer)).toStrictEqual({
      fuller: 'cannot-tell',
      'high-resistance': 'cannot-tell',
      'bad-joint': 'cannot-tell',
      'shorted-cell': 'no',
    });
    expect(answer.tieBreaks[0]!.next).toMatch(/^Read the amps of C with its direction, everything off/);
  });

  it('giving at rest: fuller', () => {
    expect(verdicts(found({ emfV: 25.5 }, ['at-rest', 'charge']))).toStrictEqual({
      fuller: 'yes',
      'high-resistance': 'no',
      'bad-joint': 'no',
      'shorted-cell': 'no',
    });
  });

  it('short on load and on charge, nothing at rest: the millivolts across its wiring are asked for', () => {
    const answer = found({ leadOhm: 0.011 }, ['at-rest', 'light', 'heavy', 'charge']);
    expect(verdicts(answer)).toMatchObject({ fuller: 'no', 'shorted-cell': 'no', 'bad-joint': 'cannot-tell' });
    expect(answer.tieBreaks[0]!.next).toMatch(/^Read the millivolts across .*C lead/);
  });

  it('the millivolts across its lead settle it: the joint', () => {
    const c = { leadOhm: 0.011 };
    const answer = found(c, ['at-rest', 'light', 'heavy'], undefined, [voltage(c, 'heavy', 'C+', 'bus+')]);
    expect(verdicts(answer)).toStrictEqual({
      fuller: 'no',
      'high-resistance': 'no',
      'bad-joint': 'yes',
      'shorted-cell': 'no',
    });
  });

  it('an ordinary lead and a high resistance: the string itself', () => {
    const c = { ohm: 0.019 };
    const answer = found(c, ['at-rest', 'light', 'heavy'], undefined, [voltage(c, 'heavy', 'C+', 'bus+')]);
    expect(verdicts(answer)).toStrictEqual({
      fuller: 'no',
      'high-resistance': 'yes',
      'bad-joint': 'no',
      'shorted-cell': 'no',
    });
    const one = answer.strings.find(({ string }) => string === 'C')!;
    expect(one.text).toMatch(
      /^C: 20\.0 ± 0\.9 mΩ, and 25\.40 ± 0\.15 V behind it.*The job expects 10\.0 mΩ.*2\.0 times that/,
    );
  });

  it('taking at rest and a cell low: the shorted cell', () => {
    const answer = found({ emfV: 23.4 }, ['at-rest', 'light', 'heavy']);
    expect(verdicts(answer)).toStrictEqual({
      fuller: 'no',
      'high-resistance': 'no',
      'bad-joint': 'no',
      'shorted-cell': 'yes',
    });
  });

  it('taking at rest, but not low by a cell: the volts of its blocks are asked for', () => {
    const answer = found({ emfV: 25.1 }, ['at-rest', 'heavy']);
    expect(verdicts(answer)['shorted-cell']).toBe('cannot-tell');
    expect(answer.tieBreaks[0]!.next).toMatch(/^Read the volts of every block of C at rest/);
  });

  it('giving a little at rest does not clear a string whose resistance reads high: string or joint is still open', () => {
    const answer = found({ ohm: 0.018, emfV: 25.45 }, ['at-rest', 'light', 'heavy', 'charge']);
    expect(verdicts(answer)).toStrictEqual({
      fuller: 'no',
      'high-resistance': 'cannot-tell',
      'bad-joint': 'cannot-tell',
      'shorted-cell': 'no',
    });
    // Volts on charge are not those of a battery that gives: they are left out.
    expect(answer.strings.map(({ cases }) => cases)).toStrictEqual([
      ['at-rest', 'heavy'],
      ['at-rest', 'heavy'],
      ['at-rest', 'heavy'],
    ]);
  });

  it('nothing read: the string furthest behind in the solves gets a table in which nothing is known', () => {
    const job = really({ ohm: 0.03 });
    const { tieBreaks } = fromReadings({ job, tables, points: pointsOf(job, ['heavy']) });
    expect(tieBreaks.map(({ string }) => string)).toStrictEqual(['C' as PartId]);
    expect(new Set(tieBreaks[0]!.rows.map(({ agrees }) => agrees))).toStrictEqual(new Set(['cannot-tell']));
  });
});

describe('blocks that were not read', () => {
  const string = {
    id: 'S',
    kind: 'string',
    chemistry: 'agm',
    blocksInSeries: 4,
    blockNominalV: 12,
    capacityAh: 100,
    minus: 'n',
    plus: 'p',
    midpoint: 'm',
  };
  const read = (id: string, plus: string, minus: string, valueV: number) => ({
    id,
    quantity: 'voltage',
    plus,
    minus,
    valueV,
  });

  it('a midpoint alone on a string of four blocks is not enough', () => {
    const job = jobOf({ parts: [string], readings: [read('low', 'm', 'n', 25.4), read('high', 'p', 'm', 25.5)] });
    const [one] = seriesOf({ job, tables, points: [] });
    expect(one!.remarks.at(-1)).toMatch(
      /^Only 2 stretches of a string of 4 blocks were read.*read the volts of every block/,
    );
  });

  it('the total alone says nothing', () => {
    const job = jobOf({ parts: [string], readings: [read('all', 'p', 'n', 50.9)] });
    expect(seriesOf({ job, tables, points: [] })).toStrictEqual([]);
  });

  it('one block left out is named', () => {
    const parts = [0, 1, 2, 3].map((at) => ({
      ...string,
      id: `B${at + 1}`,
      blocksInSeries: 1,
      minus: `n${at}`,
      plus: `n${at + 1}`,
      midpoint: undefined,
    }));
    const readings = [read('a', 'n1', 'n0', 12.7), read('b', 'n2', 'n1', 12.6), read('d', 'n4', 'n3', 12.7)];
    const [one] = seriesOf({ job: jobOf({ parts, readings }), tables, points: [] });
    expect(one!.blocks.map(({ name }) => name)).toStrictEqual(['B1', 'B2', 'B4']);
    expect(one!.midpoint).toBeNull();
    expect(one!.remarks.join(' ')).toContain('Not read: B3.');
    // With the total read as well, block 3 is what is left: 50.6 - 38.0 = 12.6 V.
    const withTotal = jobOf({ parts, readings: [...readings, read('all', 'n4', 'n0', 50.6)] });
    const [whole] = seriesOf({ job: withTotal, tables, points: [] });
    expect(whole!.blocks[2]!.voltageV).toBeCloseTo(12.6, 12);
  });

  it('a total that is not the sum of its halves is pointed out', () => {
    const readings = [read('low', 'm', 'n', 25.4), read('high', 'p', 'm', 25.5), read('all', 'p', 'n', 52)];
    const [one] = seriesOf({ job: jobOf({ parts: [string], readings }), tables, points: [] });
    expect(one!.remarks.join(' ')).toContain('Reading all (52.00 V) is 1100 mV more');
  });
});
