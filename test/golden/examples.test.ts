/**
 * The invented example jobs: each parses, solves in every case with a proof that holds, and gives the findings that stand in
 * `<name>.check.md` beside this file. After a wanted change of findings, write those files anew with
 *
 *   OHMWRIGHT_WRITE_GOLDEN=1 npx vitest run test/golden/examples.test.ts
 *
 * and read the difference before committing it.
 */
import { writeFileSync } from 'node:fs';
import { describe, expect, it } from 'vitest';
import {
  type CheckedJob,
  type CheckReport,
  caseById,
  type Finding,
  type JunctionId,
  type OperatingPoint,
  operatingPoint,
  parseJob,
  type Reading,
  runChecks,
} from '../../core/api.ts';
import { examples } from '../../data/examples/index.ts';
import { tables } from '../../data/index.ts';
import { starters } from '../../data/starters.ts';

const pages = import.meta.glob<string>('./*.check.md', { query: '?raw', import: 'default', eager: true });
const rewrite = process.env['OHMWRIGHT_WRITE_GOLDEN'] === '1';

/** The one example that is meant to have trouble. */
const SEEDED = 'sloop-with-seeded-trouble';

function jobOf(text: string): CheckedJob {
  const parsed = parseJob(text);
  if (!parsed.ok) throw new Error(parsed.issues.map(({ path, message }) => `${path}: ${message}`).join('\n'));
  return parsed.value;
}

/** The findings as a page that a person can read and a text tool can compare. */
function pageOf(name: string, job: CheckedJob, { findings, notChecked }: CheckReport): string {
  const cell = (text: string) => text.replaceAll('|', '\\|');
  const rows = findings.map(
    ({ severity, rule, parts, case: id, message }) =>
      `| ${severity} | ${rule} | ${parts.join(', ')} | ${id} | ${cell(message)} |`,
  );
  const table = ['| severity | rule | parts | case | finding |', '|---|---|---|---|---|', ...rows];
  const gaps = notChecked.map(({ rule, parts, missing }) => `- ${rule} (${parts.join(', ')}): ${missing}`);
  return [
    `# ${name}`,
    '',
    `${job.title}. Judged by ${job.practice}.`,
    '',
    ...(rows.length === 0 ? ['No findings.'] : table),
    '',
    '## Not checked',
    '',
    ...(gaps.length === 0 ? ['Nothing.'] : gaps),
    '',
  ].join('\n');
}

/** The page as it is kept; where pages are to be written anew, the page given, kept from now on. */
function keptPage(name: string, page: string): string | undefined {
  if (!rewrite) return pages[`./${name}.check.md`];
  writeFileSync(new URL(`./${name}.check.md`, import.meta.url), page);
  return page;
}

function sorted(words: readonly string[]): readonly string[] {
  const copy = [...words];
  copy.sort();
  return copy;
}

/** How far a reading lies from what the solve says, in the reading's own unit. */
function readingGap(reading: Reading, point: OperatingPoint): number {
  const volts = (junction: JunctionId) => point.junctions.get(junction) ?? Number.NaN;
  switch (reading.quantity) {
    case 'voltage':
      return Math.abs(reading.valueV - (volts(reading.plus) - volts(reading.minus)));
    case 'current':
      return Math.abs(reading.valueA - (point.parts.get(reading.part)?.currentA ?? Number.NaN));
    case 'temperature':
      return Math.abs(reading.valueDegC - (point.parts.get(reading.part)?.conductorDegC ?? Number.NaN));
  }
}

