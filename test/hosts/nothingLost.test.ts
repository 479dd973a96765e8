/** What was acknowledged is kept: through kills, a second host, a full disk, a disk that cannot be written and a clock set back. */
import { spawnSync } from 'node:child_process';
import { mkdirSync, readdirSync } from 'node:fs';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { startLocal } from '../../electron/local/runLocal.ts';
import { seededRandom } from '../physics/seededRandom.ts';
import { buildLocal, pageOf, type RunningLocal, startBuiltLocal, testFolder } from './builtLocal.ts';
import { allRevisions, ask, editAll, integrity, titled } from './scriptedEdits.ts';

beforeAll(buildLocal);

/** Kills on one store; fifty and more by `OHMWRIGHT_KILLS=50`, for every change of the store. */
const rounds = Number(process.env['OHMWRIGHT_KILLS'] ?? 15);
const editsPerRound = 500;
/** An edit takes a few milliseconds; a kill comes within this long after one is sent, so some hit the work and some the pause after. */
const killWithinMs = 4;

/** What the kills of all rounds came upon, printed at the end. */
const tally = { acknowledged: 0, unanswered: 0, keptThough: 0 };

interface Round {
  readonly job: string;
  readonly acknowledged: number;
  readonly seed: number;
}

/** One run of edits that a kill ends at a moment drawn from the seed. */
async function editUntilKilled(host: RunningLocal, seed: number): Promise<Round> {
  const random = seededRandom(seed);
  const last = random.whole([1, editsPerRound]);
  const delayMs = random.between([0, killWithinMs]);
  const channel = host.page(`round-${String(seed)}`);
  const { job, head } = await ask(channel, 'jobs.create', { text: titled('Edit 0'), label: 'Edit 0' });
  const { acknowledged, trouble } = await editAll({
    channel,
    job,
    from: head,
    edits: Number.MAX_SAFE_INTEGER,
    sent: (edit) => {
      if (edit === last) killAfter(host, delayMs);
    },
  });
  channel.close();
  await host.ended;
  expect(trouble).toBe('no-host');
  return { job, acknowledged, seed };
}

/** Timers are too coarse for a part of a millisecond; the loop turns until the moment has come, and answers come in meanwhile. */
function killAfter(host: RunningLocal, delayMs: number): void {
  const from = performance.now();
  const turn = (): void => {
    if (performance.now() - from >= delayMs) host.process.kill('SIGKILL');
    else setImmediate(turn);
  };
  turn();
}

/** Every acknowledged edit is there, in its order, and at most the one besides that the kill cut off. */
async function checkRound(host: RunningLocal, { job, acknowledged, seed }: Round): Promise<number> {
  const channel = host.page('check');
  const revisions = await allRevisions(channel, job);
  const kept = revisions.length - 1;
  expect(revisions.map((state) => state.label)).toEqual(
    Array.from({ length: kept + 1 }, (_, edit) => `Edit ${String(edit)}`),
  );
  expect(kept, `round ${String(seed)}`).toBeGreaterThanOrEqual(acknowledged);
  expect(kept, `round ${String(seed)}`).toBeLessThanOrEqual(acknowledged + 1);
  const parents = revisions.map((state) => state.parent);
  expect(parents).toEqual([null, ...revisions.slice(0, -1).map((state) => state.revision)]);
  const head = await ask(channel, 'jobs.open', { job });
  expect(head).toMatchObject({ head: revisions.at(-1)!.revision, text: titled(`Edit ${String(kept)}`) });
  expect((await ask(channel, 'host.about', {})).notices).toEqual([]);
  channel.close();
  return kept;
}

async function ended(host: RunningLocal): Promise<void> {
  host.process.kill('SIGTERM');
  expect(await host.ended).toBe(0);
  expect(host.stderr()).toBe('');
}

