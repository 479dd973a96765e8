/** What every host does alike: one walk through all of the contract, to be run on each host as it really is. */
import { existsSync, readFileSync } from 'node:fs';
import { basename } from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import type {
  HostAnswer,
  HostAsk,
  HostChannel,
  HostEvent,
  HostMethod,
  HostValue,
  KeptJob,
  TroubleCode,
} from '../../core/host.ts';
import { tenAmps, thinCable, twoSlips } from './smallJobs.ts';

export interface HostUnderTest {
  readonly channel: HostChannel;
  /** Another page of the same host; only where `pages` is 2. */
  readonly other?: HostChannel;
  /** What the person answers to the next dialog; only in a window. */
  readonly dialogs?: { open(path: string | null): void; save(path: string | null): void };
  /** Ends the host where the walk has not ended it. */
  stop(): Promise<void>;
}

export interface ContractPlan {
  readonly kind: 'window' | 'browser';
  /** How many pages the host can have at once. */
  readonly pages: 1 | 2;
  readonly start: () => Promise<HostUnderTest>;
}

/** `name` is what the host is called in the list of tests. */
export function hostContract(name: string, plan: ContractPlan): void {
  describe(`the contract of hosts, kept by ${name}`, () => {
    let host: HostUnderTest;
    beforeAll(async () => {
      host = await plan.start();
    });
    afterAll(async () => {
      await host.stop();
    });
    const hostNow = (): HostUnderTest => host;
    aboutAndPreferences(hostNow, plan);
    jobs(hostNow);
    history(hostNow);
    filesAndPapers(hostNow);
    if (plan.kind === 'window') dialogs(hostNow);
    else noDialogs(hostNow);
    ownThings(hostNow);
    refusals(hostNow);
    if (plan.pages === 2) twoPages(hostNow);
    end(hostNow);
  });
}

type HostNow = () => HostUnderTest;

const text = (job: unknown): string => `${JSON.stringify(job, null, 2)}\n`;
const titled = (title: string): string => text({ ...tenAmps, title });

async function ask<M extends HostMethod>(channel: HostChannel, method: M, question: HostAsk<M>): Promise<HostValue<M>> {
  const answer: HostAnswer<HostValue<M>> = await channel.call(method, question);
  if (!answer.ok) throw new Error(`${method}: ${answer.trouble.code}: ${answer.trouble.message}`);
  return answer.value;
}

async function troubleOf(channel: HostChannel, method: HostMethod, question: unknown): Promise<TroubleCode> {
  const answer = await channel.call(method, question as HostAsk<HostMethod>);
  if (answer.ok) throw new Error(`${method} was expected to be refused`);
  expect(answer.trouble.message.length).toBeGreaterThan(10);
  return answer.trouble.code;
}

async function newJob(channel: HostChannel, title: string): Promise<KeptJob> {
  return await ask(channel, 'jobs.create', { text: titled(title), label: 'New job' });
}

function aboutAndPreferences(host: HostNow, plan: ContractPlan): void {
  test('it says what it is, what it can, and where things lie', async () => {
    const about = await ask(host().channel, 'host.about', {});
    expect(about.kind).toBe(plan.kind);
    expect(about.version).toMatch(/^\d+\.\d+\.\d+$/);
    expect(about.can.askForFile).toBe(plan.kind === 'window');
    expect(existsSync(about.storeFolder)).toBe(true);
    expect(about.saveFolder).not.toBe('');
    expect(about.notices).toEqual([]);
  });

  test('preferences change one by one, and stay as they were for the rest', async () => {
    const before = await ask(host().channel, 'preferences.read', {});
    const after = await ask(host().channel, 'preferences.change', { paper: 'Letter', textPercent: 150 });
    expect(after).toEqual({ ...before, paper: 'Letter', textPercent: 150 });
    expect(await ask(host().channel, 'preferences.read', {})).toEqual(after);
  });
}

function jobs(host: HostNow): void {
  test('a new job is kept with its text as it came, and listed first', async () => {
    const { channel } = host();
    const made = await newJob(channel, 'First of two');
    const second = await newJob(channel, 'Second of two');
    expect(made.text).toBe(titled('First of two'));
    expect(await ask(channel, 'jobs.open', { job: made.job })).toEqual(made);
    const [first] = await ask(channel, 'jobs.list', {});
    expect(first).toMatchObject({ job: second.job, title: 'Second of two', parts: 2, file: null });
  });

  test('a text that is no job is refused with every one of its issues', async () => {
    const answer = await host().channel.call('jobs.create', { text: text(twoSlips), label: 'New job' });
    if (answer.ok) throw new Error('a job with slips was taken');
    expect(answer.trouble.code).toBe('issues');
    expect(answer.trouble.issues!.map((issue) => issue.path)).toEqual(['parts[1].lengthM', 'parts[1].size']);
  });

  test('a change goes on from the head, and from nowhere else', async () => {
    const { channel } = host();
    const made = await newJob(channel, 'Changed');
    const change = { job: made.job, after: made.head, text: titled('Changed once'), label: 'Title' };
    const kept = await ask(channel, 'jobs.keep', change);
    const late = await channel.call('jobs.keep', { ...change, text: titled('Changed from an old state') });
    if (late.ok) throw new Error('a change to an old state was kept');
    expect(late.trouble).toMatchObject({ code: 'conflict', head: kept.head });
    expect((await ask(channel, 'jobs.open', { job: made.job })).title).toBe('Changed once');
  });

  test('a job that is taken off the list comes back whole', async () => {
    const { channel } = host();
    const made = await newJob(channel, 'Away and back');
    await ask(channel, 'jobs.remove', { job: made.job });
    const listed = await ask(channel, 'jobs.list', {});
    expect(listed.map((each) => each.job)).not.toContain(made.job);
    expect(await ask(channel, 'jobs.restore', { job: made.job })).toMatchObject({
      job: made.job,
      title: 'Away and back',
    });
    expect((await ask(channel, 'jobs.open', { job: made.job })).text).toBe(made.text);
  });
}