describe.each(examples)('$name', ({ name, title, oneLine, text }) => {
  const job = jobOf(text);

  it('says that it is invented, and is listed by its own title', () => {
    expect(job.notes).toMatch(/^Invented example: there is no such place, owner or boat\./);
    expect(title).toBe(job.title);
    expect(oneLine).not.toBe('');
    expect(starters.get(name)).toBe(text);
  });

  it('names a practice, its site with twelve months of sun, its cases, demand and targets', () => {
    expect(job.practiceAssumed).not.toBe(true);
    expect(job.site.latitudeDeg).toBeTypeOf('number');
    expect(job.site.irradiationKWhPerM2Day).toHaveLength(12);
    expect(job.cases.length).toBeGreaterThanOrEqual(3);
    expect(job.demand.length).toBeGreaterThan(0);
    expect(job.targets.systemV).toBeTypeOf('number');
  });

  it('has every part labelled and in a place of its own on a grid of ten pixels', () => {
    const places = job.parts.map(({ id, label, at }) => {
      expect([id, label === undefined || label === '']).toStrictEqual([id, false]);
      expect([id, at !== undefined && at.x % 10 === 0 && at.y % 10 === 0]).toStrictEqual([id, true]);
      return `${at?.x} ${at?.y}`;
    });
    expect(places.filter((place, index) => places.indexOf(place) !== index)).toStrictEqual([]);
  });

  it.each([...job.cases.map(({ id }) => id), 'at-rest'])('solves in case %s with a proof that holds', (id) => {
    const operatingCase = caseById(job, id)!;
    for (const model of ['slow', 'fast'] as const) {
      const point = operatingPoint({ job, operatingCase, tables, model });
      expect([model, point.outcome]).toStrictEqual([model, 'solved']);
      expect([model, point.proof.holds]).toStrictEqual([model, true]);
      // A case in which a load gives up is no ordinary one; the seeded job may have one.
      const dropped = [...point.parts.values()].filter(({ state }) => state === 'dropped-out').map((part) => part.id);
      expect(dropped).toStrictEqual(name === SEEDED && id === 'inverter-surge' ? ['INV'] : []);
    }
  });

  it('has readings that the solve explains within three times their own uncertainty', () => {
    expect(job.readings.length).toBeGreaterThan(0);
    for (const reading of job.readings) {
      const operatingCase = caseById(job, reading.case ?? '')!;
      const point = operatingPoint({ job, operatingCase, tables, model: 'slow' });
      const gap = readingGap(reading, point);
      expect([reading.id, gap <= 3 * (reading.standardUncertainty ?? 0) ? 'explained' : gap]).toStrictEqual([
        reading.id,
        'explained',
      ]);
    }
  });

  const report = runChecks({ job, tables });

  it(`gives the findings of ${name}.check.md`, () => {
    const page = pageOf(name, job, report);
    expect(page).toBe(keptPage(name, page));
  });
});

describe.each(examples.filter(({ name }) => name !== SEEDED))('$name', ({ text }) => {
  it('has no finding of severity stop', () => {
    const { findings } = runChecks({ job: jobOf(text), tables });
    expect(findings.filter(({ severity }) => severity === 'stop')).toStrictEqual([]);
  });
});

describe('the sloop with seeded trouble', () => {
  /** Each trouble that the job's notes own up to, and the rules and parts that it shows by. */
  const seeded: Readonly<Record<string, readonly (readonly [rule: string, ...parts: string[]])[]>> = {
    'a corroded lug in the plus line of the bilge pump': [['drop-too-big', 'BILGE']],
    'a 60 A breaker over the 14 AWG of the cabin lights': [['fuse-over-cable', 'B-4', 'W-CABIN.plus']],
    'a shore charger left at 15.4 V': [
      ['charger-volts-off', 'SHORE', 'H1'],
      ['charger-volts-off', 'SHORE', 'H2'],
    ],
    'an 8 AWG return beside the 1/0 AWG plus of the inverter': [
      ['fuse-over-cable', 'F-INV', 'W-INV.minus'],
      ['cable-overloaded', 'W-INV.minus'],
      ['surge-sag', 'INV'],
      ['return-smaller', 'INV', 'W-INV.minus', 'W-INV.plus'],
      ['inverter-cable', 'W-INV.minus', 'INV'],
    ],
  };
  const text = examples.find(({ name }) => name === SEEDED)!.text;
  const { findings } = runChecks({ job: jobOf(text), tables });
  const name = ({ rule, parts }: Pick<Finding, 'rule' | 'parts'>) => `${rule}: ${parts.join(', ')}`;
  const serious = findings.filter(({ severity }) => severity === 'stop' || severity === 'fix').map(name);

  it.each(Object.entries(seeded))('shows %s', (_trouble, shownBy) => {
    for (const [rule, ...parts] of shownBy) expect(serious).toContain(`${rule}: ${parts.join(', ')}`);
  });

  it('shows nothing else among what is to be stopped or fixed', () => {
    const named = Object.values(seeded)
      .flat()
      .map(([rule, ...parts]) => `${rule}: ${parts.join(', ')}`);
    expect(sorted(serious)).toStrictEqual(sorted(named));
  });

  it('is the healthy sloop but for the parts that its notes name', () => {
    const [healthy, sick] = ['two-bank-sloop', SEEDED].map((one) => {
      const example = examples.find(({ name }) => name === one)!;
      const { parts } = JSON.parse(example.text) as { parts: readonly { id: string }[] };
      return new Map(parts.map((part) => [part.id, JSON.stringify(part)]));
    });
    const changed = [...sick!].filter(([id, part]) => healthy!.get(id) !== part).map(([id]) => id);
    expect(sorted(changed)).toStrictEqual(['B-4', 'LUG-BILGE', 'SHORE', 'W-BILGE', 'W-INV']);
  });
});