describe('a host that is killed', () => {
  test('has kept every edit that it acknowledged, kill after kill on one store', async () => {
    const { folder, remove } = testFolder();
    const done: Round[] = [];
    let host = await startBuiltLocal(folder);
    for (let seed = 1; seed <= rounds; seed += 1) {
      const round = await editUntilKilled(host, seed);
      expect(integrity(join(folder, 'store'))).toBe('ok');
      host = await startBuiltLocal(folder);
      const kept = await checkRound(host, round);
      tally.acknowledged += round.acknowledged;
      tally.unanswered += 1;
      tally.keptThough += kept - round.acknowledged;
      done.push(round);
    }
    for (const round of done) await checkRound(host, round);
    await ended(host);
    remove();
    process.stdout.write(
      `\n${String(rounds)} kills: ${String(tally.acknowledged)} edits acknowledged, all kept; each kill left one edit unanswered, ` +
        `of which ${String(tally.keptThough)} were kept and ${String(tally.unanswered - tally.keptThough)} were not\n`,
    );
    expect(tally.acknowledged).toBeGreaterThan(rounds * 100);
  }, 600_000);
});

describe('two hosts on one store', () => {
  test('lose nothing of each other: who comes second is told, and goes on from there', async () => {
    const { folder, remove } = testFolder();
    const hosts = [await startBuiltLocal(folder), await startBuiltLocal(folder)];
    const pages = hosts.map((host, index) => host.page(`page-${String(index)}`));
    const { job } = await ask(pages[0]!, 'jobs.create', { text: titled('Shared'), label: 'Shared' });
    const editsEach = 100;
    const told = await Promise.all(
      pages.map(async (page, index) => {
        let conflicts = 0;
        let { head } = await ask(page, 'jobs.open', { job });
        for (let edit = 0; edit < editsEach; ) {
          const label = `Page ${String(index)}, edit ${String(edit)}`;
          const answer = await page.call('jobs.keep', { job, after: head, text: titled(label), label });
          if (answer.ok) edit += 1;
          else if (answer.trouble.code === 'conflict') conflicts += 1;
          else throw new Error(answer.trouble.message);
          head = answer.ok ? answer.value.head : answer.trouble.head!;
        }
        return conflicts;
      }),
    );
    const revisions = await allRevisions(pages[0]!, job);
    const labels = revisions.map((state) => state.label);
    for (const index of [0, 1]) {
      const own = Array.from({ length: editsEach }, (_, edit) => `Page ${String(index)}, edit ${String(edit)}`);
      expect(labels.filter((label) => label.startsWith(`Page ${String(index)}`))).toEqual(own);
    }
    expect(revisions.length).toBe(1 + 2 * editsEach);
    expect(revisions.slice(1).map((state) => state.parent)).toEqual(
      revisions.slice(0, -1).map((state) => state.revision),
    );
    process.stdout.write(
      `\ntwo hosts, ${String(2 * editsEach)} edits, all kept; told of a conflict ${told.join(' and ')} times\n`,
    );
    expect(told[0]! + told[1]!).toBeGreaterThan(0);
    for (const page of pages) page.close();
    for (const host of hosts) await ended(host);
    remove();
  });
});

/** A small disk of its own, where this machine lets us have one. */
const disk = testFolder();
const mayMount = process.getuid?.() === 0 && mount('size=1m');

function mount(options: string): boolean {
  return spawnSync('mount', ['-t', 'tmpfs', '-o', options, 'tmpfs', disk.folder]).status === 0;
}

function remount(options: string): void {
  const { status, stderr } = spawnSync('mount', ['-o', `remount,${options}`, disk.folder], { encoding: 'utf8' });
  if (status !== 0) throw new Error(stderr);
}

afterAll(() => {
  if (mayMount) spawnSync('umount', ['--lazy', disk.folder]); // a host that a failed test left may still hold it
  disk.remove();
});

