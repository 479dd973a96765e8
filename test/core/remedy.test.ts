/** What remedies change: every claim is checked by a fresh judgement of the changed job. */
import { describe, expect, it } from 'vitest';
import {
  applyEdit,
  type CheckReport,
  type Draft,
  draftOf,
  type Finding,
  missingField,
  operatingPoint,
  type RemedyTrial,
  remedyTrials,
  runChecks,
} from '../../core/api.ts';
import { identityOf } from '../../core/remedy/identity.ts';
import { examples } from '../../data/examples/index.ts';
import { tables } from '../../data/index.ts';
import { battery, jobOf, oneCircuit, type RawJob } from './checksJob.ts';

function opened(text: string) {
  const draft = draftOf(text);
  if (!draft.ok) throw new Error(JSON.stringify(draft.issues));
  const { job } = draft.value;
  return { draft: draft.value.draft, job, report: runChecks({ job, tables }) };
}

function openedRaw(raw: RawJob) {
  return opened(
    JSON.stringify({ format: 'ohmwright-job', version: 1, title: 'a job for a test', practice: 'iec-land', ...raw }),
  );
}

/** The job after a trial's edit, judged from nothing. */
function judgedAfter(draft: Draft, trial: RemedyTrial): CheckReport {
  const edited = applyEdit(draft, trial.edit, tables);
  if (!edited.ok) throw new Error(JSON.stringify(edited.issues));
  return runChecks({ job: edited.value.job, tables });
}

function expectClaimsToHold(draft: Draft, before: CheckReport, finding: Finding, trial: RemedyTrial): void {
  const after = judgedAfter(draft, trial);
  const now = new Set(after.findings.map(identityOf));
  const was = new Set(before.findings.map(identityOf));
  expect([trial.label, trial.stillThere]).toStrictEqual([trial.label, now.has(identityOf(finding))]);
  expect(trial.after.measured === null).toBe(!trial.stillThere);
  expect(trial.gone.filter((one) => now.has(identityOf(one)))).toStrictEqual([]);
  // What is new must be told; what was there and grew graver may be told too.
  const arisen = new Set(trial.arisen.map(identityOf));
  expect([...now].filter((one) => !was.has(one) && !arisen.has(one))).toStrictEqual([]);
}

describe.each(examples)('remedies of $name', ({ text }) => {
  const { draft, job, report } = opened(text);
  const points = job.cases.map((operatingCase) => {
    const model = operatingCase.surge === undefined ? 'slow' : 'fast';
    return operatingPoint({ job, operatingCase, tables, model });
  });

  it('are at most three, those that bring nothing else first, and each claim is confirmed by a fresh judgement', () => {
    const before = JSON.stringify(draft);
    for (const finding of report.findings) {
      const trials = remedyTrials({ draft, job, tables, finding, report, points });
      expect(trials.length).toBeLessThanOrEqual(3);
      const arisen = trials.map((trial) => trial.arisen.length);
      arisen.forEach((count, k) => {
        expect(count).toBeGreaterThanOrEqual(arisen[k - 1] ?? 0);
      });
      for (const trial of trials) expectClaimsToHold(draft, report, finding, trial);
    }
    expect(JSON.stringify(draft)).toBe(before);
  });
});

describe('the sloop with seeded trouble', () => {
  const { text } = examples.find(({ name }) => name === 'sloop-with-seeded-trouble')!;
  const { draft, job, report } = opened(text);
  const grave = report.findings.filter(({ severity }) => severity === 'stop' || severity === 'fix');

  it.each(grave.map((finding) => [identityOf(finding), finding] as const))(
    '%s goes by its first remedy',
    (_, finding) => {
      const [first] = remedyTrials({ draft, job, tables, finding, report });
      expect(first?.stillThere).toBe(false);
      const after = judgedAfter(draft, first!);
      expect(after.findings.map(identityOf)).not.toContain(identityOf(finding));
      expect(first!.arisen).toStrictEqual([]);
    },
  );

  it('is told to make the green lug anew before any cable is changed', () => {
    const finding = report.findings.find(({ rule }) => rule === 'drop-too-big')!;
    const [first] = remedyTrials({ draft, job, tables, finding, report });
    expect(first!.label).toMatch(/^Joint LUG-BILGE .*made anew/);
  });

  it('is told what a remedy costs and that one cable settles three findings', () => {
    const finding = report.findings.find(({ rule }) => rule === 'cable-overloaded')!;
    const [first] = remedyTrials({ draft, job, tables, finding, report });
    expect(first!.cost).toBe('1.5 m of 6 AWG');
    expect(first!.gone.map(({ rule }) => rule)).toStrictEqual(['cable-overloaded', 'fuse-over-cable', 'surge-sag']);
  });

  it('is told of the isolator, which no cable makes up for, only what brings it nearer', () => {
    const finding = report.findings.find(({ rule }) => rule === 'charge-drop-too-big')!;
    const trials = remedyTrials({ draft, job, tables, finding, report });
    expect(trials.map(({ label, stillThere }) => [label.split(' ')[0], stillThere])).toStrictEqual([['Diode', true]]);
    expect(trials[0]!.after.measured!.value).toBeLessThan(finding.measured.value);
  });
});

