/** Proposals for fuses and cables: every claim is checked by a fresh judgement of the changed copy. */
import { describe, expect, it } from 'vitest';
import {
  applyEdit,
  checkRules,
  type Draft,
  draftOf,
  type Finding,
  PROTECTION_RULES,
  proposeProtection,
} from '../../core/api.ts';
import { CheckContext } from '../../core/checks/checkContext.ts';
import { runRules } from '../../core/checks/runChecks.ts';
import { identityOf } from '../../core/remedy/identity.ts';
import { examples } from '../../data/examples/index.ts';
import { tables } from '../../data/index.ts';
import { battery, oneCircuit, type RawJob } from './checksJob.ts';

interface Raw {
  readonly [field: string]: unknown;
}
type Change = (part: Raw) => Raw;

const HALF_AWG: Readonly<Record<string, string>> = { '4/0': '1/0', '3/0': '1', '2/0': '2', '1/0': '3' };

/** Half the copper: three gauges, or half the square millimetres. */
function halved(size: unknown): unknown {
  if (typeof size !== 'string') return size;
  const [, figure = '', unit = ''] = /^(\S+) (AWG|mm2)$/.exec(size) ?? [];
  if (unit === 'mm2') return `${Number(figure) / 2} mm2`;
  return unit === 'AWG' ? `${HALF_AWG[figure] ?? Math.min(18, Number(figure) + 3)} AWG` : size;
}

const spoilt: Readonly<Record<string, Change>> = {
  'as it is': (part) => part,
  'without a fuse or breaker': (part) =>
    part['kind'] === 'fuse' || part['kind'] === 'breaker'
      ? { id: part['id'], kind: 'switch', from: part['from'], to: part['to'], state: part['state'] ?? 'closed' }
      : part,
  'with cables of half the copper': (part) => ({
    ...part,
    ...(part['size'] === undefined ? {} : { size: halved(part['size']) }),
    ...(part['minusSize'] === undefined ? {} : { minusSize: halved(part['minusSize']) }),
  }),
  'with fuses of half the rating': rated(0.5),
  'with fuses of four times the rating': rated(4),
};

function rated(factor: number): Change {
  return (part) => {
    const isDevice = part['kind'] === 'fuse' || part['kind'] === 'breaker';
    return isDevice ? { ...part, ratingA: Number(part['ratingA']) * factor } : part;
  };
}

function opened(job: object) {
  const draft = draftOf(JSON.stringify(job));
  if (!draft.ok) throw new Error(JSON.stringify(draft.issues));
  return draft.value;
}

function openedRaw(raw: RawJob) {
  return opened({ format: 'ohmwright-job', version: 1, title: 'a job for a test', practice: 'iec-land', ...raw });
}

function judged(draft: Draft, edit: Parameters<typeof applyEdit>[1] | null): readonly Finding[] {
  const edited = edit === null ? undefined : applyEdit(draft, edit, tables);
  if (edited !== undefined && !edited.ok) throw new Error(JSON.stringify(edited.issues));
  const job = edited === undefined ? opened(draft).job : edited.value.job;
  const rules = checkRules.filter(({ id }) => PROTECTION_RULES.has(id));
  return runRules(new CheckContext({ job, tables }), rules).findings;
}

function ids(findings: readonly Finding[]): readonly string[] {
  const sorted = findings.map(identityOf);
  sorted.sort();
  return sorted;
}

/** Every example bare of devices and with thin cables; the other ways to spoil a job on a few, since all are much alike. */
const spoiltJobs = examples.flatMap(({ name, text }) => {
  const isWhole = ['weekend-hut', 'canal-boat'].includes(name);
  const bare = name.endsWith('sloop') ? [] : ['with cables of half the copper'];
  const ways = isWhole ? Object.keys(spoilt) : ['without a fuse or breaker', ...bare];
  return ways.map((way) => ({ name, text, way }));
});

describe('proposals for an example', () => {
  it.each(spoiltJobs)(
    '$name $way bring no finding of protection, and what they say they solve is gone',
    ({ text, way }) => {
      const raw = JSON.parse(text) as { parts: Raw[] };
      const { draft, job } = opened({ ...raw, parts: raw.parts.map(spoilt[way]!) });
      const before = ids(judged(draft, null));
      const proposal = proposeProtection({ draft, job, tables });
      const after = ids(judged(draft, proposal.edit));
      expect(after.filter((id) => !before.includes(id))).toStrictEqual([]);
      expect(ids(proposal.solves)).toStrictEqual(before.filter((id) => !after.includes(id)));
      expect(ids(proposal.left)).toStrictEqual(after);
    },
  );

  it('leave nothing of a hut whose fuses are gone, whose cables are thin, or whose fuses are wrong', () => {
    const { text } = examples.find(({ name }) => name === 'weekend-hut')!;
    const raw = JSON.parse(text) as { parts: Raw[] };
    for (const change of Object.values(spoilt)) {
      const made = opened({ ...raw, parts: raw.parts.map(change) });
      expect(proposeProtection({ ...made, tables }).left).toStrictEqual([]);
    }
  });
});