describe.skipIf(!mayMount)('a disk that does not take any more', () => {
  test('full: the edit is refused in words, everything before it stays, and with room it goes on', async () => {
    const host = await startBuiltLocal(disk.folder);
    const channel = host.page('page');
    const { job, head } = await ask(channel, 'jobs.create', { text: titled('Edit 0'), label: 'Edit 0' });
    const run = await editAll({ channel, job, from: head, edits: 100_000 });
    expect(run.trouble).toBe('disk-full');
    const kept = await allRevisions(channel, job);
    expect(kept.map((state) => state.label)).toEqual(
      Array.from({ length: run.acknowledged + 1 }, (_, edit) => `Edit ${String(edit)}`),
    );
    const open = await ask(channel, 'jobs.open', { job });
    expect(open.head).toBe(run.head);
    const saved = await channel.call('files.saveJob', { job, revision: run.head, where: 'known' });
    const partial = readdirSync(disk.folder, { recursive: true, encoding: 'utf8' }).filter((name) =>
      name.includes('saved/'),
    );
    expect(saved.ok ? saved.value!.name : partial.length).toBe(saved.ok ? partial[0]!.replace('saved/', '') : 0);

    remount('size=8m');
    const after = await editAll({ channel, job, from: run.head, edits: 10 });
    expect(after).toMatchObject({ acknowledged: 10, trouble: undefined });
    channel.close();
    await ended(host);
  });

  test('that can only be read: work can be looked at, a change is refused in words, and nothing is changed', async () => {
    // Another reader leaves the files behind that the database needs to be read at all where nothing can be written.
    expect(integrity(join(disk.folder, 'store'))).toBe('ok');
    const before = readdirSync(join(disk.folder, 'store'));
    remount('ro');
    const reading = await startBuiltLocal(disk.folder);
    const page = reading.page('page');
    const [listed] = await ask(page, 'jobs.list', {});
    const { job, head, text } = await ask(page, 'jobs.open', { job: listed!.job });
    const answer = await page.call('jobs.keep', { job, after: head, text: titled('Refused'), label: 'Refused' });
    if (answer.ok) throw new Error('a change was kept on a disk that can only be read');
    expect(answer.trouble.code).toBe('read-only');
    expect(answer.trouble.message).toContain('cannot be written');
    page.close();
    await ended(reading);
    expect(readdirSync(join(disk.folder, 'store'))).toEqual(before);

    remount('rw');
    const writing = await startBuiltLocal(disk.folder);
    const again = writing.page('page');
    expect(await ask(again, 'jobs.open', { job })).toMatchObject({ head, text });
    again.close();
    await ended(writing);

    expect(readdirSync(join(disk.folder, 'store'))).toEqual(['ohmwright.db']);
    remount('ro');
    await expect(startBuiltLocal(disk.folder)).rejects.toThrow(
      /ended with 1 .*cannot be written.*Nothing was written/s,
    );
  });
});

describe('a clock that is set back', () => {
  test('is told of, and the order of work does not follow it', async () => {
    const { folder, remove } = testFolder();
    const work = async (
      now: string,
      label: string,
    ): Promise<{ notices: readonly string[]; labels: readonly string[] }> => {
      const complaints: string[] = [];
      const { server } = await startLocal(
        { port: 0, store: join(folder, 'store'), saveFolder: join(folder, 'saved'), browser: false, idle: 60 },
        {
          machine: { platform: process.platform, home: folder, env: {} },
          builtPage: folder,
          now: () => new Date(now),
          print: () => {},
          complain: (line) => complaints.push(line),
        },
      );
      const channel = pageOf(server.url, 'page');
      const [listed] = await ask(channel, 'jobs.list', {});
      const made = listed ?? (await ask(channel, 'jobs.create', { text: titled('Start'), label: 'Start' }));
      const { head } = await ask(channel, 'jobs.open', { job: made.job });
      await ask(channel, 'jobs.keep', { job: made.job, after: head, text: titled(label), label });
      const { notices } = await ask(channel, 'host.about', {});
      const revisions = await allRevisions(channel, made.job);
      channel.close();
      await server.end();
      expect(complaints).toEqual([]);
      return { notices: notices.map((notice) => notice.kind), labels: revisions.map((state) => state.label) };
    };
    mkdirSync(join(folder, 'saved'));
    expect((await work('2025-06-01T12:00:00Z', 'In June')).notices).toEqual([]);
    const back = await work('2021-01-01T00:00:00Z', 'Years before');
    expect(back.notices).toEqual(['clock-behind']);
    expect(back.labels).toEqual(['Start', 'In June', 'Years before']);
    expect((await work('2025-06-02T12:00:00Z', 'Right again')).labels.at(-1)).toBe('Right again');
    remove();
  });
});
