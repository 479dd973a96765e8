/** Sets a damaged store aside, byte for byte, and makes a new one of all that can be read of it. */
import { closeSync, copyFileSync, existsSync, openSync, readSync, renameSync, rmSync, writeSync } from 'node:fs';
import { join } from 'node:path';
import type { HostNotice } from '../../core/host.ts';
import { type Driver, type OpenDriver, type Row, SqlError } from './driver.ts';
import { isWholeReading, mendHeader, sizeOf } from './inspect.ts';
import { insertRevision } from './jobShelf.ts';
import { fieldsOf, jsonOf } from './personShelf.ts';
import { isBytes, type RevisionRow, revisionColumns, wholeRow } from './revisionRow.ts';
import { migrate } from './schema.ts';

/** What belongs to one database, by the endings of its names. */
const endings = ['', '-wal', '-shm', '-journal'] as const;
/** A stretch of unreadable rows longer than this is the end of what can be read; one bad page hides fewer. */
const longestGap = 20_000;
/** The same beyond the row that is said to be the last. */
const longestGapAtEnd = 500;
const pageBytes = 4096;
const headBytes = 100;

export interface StorePaths {
  readonly folder: string;
  readonly file: string;
  readonly mending: string;
  readonly recovered: string;
}

export function storePaths(folder: string): StorePaths {
  const at = (name: string): string => join(folder, name);
  return {
    folder,
    file: at('ohmwright.db'),
    mending: at('ohmwright.mending.db'),
    recovered: at('ohmwright.recovered.db'),
  };
}

/** Ends what a recovery that was cut off has left: the new store takes its place where the old one is set aside already. */
export function finishRecovery({ folder, file, mending, recovered }: StorePaths): void {
  remove(mending);
  if (!existsSync(recovered)) return;
  if (existsSync(file)) {
    remove(recovered);
    return;
  }
  setAside(folder, file);
  renameSync(recovered, file);
}

/** Throws an `SqlError` or the system's error where the disk refuses; the damaged store then still lies where it lay. */
export async function recover(paths: StorePaths, open: OpenDriver, why: string): Promise<readonly HostNotice[]> {
  remove(paths.mending);
  remove(paths.recovered);
  try {
    const tally = await copyReadable(paths, open);
    const kept = setAside(paths.folder, paths.file);
    renameSync(paths.recovered, paths.file);
    return noticesOf(tally, kept, why);
  } catch (error) {
    remove(paths.recovered);
    throw error;
  } finally {
    remove(paths.mending);
  }
}

async function copyReadable({ file, mending, recovered }: StorePaths, open: OpenDriver): Promise<Tally> {
  const fresh = await open({ file: recovered });
  try {
    migrate(fresh);
    if (sizeOf(file) < headBytes) return nothing;
    const tally = await copyFrom(file, { mending, open, fresh });
    if (tally.revisions > 0) return tally;
    // Every store of this program has its first tables in the same places, so the list of tables of a new one serves as well.
    const borrowed = await copyFrom(file, { mending, open, fresh, firstPage: firstBytes(recovered, pageBytes) });
    return borrowed.revisions > 0 ? borrowed : tally;
  } finally {
    fresh.close();
  }
}

interface Mending {
  readonly mending: string;
  readonly open: OpenDriver;
  readonly fresh: Driver;
  readonly firstPage?: Buffer;
}

async function copyFrom(file: string, { mending, open, fresh, firstPage }: Mending): Promise<Tally> {
  remove(mending);
  const broken = await openMended(file, mending, { open, firstPage });
  if (broken === undefined) return nothing;
  try {
    return fresh.transaction(() => copyAll(broken, fresh));
  } finally {
    broken.close();
  }
}

/** The damaged store is read as a copy with its head put right; `undefined` where not even its list of tables can be read. */
async function openMended(
  file: string,
  mending: string,
  { open, firstPage }: { readonly open: OpenDriver; readonly firstPage: Buffer | undefined },
): Promise<Driver | undefined> {
  copyFileSync(file, mending);
  // With a borrowed first page the log is left out, since it may hold the damaged one again.
  if (firstPage === undefined && existsSync(`${file}-wal`)) copyFileSync(`${file}-wal`, `${mending}-wal`);
  const head = firstPage ?? firstBytes(file, headBytes);
  mendHeader(head);
  const descriptor = openSync(mending, 'r+');
  try {
    writeSync(descriptor, head, 0, head.length, 0);
  } finally {
    closeSync(descriptor);
  }
  let driver: Driver | undefined;
  try {
    driver = await open({ file: mending });
    driver.prepare('SELECT 1 FROM revisions LIMIT 0').all();
    return driver;
  } catch (error) {
    driver?.close();
    if (error instanceof SqlError && error.kind !== 'FULL') return undefined;
    throw error;
  }
}