function history(host: HostNow): void {
  test('undo, another way on, and back to the first: every state stays, and the line shows the way of redo', async () => {
    const { channel } = host();
    const { job, head: first } = await newJob(channel, 'State 1');
    const keep = async (after: number, title: string): Promise<number> =>
      (await ask(channel, 'jobs.keep', { job, after, text: titled(title), label: title })).head;
    const second = await keep(first, 'State 2');
    const third = await keep(second, 'State 3');
    const undone = await ask(channel, 'jobs.go', { job, from: third, to: second });
    expect(undone).toMatchObject({ head: second, title: 'State 2', text: titled('State 2') });
    const line = await ask(channel, 'jobs.line', { job, most: 10 });
    expect(line.head).toBe(second);
    expect(line.line.map((state) => state.revision)).toEqual([first, second, third]);

    const other = await keep(second, 'State 3, otherwise');
    const { head, revisions } = await ask(channel, 'jobs.history', { job, most: 10 });
    expect(head).toBe(other);
    expect(revisions.map(({ revision, parent }) => [revision, parent])).toEqual([
      [other, second],
      [third, second],
      [second, first],
      [first, null],
    ]);
    expect(await ask(channel, 'jobs.revision', { job, revision: third })).toMatchObject({
      label: 'State 3',
      text: titled('State 3'),
    });
    const older = await ask(channel, 'jobs.history', { job, before: third, most: 1 });
    expect(older.revisions.map((state) => state.revision)).toEqual([second]);
  });

  test('a state gets a name, and loses it by an empty one', async () => {
    const { channel } = host();
    const { job, head } = await newJob(channel, 'Named');
    const named = await ask(channel, 'jobs.snapshot', { job, revision: head, name: 'As built' });
    expect(named).toMatchObject({ revision: head, snapshot: 'As built' });
    expect((await ask(channel, 'jobs.snapshot', { job, revision: head, name: '' })).snapshot).toBeNull();
  });
}

function filesAndPapers(host: HostNow): void {
  test('a saved job is a file with the text at its head', async () => {
    const { channel } = host();
    const { job, head } = await newJob(channel, 'Saved: weekend / hut');
    const { saveFolder, can } = await ask(channel, 'host.about', {});
    if (can.askWhereToSave) host().dialogs!.save(`${saveFolder}/chosen.job.json`);
    const written = await ask(channel, 'files.saveJob', { job, revision: head, where: 'ask' });
    expect(basename(written!.path)).toBe(written!.name);
    expect(readFileSync(written!.path, 'utf8')).toBe(titled('Saved: weekend / hut'));
    expect((await ask(channel, 'jobs.open', { job })).file).toBe(written!.path);
    const again = await ask(channel, 'files.saveJob', { job, revision: head, where: 'known' });
    expect(readFileSync(again!.path, 'utf8')).toBe(titled('Saved: weekend / hut'));
  });

  test('only a file of this session is shown', async () => {
    const { can } = await ask(host().channel, 'host.about', {});
    const code = await troubleOf(host().channel, 'files.show', { path: '/etc/hostname' });
    expect(code).toBe(can.showFile ? 'not-found' : 'cannot');
  });

  test('the report comes as a PDF, and is written whole', async () => {
    const { channel, dialogs } = host();
    const request = { text: text(thinCable), paper: 'A4', preparedOn: '2025-03-31' } as const;
    const made = await ask(channel, 'reports.pdf', request);
    expect(made.name).toMatch(/\.pdf$/);
    const bytes = Buffer.from(made.base64, 'base64');
    expect(bytes.subarray(0, 5).toString('latin1')).toBe('%PDF-');
    dialogs?.save(`${(await ask(channel, 'host.about', {})).saveFolder}/chosen.pdf`);
    const written = await ask(channel, 'reports.save', request);
    expect(readFileSync(written!.path).equals(bytes)).toBe(true);
  });

  test.each(['cables', 'fuses', 'parts'] as const)('the list of %s comes as rows of text', async (list) => {
    const { name, csv } = await ask(host().channel, 'lists.csv', { text: text(thinCable), list });
    expect(name).toMatch(/\.csv$/);
    expect(csv.trim().split('\n').length).toBeGreaterThan(1);
    expect(csv).toContain(list === 'fuses' ? 'F1' : 'C1');
  });
}

