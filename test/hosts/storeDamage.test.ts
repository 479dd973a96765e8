import { createHash } from 'node:crypto';
import {
  copyFileSync,
  existsSync,
  mkdirSync,
  readdirSync,
  readFileSync,
  rmSync,
  truncateSync,
  writeFileSync,
} from 'node:fs';
import { join } from 'node:path';
import { beforeAll, describe, expect, test } from 'vitest';
import type { HostNotice } from '../../core/host.ts';
import { openBetter } from '../../electron/store/betterSqlite.ts';
import { openStore, type Store } from '../../electron/store/store.ts';
import { seededRandom } from '../physics/seededRandom.ts';
import { state, tempFolder, tempStore, troubleOf } from './tempStore.ts';

const random = seededRandom(20_260_101);
const now = (): Date => new Date('2026-01-01T00:00:00Z');
const at = (folder: string, name = 'ohmwright.db'): string => join(folder, name);
const digest = (file: string, whereMissing?: string): string =>
  whereMissing !== undefined && !existsSync(file)
    ? whereMissing
    : createHash('sha256').update(readFileSync(file)).digest('hex');
const kinds = (notices: readonly HostNotice[]): string => notices.map(({ kind }) => kind).join(' ');

/** A whole store of three jobs with branches, names, readings and own parts; and every text that was ever kept in it. */
let whole = '';
const texts = new Map<string, string>();
const jobs: string[] = [];

beforeAll(async () => {
  whole = tempFolder();
  const store = await tempStore({ folder: whole, now });
  for (const name of ['cabin', 'boat', 'van']) {
    let { job, head } = store.jobs.create(state(`${name} begun`));
    jobs.push(job);
    for (let step = 1; step <= 40; step += 1) {
      // Noise does not deflate, so that texts span pages of their own.
      const noise = Array.from({ length: step % 5 === 0 ? 800 : 20 }, () => random.next().toString(36)).join('');
      if (step % 7 === 0) head = store.jobs.go(job, head, head - 2).head;
      head = store.jobs.keep(job, head, state(`${name} ${String(step)} ${noise}`, `step ${String(step)}`)).head;
    }
    store.jobs.snapshot(job, head, `${name} as left`);
    for (let value = 0; value < 30; value += 1)
      store.person.addReading(job, { id: `R${String(value)}`, valueV: value });
    for (const { revision } of store.jobs.history(job, 999)) {
      texts.set(`${job} ${String(revision)}`, store.jobs.revision(job, revision).text);
    }
  }
  for (let part = 0; part < 20; part += 1)
    store.person.keepPart({ id: `p${String(part)}`, label: 'x', part: { part } });
  store.close();
});

function outcomeOf(told: string, count: number): 'unnoticed' | 'recoveredAll' | 'recoveredSome' | 'startedEmpty' {
  if (told === '') return 'unnoticed';
  if (count === texts.size) return 'recoveredAll';
  return count > 0 ? 'recoveredSome' : 'startedEmpty';
}

/** A folder with a copy of the store that has been tampered with. */
function tampered(tamper: (file: string) => void): string {
  const folder = tempFolder();
  copyFileSync(at(whole), at(folder));
  tamper(at(folder));
  return folder;
}

function overwritten(place: number, bytes: Uint8Array): string {
  return tampered((file) => {
    const content = readFileSync(file);
    content.set(bytes.subarray(0, Math.max(0, content.length - place)), place);
    writeFileSync(file, content);
  });
}

/** Every text in a store must be one that was kept there, under its own number; answers how many there are. */
function countKept(store: Store): number {
  let count = 0;
  for (const { job } of store.jobs.list()) {
    for (const { revision } of store.jobs.history(job, 999)) {
      expect(store.jobs.revision(job, revision).text).toBe(texts.get(`${job} ${String(revision)}`));
      count += 1;
    }
    const head = store.jobs.open(job);
    expect(store.jobs.line(job, 999).map((each) => each.revision)).toContain(head.head);
  }
  return count;
}

