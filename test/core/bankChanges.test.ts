/** Changes to a bank, each made on a copy of the job: what they say they do is what the changed job does. */
import { describe, expect, it } from 'vitest';
import { type BankChange, bankChanges, caseById, operatingPoint, type PartId, parseJob } from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import { edited, exampleDraft, read } from './draftExamples.ts';

type Edited = ReturnType<typeof exampleDraft>;

function changesIn({ draft, job }: Edited, caseId: string) {
  return bankChanges({ draft, job, tables, operatingCase: caseById(job, caseId)!, model: 'slow' });
}

/** The job text of the draft after the edit, read and solved from nothing. */
function freshCurrents({ draft }: Edited, change: BankChange, caseId: string): readonly (number | null)[] {
  const after = parseJob(JSON.stringify(edited(draft, change.edit).draft));
  if (!after.ok) throw new Error(JSON.stringify(after.issues));
  const point = operatingPoint({
    job: after.value,
    tables,
    operatingCase: caseById(after.value, caseId)!,
    model: 'slow',
  });
  return change.after.strings.map(({ id }) => point.parts.get(id)!.currentA);
}

function largestGap({ after }: BankChange, currentsA: readonly (number | null)[]): number {
  return Math.max(...after.strings.map(({ currentA }, k) => Math.abs(currentA - (currentsA[k] ?? Number.NaN))));
}

describe('changes to the bank of the ridge cabin', () => {
  const cabin = exampleDraft('ridge-cabin');
  const changes = changesIn(cabin, 'kettle');

  it('leads of each string, all leads alike, each string and all of them new, one more string', () => {
    const labels = changes.map(({ label }) => label);
    for (const said of [
      /^Leads of A .*2\/0 AWG instead of 1\/0 AWG/,
      /^All leads of the strings alike: .*L-A\+ 2\.6 m instead of 1\.2 m/,
      /^C .*replaced by new blocks/,
      /^All strings replaced/,
      /^One more string like/,
    ]) {
      expect(labels.filter((label) => said.test(label))).toHaveLength(1);
    }
    expect(changes).toHaveLength(9);
  });

  it('after each change every string carries what the changed job says', () => {
    for (const change of changes) {
      const fresh = freshCurrents(cabin, change, 'kettle');
      // The same solve of the same figures: only the last digits may differ.
      expect(largestGap(change, fresh)).toBeLessThan(1e-9);
      const totalA = change.after.strings.reduce((sum, { currentA }) => sum + currentA, 0);
      // Strings of one capacity: fair is an equal part.
      const worst = Math.max(
        ...change.after.strings.map(({ currentA }) => Math.abs((currentA / totalA) * change.after.strings.length - 1)),
      );
      expect(change.after.spread).toBeCloseTo(worst, 12);
    }
  });

  it('before is the job as it stands, the same for all', () => {
    const point = operatingPoint({
      job: cabin.job,
      tables,
      operatingCase: caseById(cabin.job, 'kettle')!,
      model: 'slow',
    });
    for (const { before } of changes) {
      for (const { id, currentA } of before.strings) expect(currentA).toBe(point.parts.get(id)!.currentA);
      expect(before.bankV).toBeCloseTo(
        point.junctions.get('BP out' as never)! - point.junctions.get('BM out' as never)!,
        12,
      );
    }
  });

  it('what helps comes first, the most even first; the rest by what it leaves', () => {
    const helping = changes.filter(({ before, after }) => before.spread - after.spread > 1e-4);
    expect(changes.slice(0, helping.length)).toEqual(helping);
    const spreads = helping.map(({ after }) => after.spread);
    expect(spreads).toEqual(spreads.toSorted((a, b) => a - b));
    expect(changes[0]!.label).toMatch(/^All strings replaced/);
  });
});

describe('changes to a ladder with a bad joint', () => {
  const string = (k: number) => ({
    id: `S${k}`,
    kind: 'string',
    plus: k === 4 ? 'post' : `P${k}`,
    minus: `N${k}`,
    chemistry: 'agm',
    blocksInSeries: 1,
    blockNominalV: 12,
    capacityAh: 100,
    emfV: 12.6,
    resistanceOhm: 0.006,
  });
  const link = (id: string, from: string, to: string) => ({
    id,
    kind: 'cable',
    from,
    to,
    lengthM: 0.3,
    size: '35 mm2',
    endOhm: id === 'LP2' ? 0.0004 : 0.0001,
  });
  const parts = [
    ...[1, 2, 3, 4].map(string),
    ...[1, 2, 3].flatMap((k) => [link(`LP${k}`, `P${k}`, `P${k + 1}`), link(`LN${k}`, `N${k}`, `N${k + 1}`)]),
    { id: 'J', kind: 'joint', label: 'corroded post', from: 'post', to: 'P4', resistanceOhm: 0.001 },
    { id: 'J-feed', kind: 'joint', from: 'P1', to: 'feed+', resistanceOhm: 0.002 },
    { id: 'load', kind: 'load', plus: 'feed+', minus: 'N1', currentA: 80 },
  ];
  const ladder = read(JSON.stringify({ format: 'ohmwright-job', version: 1, practice: 'iec-land', parts }));
  const changes = changesIn(ladder, 'as-drawn');
  const labelled = (said: RegExp) => changes.filter(({ label }) => said.test(label));

  it('joints of the bank made anew, each and together; not those behind its taps', () => {
    expect(labelled(/^Joint J \(corroded post\): made anew, 0\.05 mΩ instead of 1 mΩ$/)).toHaveLength(1);
    expect(labelled(/^All joints of the bank made anew \(2\)$/)).toHaveLength(1);
    expect(labelled(/J-feed/)).toEqual([]);
  });

  it('taps moved, links of more copper, terminations made anew', () => {
    expect(labelled(/^(Plus|Minus) feed taken from S[1-4] instead of S1$/)).toHaveLength(6);
    expect(labelled(/^All links between the strings: 50 mm² instead of 35 mm²$/)).toHaveLength(1);
    expect(labelled(/^All links between the strings: doubled$/)).toHaveLength(1);
    expect(labelled(/^Cable LP2: both terminations made anew, 0\.1 mΩ instead of 0\.4 mΩ$/)).toHaveLength(1);
  });

  it('minus moved to the far corner does more than thicker links, and costs one lead', () => {
    const corner = labelled(/^Minus feed taken from S4/)[0]!;
    const thicker = labelled(/50 mm²/)[0]!;
    expect(corner.cost).toBe('one lead moved');
    expect(corner.after.spread).toBeLessThan(thicker.after.spread);
    expect(thicker.after.spread).toBeLessThan(thicker.before.spread);
    expect(changes.indexOf(corner)).toBeLessThan(changes.indexOf(thicker));
    const fresh = freshCurrents(ladder, corner, 'as-drawn');
    expect(largestGap(corner, fresh)).toBeLessThan(1e-9);
  });

  it('new blocks in the place of measured ones have neither their volts nor their resistance', () => {
    const replaced = labelled(/^S3: replaced/)[0]!;
    const raw = (edited(ladder.draft, replaced.edit).draft['parts'] as { id: string; [field: string]: unknown }[]).find(
      ({ id }) => id === ('S3' as PartId),
    )!;
    expect(raw).toMatchObject({ ageYears: 0, capacityAh: 100 });
    expect(raw['emfV']).toBeUndefined();
    expect(raw['resistanceOhm']).toBeUndefined();
  });

  it('a bank at rest has no changes to rank', () => {
    expect(changesIn(ladder, 'at-rest')).toEqual([]);
  });
});