function noDialogs(host: HostNow): void {
  test('it does not pretend to ask for a file', async () => {
    expect(await troubleOf(host().channel, 'files.open', {})).toBe('cannot');
  });
}

function dialogs(host: HostNow): void {
  test('a file that the person chooses becomes a job; a dialog that is left leads to nothing', async () => {
    const { channel, dialogs } = host();
    const { job, head } = await newJob(channel, 'On a stick');
    const path = `${(await ask(channel, 'host.about', {})).saveFolder}/stick.job.json`;
    dialogs!.save(path);
    await ask(channel, 'files.saveJob', { job, revision: head, where: 'ask' });
    dialogs!.open(path);
    expect((await ask(channel, 'files.open', {}))!.text).toBe(titled('On a stick'));
    dialogs!.open(null);
    expect(await ask(channel, 'files.open', {})).toBeNull();
    dialogs!.save(null);
    expect(await ask(channel, 'files.saveJob', { job, revision: head, where: 'ask' })).toBeNull();
  });
}

function ownThings(host: HostNow): void {
  test('own parts are kept, changed and removed by their id', async () => {
    const { channel } = host();
    const lamp = { id: 'lamp', label: 'Reading lamp', part: { kind: 'load', powerW: 5 } };
    expect(await ask(channel, 'library.keep', lamp)).toEqual(lamp);
    const brighter = { ...lamp, part: { kind: 'load', powerW: 7 } };
    await ask(channel, 'library.keep', brighter);
    expect(await ask(channel, 'library.list', {})).toEqual([brighter]);
    await ask(channel, 'library.remove', { id: 'lamp' });
    expect(await ask(channel, 'library.list', {})).toEqual([]);
  });

  test('logged readings stay in the order in which they were taken', async () => {
    const { channel } = host();
    const { job } = await newJob(channel, 'Measured');
    const readings = [12.61, 12.52, 12.44].map((valueV, index) => {
      return { id: `r${String(index + 1)}`, quantity: 'voltage', plus: 'B+', minus: 'B-', valueV };
    });
    for (const reading of readings) await ask(channel, 'readings.add', { job, reading });
    const logged = await ask(channel, 'readings.list', { job });
    expect(logged.map((each) => each.reading)).toEqual(readings);
    expect(logged.map((each) => each.entry)).toEqual(logged.map((each) => each.entry).toSorted((a, b) => a - b));
  });
}

function refusals(host: HostNow): void {
  test.each<[HostMethod, unknown]>([
    ['jobs.open', {}],
    ['jobs.open', { job: 7 }],
    ['jobs.open', { job: 'x', more: 1 }],
    ['jobs.keep', { job: 'x', after: '1', text: '', label: '' }],
    ['jobs.history', { job: 'x', most: -1 }],
    ['preferences.change', { theme: 'pink' }],
    ['lists.csv', { text: '{}', list: '__proto__' }],
    ['host.about', null],
    ['host.about', []],
    ['jobs.nothing' as HostMethod, {}],
    ['__proto__' as HostMethod, {}],
  ])('%s of %j is refused in words', async (method, question) => {
    expect(await troubleOf(host().channel, method, question)).toBe('refused');
  });

  test.each<[HostMethod, unknown]>([
    ['jobs.open', { job: 'no-such-job' }],
    ['jobs.history', { job: 'no-such-job', most: 5 }],
    ['jobs.remove', { job: 'no-such-job' }],
    ['jobs.revision', { job: 'no-such-job', revision: 1 }],
  ])('%s of a job that is not there is not found', async (method, question) => {
    expect(await troubleOf(host().channel, method, question)).toBe('not-found');
  });
}

function twoPages(host: HostNow): void {
  test('what one page changes the other is told', async () => {
    const { channel, other } = host();
    const { job, head } = await newJob(channel, 'Seen by both');
    const told = new Promise<HostEvent>((resolve) => {
      const stop = other!.listen((event) => {
        if (event.event !== 'job-changed' || event.job !== job || event.head === head) return;
        stop();
        resolve(event);
      });
    });
    const kept = await ask(channel, 'jobs.keep', { job, after: head, text: titled('Changed'), label: 'Title' });
    expect(await told).toMatchObject({ event: 'job-changed', job, head: kept.head });
    const late = await troubleOf(other!, 'jobs.keep', { job, after: head, text: titled('Too late'), label: 'Title' });
    expect(late).toBe('conflict');
  });
}

function end(host: HostNow): void {
  test('it ends when it is asked to, and answers before it goes', async () => {
    expect(await ask(host().channel, 'host.end', {})).toBeNull();
  });
}
