import { join } from 'node:path';
import { describe, expect, test } from 'vitest';
import { openBetter } from '../../electron/store/betterSqlite.ts';
import { builtInDriver } from '../../electron/store/builtInSqlite.ts';
import { type OpenDriver, SqlError } from '../../electron/store/driver.ts';
import { DatabaseSync } from './builtInStandIn.ts';
import { state, tempFolder, tempStore } from './tempStore.ts';

/** The second engine is run on a stand-in of its module's shape, since the runtime of the tests does not bring the module. */
const engines: readonly [string, OpenDriver][] = [
  ['compiled', openBetter],
  ['built in (stand-in)', async (request) => builtInDriver({ DatabaseSync }, request)],
];

function codeOf(work: () => unknown): string {
  try {
    work();
  } catch (error) {
    if (error instanceof SqlError) return error.kind;
    throw error;
  }
  return 'none';
}

describe.each(engines)('the %s engine', (_, open) => {
  test('gives rows as plain objects, bytes as bytes and numbers as numbers', async () => {
    const driver = await open({ file: join(tempFolder(), 'x.db') });
    driver.exec('CREATE TABLE t (n INTEGER PRIMARY KEY, s TEXT, b BLOB, r REAL) STRICT');
    const insert = driver.prepare('INSERT INTO t (s, b, r) VALUES (?, ?, ?)');
    expect(insert.run('ü', Uint8Array.of(0, 255), 0.5)).toEqual({ changes: 1, lastRow: 1 });
    expect(insert.run(null, null, null)).toEqual({ changes: 1, lastRow: 2 });
    const rows = driver.prepare('SELECT * FROM t ORDER BY n').all();
    expect(rows.map((row) => Object.getPrototypeOf(row) === Object.prototype)).toEqual([true, true]);
    expect(rows[1]).toEqual({ n: 2, s: null, b: null, r: null });
    expect([rows[0]?.['s'], rows[0]?.['r'], [...(rows[0]!['b'] as Uint8Array)]]).toEqual(['ü', 0.5, [0, 255]]);
    expect(driver.prepare('SELECT * FROM t WHERE n = ?').get(9)).toBeUndefined();
    driver.close();
  });

  test('undoes a transaction in which anything is thrown', async () => {
    const driver = await open({ file: join(tempFolder(), 'x.db') });
    driver.exec('CREATE TABLE t (n INTEGER)');
    expect(() =>
      driver.transaction(() => {
        driver.exec('INSERT INTO t VALUES (1)');
        throw new RangeError('changed my mind');
      }),
    ).toThrow(RangeError);
    expect(driver.transaction(() => driver.prepare('SELECT count(*) AS n FROM t').get())).toEqual({ n: 0 });
    driver.close();
  });

  test('names its refusals alike', async () => {
    const folder = tempFolder();
    const file = join(folder, 'x.db');
    const [one, two] = [await open({ file }), await open({ file })];
    one.exec('PRAGMA journal_mode = WAL; CREATE TABLE t (n INTEGER PRIMARY KEY CHECK (n > 0))');
    two.exec('PRAGMA busy_timeout = 10');
    expect(codeOf(() => one.exec('INSERT INTO nowhere VALUES (1)'))).toBe('ERROR');
    expect(codeOf(() => one.exec('INSERT INTO t VALUES (-1)'))).toBe('CONSTRAINT');
    one.exec('BEGIN IMMEDIATE');
    expect(codeOf(() => two.transaction(() => {}))).toBe('BUSY');
    one.exec('ROLLBACK; PRAGMA max_page_count = 1');
    expect(codeOf(() => one.exec('CREATE TABLE big AS SELECT zeroblob(99999) AS b'))).toBe('FULL');
    one.close();
    two.close();
    const readOnly = await open({ file, readOnly: true });
    expect(codeOf(() => readOnly.exec('INSERT INTO t VALUES (1)'))).toBe('READONLY');
    readOnly.close();
    await expect(open({ file: join(folder, 'no', 'x.db') })).rejects.toMatchObject({ code: 'CANTOPEN' });
  });

  test('carries a whole store', async () => {
    const folder = tempFolder();
    const store = await tempStore({ folder, open });
    const { job, head } = store.jobs.create(state('a'));
    store.jobs.keep(job, head, state('b'));
    store.close();
    const again = await tempStore({ folder, open });
    expect(again.notices).toEqual([]);
    expect(again.jobs.open(job).text).toBe('b');
    again.close();
  });
});