describe('a proposal', () => {
  const spare = { fuse: { ratingA: 25 }, cable: { size: '6 mm2', run: 'free-air' } } as const;

  it('keeps what passes, with its sum, and has nothing to apply', () => {
    const raw = oneCircuit({ ...spare, load: { currentA: 10, continuous: true } });
    const { runs, edit, cost } = proposeProtection({ ...openedRaw(raw), tables });
    const run = runs.find(({ id }) => id === 'L1')!;
    expect([run.verdict, run.words, run.edit, edit]).toStrictEqual(['keep', '25 A fuse F1 stays', null, null]);
    expect(cost).toStrictEqual({ copperMmm2: 0, newDevices: 0, swappedDevices: 0 });
    expect(run.reasons[0]).toMatch(/^1\.25 × 10 A = 12\.5 A; 25 A at F1 stays; cable (OUT|BACK) \(6 mm²\) carries/);
  });

  it('never changes the draft that it is made for, and each run has an edit of its own', () => {
    const opened = openedRaw(oneCircuit({ ...spare, fuse: { ratingA: 250 }, load: { currentA: 10 } }));
    const before = JSON.stringify(opened.draft);
    const { edit, runs } = proposeProtection({ ...opened, tables });
    expect(JSON.stringify(opened.draft)).toBe(before);
    expect(runs.filter((run) => run.edit !== null).map(({ id }) => id)).toStrictEqual(['L1']);
    expect(ids(judged(opened.draft, edit))).toStrictEqual([]);
  });

  it('puts a fuse at a battery that has none, in the lead right at its post', () => {
    const raw = oneCircuit({ ...spare, load: { currentA: 10, continuous: true } });
    const parts = raw.parts
      .filter(({ id }) => id !== 'F1')
      .map((part) => (part.id === 'OUT' ? { ...part, from: 'P' } : part));
    const { runs, solves } = proposeProtection({ ...openedRaw({ ...raw, parts }), tables });
    const [device] = runs.flatMap(({ devices }) => devices);
    expect([device?.fromA, device?.ratingA]).toStrictEqual([null, 16]);
    expect(device?.place).toContain('in the plus lead right at B1');
    expect(solves.map(({ rule }) => rule)).toContain('no-fuse-on-source');
  });

  it('gives a thin branch a fuse of its own where that is less than a thicker cable, and the other way round', () => {
    const shared = (lengthM: number) => ({
      parts: [
        battery('B1'),
        { id: 'F1', kind: 'fuse', from: 'P', to: 'Q', ratingA: 125 },
        {
          id: 'BIG',
          kind: 'pair',
          from: { plus: 'Q', minus: 'N' },
          to: { plus: 'X', minus: 'Y' },
          lengthM: 1,
          size: '50 mm2',
          run: 'free-air',
        },
        { id: 'HEAT', kind: 'load', plus: 'X', minus: 'Y', currentA: 90, continuous: true },
        {
          id: 'THIN',
          kind: 'pair',
          from: { plus: 'X', minus: 'Y' },
          to: { plus: 'L', minus: 'M' },
          lengthM,
          size: '2.5 mm2',
          run: 'free-air',
        },
        { id: 'LAMP', kind: 'load', plus: 'L', minus: 'M', currentA: 2, continuous: true },
      ],
    });
    const changesOf = (lengthM: number) => {
      const { runs } = proposeProtection({ ...openedRaw(shared(lengthM)), tables });
      const run = runs.find(({ id }) => id === 'LAMP')!;
      return { news: run.devices.map(({ fromA, ratingA }) => [fromA, ratingA]), sizes: run.cables.length, run };
    };
    const long = changesOf(5);
    expect([long.news, long.sizes]).toStrictEqual([[[null, 4]], 0]);
    expect(long.run.alternatives.some(({ why }) => why.startsWith('dearer'))).toBe(true);
    const short = changesOf(0.2);
    expect([short.news, short.sizes]).toStrictEqual([[], 1]);
  });

  it('says what is missing where a current or a size is not known, and proposes nothing there', () => {
    const raw = oneCircuit({
      cable: { size: undefined, resistanceOhm: 0.001 },
      fuse: { ratingA: 5 },
      load: { currentA: 10 },
    });
    const run = proposeProtection({ ...openedRaw(raw), tables }).runs.find(({ id }) => id === 'L1')!;
    expect(run.edit).toBeNull();
    expect(run.alternatives.map(({ why }) => why).join()).toContain('not known');
  });

  it('gives no proposals where the job names no practice', () => {
    const { draft } = openedRaw(oneCircuit({ ...spare, fuse: { ratingA: 250 }, load: { currentA: 10 } }));
    const { practice: _, ...bare } = draft as { practice?: unknown };
    expect(proposeProtection({ ...opened(bare), tables }).edit).toBeNull();
  });

  it('tells how far it is, rising to the whole', () => {
    const told: number[] = [];
    const raw = oneCircuit({ ...spare, fuse: { ratingA: 250 }, load: { currentA: 10 } });
    proposeProtection({ ...openedRaw(raw), tables, progress: (done, of) => told.push(done / of) });
    expect(told.at(-1)).toBe(1);
    expect(told.every((share, k) => k === 0 || share >= told[k - 1]!)).toBe(true);
  });

  it('names only rules of the catalogue, or such as it is to hold once they are there', () => {
    const known = new Set(checkRules.map(({ id }) => id));
    expect([...PROTECTION_RULES].filter((id) => known.has(id)).length).toBeGreaterThan(12);
  });
});