describe('a damaged store', () => {
  test('bytes changed anywhere: all is there, or what can be read is recovered and the damaged file kept byte for byte', async () => {
    const outcomes = { unnoticed: 0, recoveredAll: 0, recoveredSome: 0, startedEmpty: 0 };
    const size = readFileSync(at(whole)).length;
    // Twice as many by `OHMWRIGHT_DAMAGES=120`, for every change of the store.
    const tries = Number(process.env['OHMWRIGHT_DAMAGES'] ?? 60);
    let kept = 0;
    for (let attempt = 0; attempt < tries; attempt += 1) {
      // A third of the tries go for the first page, which holds the head of the file and the list of tables.
      const place = random.whole([0, attempt % 3 === 0 ? 4095 : size - 1]);
      const length = [1, 1, 4, 64, 4096][attempt % 5]!;
      const folder = overwritten(
        place,
        Uint8Array.from({ length }, () => random.whole([0, 255])),
      );
      const before = digest(at(folder));
      const store = await openStore({ folder, now });
      const count = countKept(store);
      const told = kinds(store.notices);
      expect(told).toMatch(/^(store-damaged( store-recovered)?)?$/);
      expect(told !== '' || count === texts.size).toBe(true);
      expect(told !== 'store-damaged').toBe(count > 0);
      expect(digest(at(folder, 'ohmwright.damaged-1.db'), told === '' ? before : undefined)).toBe(before);
      outcomes[outcomeOf(told, count)] += 1;
      kept += count;
      // Work goes on.
      const { job, head } = store.jobs.create(state('after'));
      expect(store.jobs.keep(job, head, state('after that')).head).toBeGreaterThan(head);
      store.close();
      rmSync(folder, { recursive: true });
    }
    const share = ((100 * kept) / (tries * texts.size)).toFixed(1);
    console.log(`${String(tries)} damaged stores:`, outcomes, `${share} % of all kept states still there`);
    expect(outcomes.recoveredAll + outcomes.recoveredSome).toBeGreaterThan(tries / 2);
  }, 120_000);

  test.each([1, 99, 100, 4096, 40_000])('cut off after %d bytes', async (length) => {
    const folder = tampered((file) => {
      truncateSync(file, length);
    });
    const before = digest(at(folder));
    const store = await openStore({ folder, now });
    expect(countKept(store)).toBeLessThan(texts.size);
    expect(digest(at(folder, 'ohmwright.damaged-1.db'))).toBe(before);
    expect(kinds(store.notices)).toMatch(/^store-damaged/);
    store.close();
  });

  test('a damage that makes it look newer is refused like a newer one, and not touched', async () => {
    const folder = overwritten(60, Uint8Array.of(9));
    const before = digest(at(folder));
    expect((await troubleOf(() => openStore({ folder, now }))).message).toContain('It was not touched');
    expect(digest(at(folder))).toBe(before);
  });

  test('one that makes it look older is recovered from', async () => {
    const folder = overwritten(63, Uint8Array.of(1));
    const store = await openStore({ folder, now });
    expect([kinds(store.notices), countKept(store)]).toEqual(['store-damaged store-recovered', texts.size]);
    store.close();
  });

  test('something else altogether: it is kept, and the store starts empty and says so', async () => {
    const folder = tampered((file) => {
      writeFileSync(file, 'This is a letter to my aunt. '.repeat(1000));
    });
    const store = await openStore({ folder, now });
    expect(kinds(store.notices)).toBe('store-damaged');
    expect(store.notices[0]?.message).toContain('the store starts empty');
    expect(store.notices[0]?.message).toContain(at(folder, 'ohmwright.damaged-1.db'));
    expect(readFileSync(at(folder, 'ohmwright.damaged-1.db'), 'utf8')).toContain('my aunt');
    store.close();
  });

  test('a second damage does not write over what the first one left', async () => {
    const folder = overwritten(0, Buffer.from('nothing of ours'));
    (await openStore({ folder, now })).close();
    const first = digest(at(folder, 'ohmwright.damaged-1.db'));
    writeFileSync(at(folder), 'damaged again, by something else');
    (await openStore({ folder, now })).close();
    expect(digest(at(folder, 'ohmwright.damaged-1.db'))).toBe(first);
    expect(existsSync(at(folder, 'ohmwright.damaged-2.db'))).toBe(true);
  });

  test('a lost parent does not take its children along: they begin a tree of their own', async () => {
    const [job] = jobs as [string];
    const folder = tempFolder();
    copyFileSync(at(whole), at(folder));
    const driver = await openBetter({ file: at(folder) });
    driver.exec("UPDATE revisions SET label = 'not what was done' WHERE revision = 2");
    driver.close();
    const store = await openStore({ folder, now });
    expect(kinds(store.notices)).toBe('store-damaged store-recovered');
    expect(countKept(store)).toBe(texts.size - 1);
    const history = store.jobs.history(job, 999);
    expect(history.filter(({ parent }) => parent === null)).toHaveLength(2);
    expect(store.jobs.open(job).text).toBe(texts.get(`${job} ${String(store.jobs.head(job))}`));
    expect(history.filter(({ snapshot }) => snapshot === 'cabin as left')).toHaveLength(1);
    expect(store.person.readings(job)).toHaveLength(30);
    expect(store.person.ownParts()).toHaveLength(20);
    store.close();
  });

  test('a recovery that was cut off between its two renamings is finished at the next start', async () => {
    const folder = tempFolder();
    copyFileSync(at(whole), at(folder, 'ohmwright.recovered.db'));
    writeFileSync(at(folder, 'ohmwright.db-wal'), 'left over from the damaged one');
    const store = await openStore({ folder, now });
    expect(countKept(store)).toBe(texts.size);
    expect(existsSync(at(folder, 'ohmwright.damaged-1.db-wal'))).toBe(true);
    store.close();
  });

  test('one that was cut off earlier is begun anew', async () => {
    const folder = overwritten(0, Buffer.from('x'));
    writeFileSync(at(folder, 'ohmwright.recovered.db'), 'half');
    writeFileSync(at(folder, 'ohmwright.mending.db'), 'half');
    const store = await openStore({ folder, now });
    expect(countKept(store)).toBe(texts.size);
    store.close();
    expect(readdirSync(folder).toSorted()).toEqual(['ohmwright.damaged-1.db', 'ohmwright.db']);
  });

  test('a program that still has the damaged store open writes nothing more into it', async () => {
    const folder = tempFolder();
    const open = await tempStore({ folder, now });
    const { job, head } = open.jobs.create(state('a'));
    mkdirSync(at(folder, 'elsewhere'));
    for (const name of readdirSync(folder).filter((each) => each.startsWith('ohmwright.db'))) {
      copyFileSync(at(folder, name), join(folder, 'elsewhere', name));
      rmSync(at(folder, name));
    }
    expect(() => open.jobs.keep(job, head, state('lost'))).toThrow(/moved or replaced while it was open/);
    open.close();
  });
});