/** Small jobs with one trouble each, and the remedy that is expected first. */
const troubles: Readonly<Record<string, readonly [job: RawJob, first: RegExp]>> = {
  'fuse-under-current': [oneCircuit({ fuse: { ratingA: 6 } }), /^Fuse F1: 1\d A instead of 6 A$/],
  'volts-rating-low': [oneCircuit({ fuse: { ratingV: 10 } }), /^Fuse F1: one rated for \d+ V direct current$/],
  'load-unfed': [oneCircuit({ fuse: { state: 'open' } }), /^F1: closed$/],
  'part-never-used': [oneCircuit({ fuse: { state: 'open' } }), /^F1: closed$/],
  'polarity-crossed': [
    oneCircuit({ more: [battery('B2', { plus: 'N', minus: 'P', capacityAh: 100 })] }),
    /plus and minus leads changed over$/,
  ],
  'dead-short': [
    oneCircuit({ more: [{ id: 'SPAN', kind: 'cable', from: 'P', to: 'N', lengthM: 1, size: '35 mm2' }] }),
    /^Removed SPAN$/,
  ],
  'share-uneven': [
    {
      parts: [
        battery('B1', { plus: 'B1+' }),
        battery('B2', { plus: 'B2+' }),
        { id: 'C1', kind: 'cable', from: 'B1+', to: 'P', lengthM: 1, size: '35 mm2' },
        { id: 'C2', kind: 'cable', from: 'B2+', to: 'P', lengthM: 4, size: '35 mm2' },
        { id: 'L1', kind: 'load', plus: 'P', minus: 'N', currentA: 60 },
      ],
    },
    /^All leads of the strings alike: /,
  ],
  'circulating-at-rest': [
    {
      parts: [
        battery('B1', { emfV: 13.2, plus: 'B1+' }),
        battery('B2', { emfV: 10.9, plus: 'B2+' }),
        { id: 'F1', kind: 'fuse', from: 'B1+', to: 'P', ratingA: 300, resistanceOhm: 0.02 },
        { id: 'F2', kind: 'fuse', from: 'B2+', to: 'P', ratingA: 300, resistanceOhm: 0.02 },
        { id: 'L1', kind: 'load', plus: 'P', minus: 'N', currentA: 1 },
      ],
    },
    /^B2 isolated: F2 opened$/,
  ],
  'one-out-overload': [
    {
      parts: [
        battery('B1', { maxDischargeA: 100 }),
        battery('B2', { maxDischargeA: 100 }),
        { id: 'L1', kind: 'load', plus: 'P', minus: 'N', currentA: 120 },
      ],
    },
    /^Another string like B1 beside it/,
  ],
  'link-overloaded': [
    {
      parts: [
        battery('B1', { blocksInSeries: 2, emfV: 26.4, linkSize: '10 mm2' }),
        { id: 'L1', kind: 'load', plus: 'P', minus: 'N', currentA: 150 },
      ],
    },
    /^Links of B1: \d+ mm² instead of 10 mm²$/,
  ],
  'no-fuse-on-source': [
    {
      parts: [
        battery('B1'),
        { id: 'OUT', kind: 'cable', from: 'P', to: 'L', lengthM: 1, size: '16 mm2' },
        { id: 'L1', kind: 'load', plus: 'L', minus: 'N', currentA: 10 },
      ],
    },
    /fuse in the plus lead right at B1$/,
  ],
};

describe.each(Object.entries(troubles))('a job with %s', (rule, [raw, expected]) => {
  const { draft, job, report } = openedRaw(raw);
  const finding = report.findings.find((one) => one.rule === rule)!;

  it('is told a remedy that a fresh judgement confirms', () => {
    const [first, ...others] = remedyTrials({ draft, job, tables, finding, report });
    expect(first?.label).toMatch(expected);
    expect(first!.stillThere).toBe(false);
    for (const trial of [first!, ...others]) expectClaimsToHold(draft, report, finding, trial);
  });
});

describe('a check that was not done', () => {
  const job = jobOf(oneCircuit({ load: { currentA: 10, surgeW: 300 } }));
  const { notChecked } = runChecks({ job, tables });

  it('leads to the field to fill in, with what it may hold', () => {
    const row = notChecked.find(({ rule }) => rule === 'volts-rating-low')!;
    expect(missingField(row, job)).toStrictEqual([
      { part: 'F1', field: 'ratingV', holds: expect.objectContaining({ holds: 'quantity', unit: 'V' }) as object },
    ]);
  });

  it('names the practice of a job that has none', () => {
    const { practice: _none, ...raw } = oneCircuit({});
    const bare = jobOf({ ...raw, parts: raw.parts, practice: undefined });
    const row = runChecks({ job: bare, tables }).notChecked.find(({ rule }) => rule === 'fuse-over-cable')!;
    const [field] = missingField(row, bare);
    expect([field?.part, field?.field, field?.holds?.holds]).toStrictEqual([null, 'practice', 'choice']);
  });

  it('has fields that the job file knows, wherever it has any', () => {
    const lacking = notChecked.flatMap((row) => missingField(row, job)).filter(({ holds }) => holds === null);
    expect(lacking).toStrictEqual([]);
    expect(notChecked.filter(({ fields }) => fields === undefined).map(({ missing }) => missing)).toStrictEqual([]);
  });
});
