import { type ChildProcess, execFileSync, fork } from 'node:child_process';
import { chmodSync, chownSync, copyFileSync, mkdirSync, readdirSync, readFileSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { describe, expect, test } from 'vitest';
import { openBetter } from '../../electron/store/betterSqlite.ts';
import type { Driver, OpenDriver, SqlValue } from '../../electron/store/driver.ts';
import { packText, readingDigest, rowDigest, textDigest } from '../../electron/store/revisionRow.ts';
import { migrate, newestVersion, versionOf } from '../../electron/store/schema.ts';
import { openStore } from '../../electron/store/store.ts';
import { state, tempFolder, tempStore, troubleOf } from './tempStore.ts';

const now = (): Date => new Date('2026-01-01T00:00:00Z');
const fileOf = (folder: string): string => join(folder, 'ohmwright.db');

/** a — b — c with the head at b, and beside b another child of a. */
function fillVersionOne(driver: Driver): void {
  const insert = driver.prepare(
    'INSERT INTO revisions (revision, job, parent, title, parts, label, at, packed, textDigest, rowDigest) VALUES (?, ?, ?, ?, ?, ?, ?, ?, ?, ?)',
  );
  const tree: readonly [number, number | null, string][] = [
    [1, null, 'a'],
    [2, 1, 'b'],
    [3, 2, 'c'],
    [4, 1, 'd'],
  ];
  for (const [revision, parent, text] of tree) {
    const row = {
      revision,
      job: 'old-job',
      parent,
      title: 'An old job',
      parts: 3,
      label: text,
      at: '2025-01-01T00:00:00.000Z',
      packed: packText(text),
    };
    const values: readonly SqlValue[] = [...Object.values(row), textDigest(text), rowDigest(row)];
    insert.run(...values);
  }
  driver.exec("INSERT INTO jobs (job, head, turn, changedAt) VALUES ('old-job', 2, 1, '2025-01-01T00:00:00.000Z')");
}

function fillVersionTwo(driver: Driver): void {
  const [at, reading] = ['2025-01-02T00:00:00.000Z', '{"valueV":12.5}'];
  driver.exec("INSERT INTO snapshots VALUES (3, 'as found')");
  driver
    .prepare('INSERT INTO readings (job, at, reading, digest) VALUES (?, ?, ?, ?)')
    .run('old-job', at, reading, readingDigest('old-job', at, reading));
}

async function storeOfVersion(version: number): Promise<string> {
  const folder = tempFolder();
  const driver = await openBetter({ file: fileOf(folder) });
  driver.exec('PRAGMA journal_mode = WAL');
  migrate(driver, version);
  fillVersionOne(driver);
  if (version >= 2) fillVersionTwo(driver);
  driver.close();
  return folder;
}

describe('a store of an older version', () => {
  test.each(Array.from({ length: newestVersion }, (_, index) => index + 1))(
    'version %d opens with all that was in it',
    async (version) => {
      const folder = await storeOfVersion(version);
      const store = await openStore({ folder, now });
      expect(store.notices).toEqual([]);
      expect(store.jobs.open('old-job')).toMatchObject({ head: 2, text: 'b', title: 'An old job' });
      const history = store.jobs.history('old-job', 9);
      expect(history.map(({ label }) => label)).toEqual(['d', 'c', 'b', 'a']);
      expect(history[1]?.snapshot).toBe(version >= 2 ? 'as found' : null);
      expect(store.person.readings('old-job')).toHaveLength(version >= 2 ? 1 : 0);
      store.close();
      const driver = await openBetter({ file: fileOf(folder) });
      expect(versionOf(driver)).toBe(newestVersion);
      driver.close();
    },
  );

  test('one from before redo was remembered redoes along the head, and the newest child elsewhere', async () => {
    const store = await openStore({ folder: await storeOfVersion(2), now });
    const line = (): string =>
      store.jobs
        .line('old-job', 9)
        .map(({ label }) => label)
        .join(' ');
    expect(line()).toBe('a b c');
    store.jobs.go('old-job', 2, 1);
    expect(line()).toBe('a b c');
    store.close();
  });

  test('a newer one is refused in clear words and not a byte of it is touched', async () => {
    const folder = await storeOfVersion(newestVersion);
    const driver = await openBetter({ file: fileOf(folder) });
    driver.exec(`PRAGMA user_version = ${String(newestVersion + 4)}`);
    driver.close();
    const before = readFileSync(fileOf(folder));
    const trouble = await troubleOf(() => openStore({ folder, now }));
    expect(trouble.message).toMatch(/newer version of this program \(store version 7; this one knows 3\)/);
    expect(trouble.message).toContain('It was not touched');
    expect(readFileSync(fileOf(folder)).equals(before)).toBe(true);
    expect(readdirSync(folder)).toEqual(['ohmwright.db']);
  });

  test('a step that fails half-way leaves the old store as it was', async () => {
    const folder = await storeOfVersion(2);
    const before = readFileSync(fileOf(folder));
    const full: OpenDriver = async (request) => {
      const driver = await openBetter(request);
      if (request.readOnly !== true) driver.exec(`PRAGMA max_page_count = 1`);
      return driver;
    };
    expect((await troubleOf(() => openStore({ folder, now, open: full }))).code).toBe('disk-full');
    expect(readFileSync(fileOf(folder)).equals(before)).toBe(true);
  });
});

describe('a full disk', () => {
  test('is told, nothing of the change is written, and work goes on once there is room', async () => {
    let limited: Driver | undefined;
    const open: OpenDriver = async (request) => {
      const driver = await openBetter(request);
      if (request.readOnly !== true) limited = driver;
      return driver;
    };
    const store = await tempStore({ open, now });
    const { job, head } = store.jobs.create(state('a'));
    limited!.exec('PRAGMA max_page_count = 30');
    const noise = Buffer.from(Array.from({ length: 300_000 }, (_, index) => (index * 7919 + (index >> 3) ** 2) % 251));
    const trouble = await troubleOf(() => store.jobs.keep(job, head, state(noise.toString('latin1'), 'large')));
    expect(trouble.code).toBe('disk-full');
    expect(trouble.message).toContain('Nothing was written, not even in part');
    expect(store.jobs.history(job, 9)).toHaveLength(1);
    expect(store.jobs.open(job)).toMatchObject({ head, text: 'a' });
    limited!.exec('PRAGMA max_page_count = 100000');
    expect(store.jobs.keep(job, head, state(noise.toString('latin1'), 'large')).head).toBeGreaterThan(head);
    store.close();
  });

  test.skipIf(!canMount())(
    'is told on a real disk of one megabyte, and every kept state is still there afterwards',
    async () => {
      const folder = tempFolder();
      await mounted(folder, 'size=1m', async () => {
        const store = await openStore({ folder, now });
        let { job, head } = store.jobs.create(state('begin'));
        let code = '';
        let kept = 1;
        while (code === '') {
          try {
            const text = Array.from({ length: 2000 }, (_, index) =>
              (((index + kept * 7) * 2654435761) % 4294967296).toString(36),
            );
            head = store.jobs.keep(job, head, state(text.join(''), `change ${String(kept)}`)).head;
            kept += 1;
          } catch (error) {
            code = (await troubleOf(() => Promise.reject(error))).code;
          }
        }
        expect(code).toBe('disk-full');
        expect(kept).toBeGreaterThan(5);
        expect(store.jobs.history(job, 9999)).toHaveLength(kept);
        expect(store.jobs.open(job).head).toBe(head);
        store.close();
        console.log(`a disk of 1 MB held ${String(kept)} states before it was full`);
      });
    },
  );

  test.skipIf(!canMount())('met while a damaged store is being recovered leaves that store where it lay', async () => {
    const source = tempFolder();
    const store = await tempStore({ folder: source, now });
    let { job, head } = store.jobs.create(state('begin'));
    for (let step = 0; step < 30; step += 1) {
      const text = Array.from({ length: 2000 }, (_, index) =>
        (((index + step * 7) * 2654435761) % 4294967296).toString(36),
      );
      head = store.jobs.keep(job, head, state(text.join(''), `change ${String(step)}`)).head;
    }
    store.close();
    const folder = tempFolder();
    const bytes = readFileSync(fileOf(source));
    bytes[5] = 0;
    // Room for the store itself and half of a second one.
    await mounted(folder, `size=${String(Math.ceil((1.5 * bytes.length) / 1024))}k`, async () => {
      writeFileSync(fileOf(folder), bytes);
      expect((await troubleOf(() => openStore({ folder, now }))).code).toBe('disk-full');
      expect(readdirSync(folder)).toEqual(['ohmwright.db']);
      expect(readFileSync(fileOf(folder)).equals(bytes)).toBe(true);
    });
  });
});

describe('a folder that cannot be written', () => {
  test.skipIf(!canMount())('is told at the start, whether a store lies in it or not', async () => {
    const folder = tempFolder();
    const source = await storeOfVersion(newestVersion);
    await mounted(folder, 'size=1m', async () => {
      mkdirSync(join(folder, 'with'));
      mkdirSync(join(folder, 'without'));
      copyFileSync(fileOf(source), fileOf(join(folder, 'with')));
      execFileSync('mount', ['-o', 'remount,ro', folder]);
      for (const name of ['with', 'without', 'not-there']) {
        const trouble = await troubleOf(() => openStore({ folder: join(folder, name), now }));
        expect([name, trouble.code]).toEqual([name, 'read-only']);
        expect(trouble.message).toContain('Nothing was written');
      }
    });
  });

  test('is told where a file stands in the place of the folder', async () => {
    const file = join(tempFolder(), 'file');
    writeFileSync(file, 'x');
    expect((await troubleOf(() => openStore({ folder: file, now }))).code).toBe('read-only');
    expect((await troubleOf(() => openStore({ folder: join(file, 'below'), now }))).code).toBe('read-only');
  });

  test.skipIf(process.getuid?.() !== 0)('is told to another user of the system, who may only read it', async () => {
    const folder = await storeOfVersion(newestVersion);
    chownSync(folder, 0, 0);
    chmodSync(folder, 0o755);
    chmodSync(fileOf(folder), 0o644);
    process.seteuid?.(65_534);
    try {
      expect((await troubleOf(() => openStore({ folder, now }))).code).toBe('read-only');
    } finally {
      process.seteuid?.(0);
    }
  });
});

/** Another process with the same store file; it talks only through what it does to the file. */
async function otherProcess(file: string, work: 'hold' | 'die'): Promise<ChildProcess> {
  const script = fileURLToPath(new URL('./otherProcess.mjs', import.meta.url));
  const child = fork(script, [file, work], { execArgv: [] });
  await new Promise((resolve) => child.once(work === 'hold' ? 'message' : 'exit', resolve));
  return child;
}

describe('another process', () => {
  test('that holds the store is waited for a while, then told; nothing is lost by it', async () => {
    const folder = tempFolder();
    const store = await tempStore({ folder, now, busyMs: 100 });
    const { job, head } = store.jobs.create(state('a'));
    const child = await otherProcess(fileOf(folder), 'hold');
    const trouble = await troubleOf(() => store.jobs.keep(job, head, state('b')));
    expect(trouble.code).toBe('busy');
    expect(trouble.message).toContain('try again');
    expect(store.jobs.open(job).text).toBe('a');
    const gone = new Promise((resolve) => child.once('exit', resolve));
    child.send('let go');
    await gone;
    expect(store.jobs.open(job).file).toBe('written by the other process');
    expect(store.jobs.keep(job, head, state('b')).head).toBeGreaterThan(head);
    store.close();
  });

  test('that dies in the middle of its work leaves what it had finished and nothing else', async () => {
    const folder = tempFolder();
    const store = await tempStore({ folder, now });
    const { job } = store.jobs.create(state('a'));
    store.close();
    await otherProcess(fileOf(folder), 'die');
    expect(readdirSync(folder)).toContain('ohmwright.db-wal');
    const again = await openStore({ folder, now });
    expect(again.notices).toEqual([]);
    expect(again.jobs.open(job)).toMatchObject({ text: 'a', file: 'written by the other process' });
    again.close();
  });
});

function canMount(): boolean {
  if (process.platform !== 'linux' || process.getuid?.() !== 0) return false;
  const folder = tempFolder();
  try {
    execFileSync('mount', ['-t', 'tmpfs', '-o', 'size=64k', 'ohmwright-test', folder], { stdio: 'ignore' });
    execFileSync('umount', [folder], { stdio: 'ignore' });
    return true;
  } catch {
    return false; // a container without the right to mount; the test shows as skipped
  }
}

async function mounted(folder: string, options: string, work: () => Promise<void>): Promise<void> {
  execFileSync('mount', ['-t', 'tmpfs', '-o', options, 'ohmwright-test', folder]);
  try {
    await work();
  } finally {
    execFileSync('umount', [folder]);
  }
}