function firstBytes(file: string, length: number): Buffer {
  const bytes = Buffer.alloc(length);
  const descriptor = openSync(file, 'r');
  try {
    readSync(descriptor, bytes, 0, length, 0);
  } finally {
    closeSync(descriptor);
  }
  return bytes;
}

interface Tally {
  readonly jobs: number;
  readonly revisions: number;
  readonly lost: number;
  readonly isReadable: boolean;
}
const nothing: Tally = { jobs: 0, revisions: 0, lost: 0, isReadable: false };

interface Readable {
  readonly found: readonly Row[];
  readonly failed: number;
}

function copyAll(broken: Driver, fresh: Driver): Tally {
  const { found, failed } = readable(broken, 'revisions', revisionColumns);
  const rows = found.flatMap((row) => {
    const whole = wholeRow(row);
    const digest = row['textDigest'];
    return whole === undefined || !isBytes(digest) ? [] : [{ row: whole, textDigest: digest }];
  });
  const kept = new Set(rows.map(({ row }) => row.revision));
  for (const { row, textDigest } of rows) {
    // A revision whose parent is lost begins a tree of its own.
    const parent = row.parent !== null && kept.has(row.parent) ? row.parent : null;
    insertRevision({ driver: fresh }, { row: { ...row, parent }, textDigest });
  }
  const newest = newestOfJob(rows.map(({ row }) => row));
  const lostJobs = copyJobs(broken, fresh, newest);
  copyRest(broken, fresh, { kept, jobs: new Set(newest.keys()) });
  return {
    jobs: newest.size,
    revisions: rows.length,
    lost: Math.max(failed + found.length - rows.length, lostJobs),
    isReadable: true,
  };
}

function newestOfJob(rows: readonly RevisionRow[]): ReadonlyMap<string, RevisionRow> {
  const newest = new Map<string, RevisionRow>();
  for (const row of rows) newest.set(row.job, row);
  return newest;
}

/** Answers how many jobs are known by name only. */
function copyJobs(broken: Driver, fresh: Driver, newest: ReadonlyMap<string, RevisionRow>): number {
  const insert = fresh.prepare(
    'INSERT OR IGNORE INTO jobs (job, head, turn, changedAt, file, removed) VALUES (?, ?, ?, ?, ?, ?)',
  );
  const headIn = fresh.prepare('SELECT 1 FROM revisions WHERE revision = ? AND job = ?');
  let lost = 0;
  const { found } = readable(broken, 'jobs', 'job, head, turn, changedAt, file, removed');
  for (const { job, head, turn, changedAt, file, removed } of found) {
    const newestRow = typeof job === 'string' ? newest.get(job) : undefined;
    if (newestRow === undefined) {
      lost += 1;
      continue;
    }
    const isHead = typeof head === 'number' && headIn.get(head, newestRow.job) !== undefined;
    insert.run(
      newestRow.job,
      isHead ? head : newestRow.revision,
      typeof turn === 'number' ? turn : newestRow.revision,
      typeof changedAt === 'string' && !Number.isNaN(Date.parse(changedAt)) ? changedAt : newestRow.at,
      typeof file === 'string' ? file : null,
      removed === 1 ? 1 : 0,
    );
  }
  for (const { job, revision, at } of newest.values()) insert.run(job, revision, revision, at, null, 0);
  return lost;
}

interface Recovered {
  readonly kept: ReadonlySet<number>;
  readonly jobs: ReadonlySet<string>;
}

