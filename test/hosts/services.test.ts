import { chmodSync, existsSync, mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import Papa from 'papaparse';
import { describe, expect, test } from 'vitest';
import type { HostAnswer, HostAsk, HostEvent, HostMethod, HostValue, KeptJob, Trouble } from '../../core/host.ts';
import { starters } from '../../data/starters.ts';
import { dispatch } from '../../electron/channel/dispatch.ts';
import { schemas } from '../../electron/channel/schemas.ts';
import { fileStem } from '../../electron/services/fileName.ts';
import { createServices, type Services } from '../../electron/services/services.ts';
import { openBetter } from '../../electron/store/betterSqlite.ts';
import type { Store } from '../../electron/store/store.ts';
import { tenAmps, thinCable, twoSlips } from './smallJobs.ts';
import { tempFolder, tempStore } from './tempStore.ts';

const ten = JSON.stringify(tenAmps);
const thin = JSON.stringify(thinCable);
const changed = (text: string): string => text.replace('Invented test job', 'Invented test job, changed');

interface Host {
  readonly services: Services;
  readonly store: Store;
  readonly folder: string;
  readonly events: HostEvent[];
  readonly shown: string[];
  readonly log: string[];
  /** What the person answers when they are asked for a file. */
  readonly person: { opens: string | null; saves: string | null };
  readonly ended: () => number;
  /** The value of a call; fails the test where it ends in trouble. */
  call<M extends HostMethod>(method: M, ask: HostAsk<M>): Promise<HostValue<M>>;
  /** The trouble that a call ends in. */
  trouble(method: unknown, ask: unknown): Promise<Trouble>;
}

/** Services on a real store, with a person who answers at once. */
async function host({ asks = true }: { asks?: boolean } = {}): Promise<Host> {
  const folder = tempFolder();
  const store = await tempStore({ folder: join(folder, 'store'), now: () => new Date('2026-03-31T10:00:00Z') });
  const person: Host['person'] = { opens: null, saves: null };
  const shown: string[] = [];
  const log: string[] = [];
  let ended = 0;
  const services = createServices({
    store,
    door: {
      askOpen: async () => person.opens,
      askSave: async () => person.saves,
      show: async (path) => {
        shown.push(path);
      },
      saveFolder: join(folder, 'saved'),
    },
    about: {
      kind: 'window',
      version: '9.9.9',
      can: { askForFile: asks, askWhereToSave: asks, showFile: asks },
    },
    log: (line) => {
      log.push(line);
    },
    end: () => {
      ended += 1;
    },
  });
  const events: HostEvent[] = [];
  services.onEvent((event) => {
    events.push(event);
  });
  const send = async (method: unknown, ask: unknown): Promise<HostAnswer<unknown>> =>
    await dispatch(services, method, ask, { window: 'w1' });
  return {
    services,
    store,
    folder,
    events,
    shown,
    log,
    person,
    ended: () => ended,
    call: async (method, ask) => {
      const answer = await send(method, ask);
      if (!answer.ok) throw new Error(`${method}: ${answer.trouble.code}: ${answer.trouble.message}`);
      return answer.value as never;
    },
    trouble: async (method, ask) => {
      const answer = await send(method, ask);
      if (answer.ok) throw new Error(`${String(method)} was expected to end in trouble`);
      return answer.trouble;
    },
  };
}

async function hostWithJob(options: { asks?: boolean } = {}): Promise<Host & { readonly kept: KeptJob }> {
  const made = await host(options);
  return { ...made, kept: await made.call('jobs.create', { text: ten, label: 'begun' }) };
}

describe('jobs', () => {
  test('a job is made, kept, undone, redone and named; every window is told of each new head', async () => {
    const { call, events, kept } = await hostWithJob();
    const { job } = kept;
    const { head } = await call('jobs.keep', { job, after: kept.head, text: changed(ten), label: 'Title' });
    expect(await call('jobs.list', {})).toEqual([
      { job, title: 'Invented test job, changed', parts: 2, changedAt: '2026-03-31T10:00:00.000Z', file: null },
    ]);
    expect((await call('jobs.go', { job, from: head, to: kept.head })).text).toBe(ten);
    const { line } = await call('jobs.line', { job, most: 10 });
    expect(line.map(({ label }) => label)).toEqual(['begun', 'Title']);
    expect((await call('jobs.snapshot', { job, revision: head, name: ' as left ' })).snapshot).toBe('as left');
    expect((await call('jobs.revision', { job, revision: head })).text).toBe(changed(ten));
    expect((await call('jobs.history', { job, most: 1 })).revisions).toHaveLength(1);
    expect(events).toEqual([
      { event: 'job-changed', job, head: kept.head, by: 'w1' },
      { event: 'job-changed', job, head, by: 'w1' },
      { event: 'job-changed', job, head: kept.head, by: 'w1' },
    ]);
  });

  test('a text with issues is refused with all of them, and nothing is kept', async () => {
    const { trouble, call, kept } = await hostWithJob();
    const slips = JSON.stringify(twoSlips);
    for (const [method, ask] of [
      ['jobs.create', { text: slips, label: 'x' }],
      ['jobs.keep', { job: kept.job, after: kept.head, text: slips, label: 'x' }],
      ['reports.pdf', { text: slips, paper: 'A4', preparedOn: '2026-03-31' }],
      ['lists.csv', { text: slips, list: 'cables' }],
    ] as const) {
      const { code, issues } = await trouble(method, ask);
      expect([method, code, issues?.map(({ path }) => path)]).toEqual([
        method,
        'issues',
        ['parts[1].lengthM', 'parts[1].size'],
      ]);
    }
    expect((await call('jobs.history', { job: kept.job, most: 9 })).revisions).toHaveLength(1);
    expect(await call('jobs.list', {})).toHaveLength(1);
  });

  test('a change on an old head is a conflict that names the new one', async () => {
    const { trouble, call, kept } = await hostWithJob();
    const ask = { job: kept.job, after: kept.head, text: ten, label: 'mine' };
    const { head } = await call('jobs.keep', ask);
    expect(await trouble('jobs.keep', ask)).toMatchObject({ code: 'conflict', head });
    expect(await trouble('files.saveJob', { job: kept.job, revision: kept.head, where: 'ask' })).toMatchObject({
      code: 'conflict',
      head,
    });
  });

  test('a page may say how a file is called, not where it lies', async () => {
    const { call } = await host();
    const kept = await call('jobs.create', { text: ten, label: 'x', file: '/etc/somewhere/hut.job.json' });
    expect(kept.file).toBe('hut.job.json');
  });
});

describe('files', () => {
  test('a file that is opened twice is one job; what changed in it comes as a new revision', async () => {
    const { call, person, folder, events } = await host();
    person.opens = join(folder, 'hut.job.json');
    writeFileSync(person.opens, ten);
    const first = await call('files.open', {});
    await call('jobs.remove', { job: first!.job });
    expect(await call('files.open', {})).toEqual(first);
    expect(await call('jobs.list', {})).toHaveLength(1);
    writeFileSync(person.opens, changed(ten));
    const again = await call('files.open', {});
    expect([again?.job, again?.text]).toEqual([first?.job, changed(ten)]);
    const { revisions } = await call('jobs.history', { job: first!.job, most: 9 });
    expect(revisions.map(({ label }) => label)).toEqual(['Read again from hut.job.json', 'Read from hut.job.json']);
    expect(events).toEqual([{ event: 'job-changed', job: first?.job, head: again?.head, by: 'w1' }]);
    // The file says again what it once said: that is a state which the job knows.
    writeFileSync(person.opens, ten);
    expect(await call('files.open', {})).toEqual(again);
    person.opens = null;
    expect(await call('files.open', {})).toBeNull();
  });

  test.each<[string, string | Uint8Array, string]>([
    ['issues', JSON.stringify(twoSlips), 'issues'],
    ['no JSON', 'dear aunt', 'issues'],
    ['no UTF-8', Uint8Array.of(0xff, 0xfe, 0x7b, 0), 'issues'],
    ['nothing', '', 'issues'],
  ])('a file with %s is told as such and not touched', async (_, content, code) => {
    const { trouble, call, person, folder } = await host();
    person.opens = join(folder, 'odd.job.json');
    writeFileSync(person.opens, content);
    expect((await trouble('files.open', {})).code).toBe(code);
    expect(readFileSync(person.opens).equals(Buffer.from(content))).toBe(true);
    expect(await call('jobs.list', {})).toEqual([]);
  });

  test('a file that is not there, a folder and a device are told in words', async () => {
    const { trouble, person, folder } = await host();
    for (const path of [join(folder, 'nowhere'), folder, '/dev/zero', 'x\0y']) {
      person.opens = path;
      const { code, message } = await trouble('files.open', {});
      expect([code, message]).toEqual(['not-found', expect.stringContaining('cannot be read: there is no such file')]);
    }
  });

  test('a file opened with the system ends in an event, whether it is a job or not', async () => {
    const { services, events, folder } = await host();
    const [good, bad] = [join(folder, 'good.job.json'), join(folder, 'bad.job.json')];
    writeFileSync(good, ten);
    writeFileSync(bad, '{');
    await services.openPath(good);
    await services.openPath(bad);
    expect(events).toMatchObject([
      { event: 'open-job' },
      { event: 'file-trouble', file: bad, trouble: { code: 'issues' } },
    ]);
  });

  test('a job goes where the person says, and from then on to the same file', async () => {
    const { call, person, kept, folder } = await hostWithJob();
    person.saves = join(folder, 'mine.job.json');
    const { job } = kept;
    expect(await call('files.saveJob', { job, revision: kept.head, where: 'known' })).toEqual({
      name: 'mine.job.json',
      path: person.saves,
    });
    const { head } = await call('jobs.keep', { job, after: kept.head, text: changed(ten), label: 'x' });
    const path = person.saves;
    person.saves = null;
    expect(await call('files.saveJob', { job, revision: head, where: 'ask' })).toBeNull();
    expect(readFileSync(path, 'utf8')).toBe(ten);
    expect((await call('files.saveJob', { job, revision: head, where: 'known' }))?.path).toBe(path);
    expect(readFileSync(path, 'utf8')).toBe(changed(ten));
    expect((await call('jobs.open', { job })).file).toBe(path);
  });

  test('a file that somebody else changed in the meantime is not written over', async () => {
    const { call, trouble, person, folder } = await host();
    person.opens = join(folder, 'hut.job.json');
    writeFileSync(person.opens, ten);
    const kept = (await call('files.open', {}))!;
    writeFileSync(person.opens, thin);
    const told = await trouble('files.saveJob', { job: kept.job, revision: kept.head, where: 'known' });
    expect([told.code, told.message]).toEqual(['conflict', expect.stringContaining('changed by another program')]);
    expect(readFileSync(person.opens, 'utf8')).toBe(thin);
  });

  test('where the host cannot ask, files go to its own folder and never over another', async () => {
    const { call, kept, folder } = await hostWithJob({ asks: false });
    const { job, head } = kept;
    const names: (string | undefined)[] = [];
    for (let times = 0; times < 3; times += 1) {
      names.push((await call('files.saveJob', { job, revision: head, where: 'ask' }))?.name);
    }
    expect(names).toEqual([
      'Invented test job.job.json',
      'Invented test job (2).job.json',
      'Invented test job (3).job.json',
    ]);
    // The last one is the job's own file now.
    expect((await call('files.saveJob', { job, revision: head, where: 'known' }))?.name).toBe(names[2]);
    const pdf = { text: ten, paper: 'A4', preparedOn: '2026-03-31' } as const;
    expect((await call('reports.save', pdf))?.name).toBe('Invented test job.pdf');
    expect((await call('reports.save', pdf))?.name).toBe('Invented test job (2).pdf');
    expect(readdirSync(join(folder, 'saved'))).toHaveLength(5);
  });

  test('a place that cannot be written is told, and nothing half-written is left', async () => {
    const { trouble, person, kept, folder } = await hostWithJob();
    const ask = { job: kept.job, revision: kept.head, where: 'ask' };
    mkdirSync(join(folder, 'a-folder'));
    for (const [saves, code] of [
      [join(folder, 'no', 'where.job.json'), 'not-found'],
      ['/dev/full', 'disk-full'],
      [join(folder, 'a-folder'), 'not-found'],
    ] as const) {
      person.saves = saves;
      expect([saves, (await trouble('files.saveJob', ask)).code]).toEqual([saves, code]);
    }
    expect(readdirSync(folder).toSorted()).toEqual(['a-folder', 'store']);
  });

  test.skipIf(process.getuid?.() !== 0)(
    'a folder of somebody else is told as one that may not be written',
    async () => {
      const { trouble, person, kept, folder } = await hostWithJob();
      person.saves = join(folder, 'other', 'x.job.json');
      mkdirSync(join(folder, 'other'));
      chmodSync(join(folder, 'other'), 0o755);
      chmodSync(folder, 0o755);
      // Only the place of the file is out of reach for this user; the store is open already.
      process.seteuid?.(65_534);
      try {
        const { code } = await trouble('files.saveJob', { job: kept.job, revision: kept.head, where: 'ask' });
        expect(code).toBe('read-only');
      } finally {
        process.seteuid?.(0);
      }
      expect(readdirSync(join(folder, 'other'))).toEqual([]);
    },
  );

  test('only what this host wrote since its start is shown', async () => {
    const { call, trouble, shown, person, kept, folder } = await hostWithJob();
    person.saves = join(folder, 'mine.job.json');
    await call('files.saveJob', { job: kept.job, revision: kept.head, where: 'ask' });
    await call('files.show', { path: person.saves });
    expect(shown).toEqual([person.saves]);
    expect((await trouble('files.show', { path: '/etc/passwd' })).code).toBe('not-found');
    const poor = await host({ asks: false });
    expect((await poor.trouble('files.show', { path: person.saves })).code).toBe('cannot');
    expect((await poor.trouble('files.open', {})).code).toBe('cannot');
  });

  test.each([
    ['Weekend hut', 'Weekend hut'],
    ['../../etc/passwd', 'etc-passwd'],
    ['a/b\\c:d*e?f"g<h>i|j', 'a-b-c-d-e-f-g-h-i-j'],
    ['  .hidden.  ', 'hidden'],
    ['con', 'job'],
    ['\u202e\u0000\n', 'job'],
    ['', 'job'],
    ['Hütte 🔋', 'Hütte 🔋'],
    ['x'.repeat(300), 'x'.repeat(80)],
  ])('the title %j makes a file name of %j', (title, stem) => {
    expect(fileStem(title)).toBe(stem);
  });
});

describe('papers', () => {
  test('a report is a PDF of the day and practice asked for, and the same again', async () => {
    const { call } = await host();
    const ask = { text: thin, paper: 'Letter', preparedOn: '2026-03-31', practice: 'us-marine' } as const;
    const made = await call('reports.pdf', ask);
    expect(made.name).toBe('Invented test job.pdf');
    const bytes = Buffer.from(made.base64, 'base64');
    expect([bytes.subarray(0, 5).toString('latin1'), bytes.subarray(-7).toString('latin1')]).toEqual([
      '%PDF-',
      '\n%%EOF\n',
    ]);
    expect(await call('reports.pdf', ask)).toEqual(made);
    expect((await call('reports.pdf', { ...ask, practice: 'iec-land' })).base64).not.toBe(made.base64);
  });

  const rowsOf = (csv: string): string[][] => Papa.parse<string[]>(csv.replace('\ufeff', '').trimEnd()).data;

  test('the cut list has every conductor once, its size in both systems and what it carries', async () => {
    const { call } = await host();
    const { name, csv } = await call('lists.csv', { text: thin, list: 'cables' });
    expect(name).toBe('Invented test job - cut list.csv');
    const [headings, first, second] = rowsOf(csv);
    expect(headings).toEqual([
      'Id',
      'Label',
      'From',
      'To',
      'Size',
      'In the other system',
      'Length (m)',
      'Length (ft, in)',
      'Conductors in parallel',
      'Carries at most (A)',
      'In case',
      'Ends together (mΩ)',
    ]);
    // 5 m are 16.404 ft: 16 ft and 4.85 in. 1.5 mm² lies between 16 AWG (1.31 mm²) and 15 AWG (1.65 mm²); the load draws 30 A.
    expect(first?.slice(0, 5)).toEqual(['C1', '', 'F+', 'L+', '1.5 mm²']);
    expect(first?.[5]).toMatch(/^between 16 AWG and 1[45] AWG$/);
    expect(first?.slice(6)).toEqual(['5', '16 ft 4.9 in', '1', '30', 'as-drawn', '']);
    expect(second?.[0]).toBe('C2');
  });

  test('the fuse list says what each device protects and carries', async () => {
    const { call } = await host();
    const { csv } = await call('lists.csv', { text: thin, list: 'fuses' });
    const [headings, row] = rowsOf(csv);
    const cells = Object.fromEntries(headings!.map((heading, index) => [heading, row?.[index]]));
    expect(cells).toMatchObject({
      Id: 'F1',
      Kind: 'fuse',
      'Rating (A)': '300',
      'Interrupts (A)': '20000',
      'Carries at most (A)': '30',
      Protects: 'C1; C2',
    });
  });

  test('the parts list has every part of every starter, and reads back cell by cell', async () => {
    const { call } = await host();
    let rows = 0;
    for (const [, text] of starters) {
      const lengths: number[] = [];
      for (const list of ['cables', 'fuses', 'parts'] as const) {
        const table = rowsOf((await call('lists.csv', { text, list })).csv);
        for (const row of table) expect(row).toHaveLength(table[0]!.length);
        lengths.push(table.length - 1);
      }
      expect(lengths[2]).toBe((JSON.parse(text) as { parts: unknown[] }).parts.length);
      rows += lengths.reduce((sum, length) => sum + length, 0);
    }
    console.log(`${String(rows)} rows of lists from ${String(starters.size)} starters`);
    expect(rows).toBeGreaterThan(200);
  });

  test('a label that a spreadsheet would run as a formula is disarmed, a number is not', async () => {
    const { call } = await host();
    const labelled = (label: string): string => ten.replace('"id":"L1"', `"label":${JSON.stringify(label)},"id":"L1"`);
    const cell = async (label: string): Promise<string | undefined> =>
      rowsOf((await call('lists.csv', { text: labelled(label), list: 'parts' })).csv).find(([id]) => id === 'L1')?.[1];
    for (const [label, told] of [
      ['=1+1', "'=1+1"],
      ['+cmd|x', "'+cmd|x"],
      ['-x', "'-x"],
      ['@sum', "'@sum"],
      ['-12.5', '-12.5'],
      ['a "b", c', 'a "b", c'],
    ] as const) {
      expect(await cell(label)).toBe(told);
    }
  });
});

describe('what the person keeps', () => {
  test('preferences have defaults, change one by one, and a damaged one counts as not chosen', async () => {
    const { call, store, folder } = await host();
    const defaults = { theme: 'system', paper: 'A4', units: 'metric', textPercent: 100, motion: 'system' };
    expect(await call('preferences.read', {})).toEqual(defaults);
    expect(await call('preferences.change', { theme: 'dark', textPercent: 150 })).toEqual({
      ...defaults,
      theme: 'dark',
      textPercent: 150,
    });
    const driver = await openBetter({ file: join(folder, 'store', 'ohmwright.db') });
    driver.exec(
      `UPDATE preferences SET value = '"puce"' WHERE name = 'theme'; INSERT INTO preferences VALUES ('paper', 'A')`,
    );
    driver.close();
    expect(await call('preferences.read', {})).toEqual({ ...defaults, textPercent: 150 });
    store.close();
  });

  test('own parts and readings come back as they were given', async () => {
    const { call, kept } = await hostWithJob();
    const part = { id: 'p1', label: 'Our fuse', part: { kind: 'fuse', ratingA: '60 A', 'x-shelf': [3, null] } };
    expect(await call('library.keep', part)).toEqual(part);
    expect(await call('library.list', {})).toEqual([part]);
    await call('library.remove', { id: 'p1' });
    expect(await call('library.list', {})).toEqual([]);
    const reading = { id: 'R1', quantity: 'current', part: 'L1', valueA: 9.8 };
    const logged = await call('readings.add', { job: kept.job, reading });
    expect(logged).toMatchObject({ job: kept.job, at: '2026-03-31T10:00:00.000Z', reading });
    expect(await call('readings.list', { job: kept.job })).toEqual([logged]);
  });
});

describe('the host', () => {
  test('says what it is and can, and where things lie', async () => {
    const { call, folder } = await host({ asks: false });
    expect(await call('host.about', {})).toEqual({
      kind: 'window',
      version: '9.9.9',
      can: { askForFile: false, askWhereToSave: false, showFile: false },
      storeFolder: join(folder, 'store'),
      saveFolder: join(folder, 'saved'),
      notices: [],
    });
    expect(existsSync(join(folder, 'saved'))).toBe(false);
  });

  test('ends with its store closed, after the answer; what comes later is told so', async () => {
    const { call, trouble, ended, folder } = await hostWithJob();
    expect(await call('host.end', {})).toBeNull();
    expect(ended()).toBe(0);
    await new Promise((resolve) => setTimeout(resolve, 5));
    expect(ended()).toBe(1);
    expect((await trouble('jobs.list', {})).code).toBe('no-host');
    expect(readdirSync(join(folder, 'store'))).toEqual(['ohmwright.db']);
  });
});

describe('messages that are none', () => {
  const job = 'some-job';
  const circle: Record<string, unknown> = {};
  circle['round'] = circle;
  const malformed: readonly [unknown, unknown, RegExp][] = [
    ['jobs.burn', {}, /no method "jobs.burn"/],
    ['__proto__', {}, /no method/],
    ['constructor', {}, /no method/],
    ['toString', {}, /no method/],
    [undefined, {}, /no method/],
    [7, {}, /no method/],
    [['jobs.list'], {}, /no method/],
    ['jobs.list', undefined, /malformed/],
    ['jobs.list', null, /malformed/],
    ['jobs.list', [], /malformed/],
    ['jobs.list', { extra: 1 }, /extra/],
    ['jobs.open', {}, /job/],
    ['jobs.open', { job: '' }, /job/],
    ['jobs.open', { job: 'x'.repeat(101) }, /job/],
    ['jobs.open', { job: { $gt: '' } }, /job/],
    ['jobs.create', { text: 1, label: 'x' }, /text/],
    ['jobs.create', { text: 'x', label: 'x'.repeat(1001) }, /label/],
    ['jobs.create', { text: 'x', label: 'x', file: '' }, /file/],
    ['jobs.keep', { job, after: '1', text: 'x', label: 'x' }, /after/],
    ['jobs.keep', { job, after: 1.5, text: 'x', label: 'x' }, /after/],
    ['jobs.keep', { job, after: Number.NaN, text: 'x', label: 'x' }, /after/],
    ['jobs.keep', { job, after: 2 ** 60, text: 'x', label: 'x' }, /after/],
    ['jobs.keep', { job, after: 1, text: 'x' }, /label/],
    ['jobs.go', { job, from: 1 }, /to/],
    ['jobs.history', { job, most: 0 }, /most/],
    ['jobs.history', { job, most: 1e9 }, /most/],
    ['jobs.history', { job, most: 5, before: -1 }, /before/],
    ['jobs.snapshot', { job, revision: 1, name: 'x'.repeat(201) }, /name/],
    ['files.saveJob', { job, revision: 1, where: 'anywhere' }, /where/],
    ['files.show', { path: '' }, /path/],
    ['reports.pdf', { text: 'x', paper: 'A3', preparedOn: '2026-03-31' }, /paper/],
    ['reports.pdf', { text: 'x', paper: 'A4', preparedOn: 'yesterday' }, /preparedOn/],
    ['reports.pdf', { text: 'x', paper: 'A4', preparedOn: '2026-03-31', practice: 'moon' }, /practice/],
    ['lists.csv', { text: 'x', list: 'people' }, /list/],
    ['library.keep', { id: 'x', label: 'x', part: [] }, /part/],
    ['library.keep', { id: 'x', label: 'x', part: circle }, /part/],
    ['library.keep', { id: 'x', label: 'x', part: { big: 'x'.repeat(70_000) } }, /part/],
    ['preferences.change', { theme: 'puce' }, /theme/],
    ['preferences.change', { textPercent: 110 }, /textPercent/],
    ['preferences.change', { colour: 'red' }, /colour/],
    ['readings.add', { job, reading: 'none' }, /reading/],
    ['readings.add', { job, reading: { n: 1n } }, /reading/],
  ];

  test('each is refused, names the field, and does nothing', async () => {
    const { trouble, call, log } = await host();
    for (const [method, ask, says] of malformed) {
      const { code, message } = await trouble(method, ask);
      expect([String(method), code, message]).toEqual([String(method), 'refused', expect.stringMatching(says)]);
      expect(message).toContain('Nothing was done');
    }
    console.log(`${String(malformed.length)} malformed messages refused`);
    expect(await call('jobs.list', {})).toEqual([]);
    expect(log).toEqual([]);
  });

  test('a text longer than any job is refused before anybody reads it', async () => {
    const { trouble } = await host();
    const text = 'x'.repeat(64 * 1024 * 1024 + 1);
    expect((await trouble('jobs.create', { text, label: 'x' })).code).toBe('refused');
  });

  test('every method has a schema and a service', async () => {
    const { services } = await host();
    expect([...schemas.keys()].toSorted()).toEqual(Object.keys(services.methods).toSorted());
  });

  test('a defect is logged whole and told without its insides', async () => {
    const { services, trouble, log } = await host();
    const broken = {
      ...services,
      methods: { ...services.methods, 'jobs.list': () => Promise.reject(new Error('inner words')) },
    };
    const answer = await dispatch(broken, 'jobs.list', {}, { window: 'w1' });
    expect(answer).toMatchObject({ ok: false, trouble: { code: 'defect' } });
    expect(JSON.stringify(answer)).not.toMatch(/inner words|\.ts:|\n/);
    expect(log.join('')).toContain('inner words');
    const mute = {
      ...broken,
      log: () => {
        throw new Error('the log is full');
      },
    };
    expect((await dispatch(mute, 'jobs.list', {}, { window: 'w1' })).ok).toBe(false);
    expect((await trouble('jobs.open', { job: 'nobody' })).code).toBe('not-found');
  });
});