function copyRest(broken: Driver, fresh: Driver, { kept, jobs }: Recovered): void {
  const isKept = (value: unknown): boolean => typeof value === 'number' && kept.has(value);
  const parentOf = fresh.prepare('SELECT parent FROM revisions WHERE revision = ?');
  const copy = (table: string, columns: readonly string[], isSound: (row: Row) => boolean): void => {
    copyTable({ broken, fresh, table, columns, isSound });
  };
  copy('snapshots', ['revision', 'name'], ({ revision, name }) => isKept(revision) && typeof name === 'string');
  copy('visited', ['parent', 'child'], ({ parent, child }) => {
    return isKept(parent) && isKept(child) && parentOf.get(child!)?.['parent'] === parent;
  });
  copy('readings', ['entry', 'job', 'at', 'reading', 'digest'], (row) => {
    return typeof row['entry'] === 'number' && isWholeReading(row) && jobs.has(String(row['job']));
  });
  copy('ownParts', ['id', 'label', 'part'], ({ id, label, part }) => {
    return typeof id === 'string' && typeof label === 'string' && fieldsOf(part) !== undefined;
  });
  copy('preferences', ['name', 'value'], ({ name, value }) => {
    return typeof name === 'string' && jsonOf(value) !== undefined;
  });
}

interface TableCopy {
  readonly broken: Driver;
  readonly fresh: Driver;
  readonly table: string;
  readonly columns: readonly string[];
  readonly isSound: (row: Row) => boolean;
}

function copyTable({ broken, fresh, table, columns, isSound }: TableCopy): void {
  const places = columns.map(() => '?').join(', ');
  const insert = fresh.prepare(`INSERT OR IGNORE INTO ${table} (${columns.join(', ')}) VALUES (${places})`);
  for (const row of readable(broken, table, columns.join(', ')).found) {
    if (isSound(row)) insert.run(...columns.map((name) => row[name]!));
  }
}

/** Rows one by one by their numbers, so that one bad page takes only its own rows with it. */
function readable(driver: Driver, table: string, columns: string): Readable {
  const found: Row[] = [];
  let failed = 0;
  const one = trying(() => driver.prepare(`SELECT ${columns} FROM ${table} WHERE rowid = ?`));
  if (one === undefined) return { found, failed }; // a table of a later version, or one whose description is gone
  const last = Number(trying(() => driver.prepare(`SELECT max(rowid) AS last FROM ${table}`).get())?.['last'] ?? 0);
  const isKnown = last > 0;
  for (let number = 1, good = 0; ; number += 1) {
    const gap = number - good;
    if (gap > longestGap || (isKnown && number > last && gap > longestGapAtEnd)) break;
    let isFailed = false;
    const row = trying(
      () => one.get(number),
      () => {
        isFailed = true;
      },
    );
    if (isFailed) failed += 1;
    if (row === undefined) continue;
    found.push(row);
    good = number;
  }
  return { found, failed };
}

/** `undefined` where the engine refuses. */
function trying<T>(work: () => T, onRefusal: () => void = () => {}): T | undefined {
  try {
    return work();
  } catch (error) {
    if (!(error instanceof SqlError)) throw error;
    onRefusal();
    return undefined;
  }
}

/** Moves the files of a database to names that no other has; answers where the main one lies then. */
export function setAside(folder: string, file: string): string {
  const name = (number: number, ending: string): string =>
    join(folder, `ohmwright.damaged-${String(number)}.db${ending}`);
  let number = 1;
  while (endings.some((ending) => existsSync(name(number, ending)))) number += 1;
  for (const ending of endings) {
    if (existsSync(`${file}${ending}`)) renameSync(`${file}${ending}`, name(number, ending));
  }
  return name(number, '');
}

function remove(file: string): void {
  for (const ending of endings) rmSync(`${file}${ending}`, { force: true });
}

function noticesOf({ jobs, revisions, lost, isReadable }: Tally, kept: string, why: string): readonly HostNotice[] {
  const set: HostNotice = {
    kind: 'store-damaged',
    message: `The store was damaged (${why}). It was set aside unchanged as ${kept}.`,
  };
  if (revisions === 0) {
    const could = isReadable ? 'No whole state of a job was left in it' : 'Not even its list of contents could be read';
    return [{ ...set, message: `${set.message} ${could}: the store starts empty.` }];
  }
  const states = `${String(revisions)} kept ${revisions === 1 ? 'state' : 'states'} of ${String(jobs)} ${jobs === 1 ? 'job' : 'jobs'}`;
  const rest = lost === 0 ? 'Nothing else was found in it.' : `More were in it that could not be read.`;
  return [set, { kind: 'store-recovered', message: `${states} were recovered from the damaged store. ${rest}` }];
}
