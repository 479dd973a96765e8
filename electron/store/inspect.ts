/** Is the file of a store whole? Found out without changing a byte of it. */
import { closeSync, openSync, readSync, statSync } from 'node:fs';
import { type Driver, type OpenDriver, type Row, SqlError } from './driver.ts';
import { isBytes, readingDigest, revisionColumns, sameBytes, wholeRow } from './revisionRow.ts';
import { applicationId, newestVersion, versionOf } from './schema.ts';

export type Condition =
  | { readonly is: 'absent' }
  | { readonly is: 'whole' }
  | { readonly is: 'newer'; readonly version: number }
  | { readonly is: 'damaged'; readonly why: string };

/** Throws an `SqlError` or the system's error where the file cannot be looked at. */
export async function inspect(file: string, open: OpenDriver): Promise<Condition> {
  const size = sizeOf(file);
  if (size === 0) return sizeOf(`${file}-wal`) === 0 ? { is: 'absent' } : damaged('its main file is missing');
  const header = headerOf(file);
  const fault = headerFault(header, size);
  if (fault !== undefined) return damaged(fault);
  const version = header.readUInt32BE(headerPlaces.userVersion);
  if (version > newestVersion) return { is: 'newer', version };
  try {
    return await inspectRows(file, open);
  } catch (error) {
    if (error instanceof SqlError && isDamage(error)) return damaged(error.message);
    throw error;
  }
}

/** Refusals that a whole file never causes; the rest are faults of the disk, of rights, or of another program. */
export function isDamage({ kind, code }: SqlError): boolean {
  return (
    code === 'IOERR_SHORT_READ' ||
    ['CORRUPT', 'NOTADB', 'ERROR', 'CONSTRAINT', 'NOMEM', 'TOOBIG', 'FORMAT', 'MISMATCH'].includes(kind)
  );
}

async function inspectRows(file: string, open: OpenDriver): Promise<Condition> {
  const driver = await open({ file, readOnly: true });
  try {
    driver.exec('PRAGMA busy_timeout = 3000');
    const version = versionOf(driver);
    if (version > newestVersion) return { is: 'newer', version };
    // A program that ended before it had made its first table leaves an empty store behind.
    if (version === 0 && driver.prepare('SELECT 1 FROM sqlite_schema').all().length === 0) return { is: 'whole' };
    const id = driver.prepare('PRAGMA application_id').get()?.['application_id'];
    if (id !== applicationId) return damaged('it does not carry the mark of a store');
    const fault = structureFault(driver) ?? revisionFault(driver) ?? (version >= 2 ? readingFault(driver) : undefined);
    return fault === undefined ? { is: 'whole' } : damaged(fault);
  } finally {
    driver.close();
  }
}

function structureFault(driver: Driver): string | undefined {
  // The full check of the engine: unlike the quick one it also compares every index with its table.
  const answer = driver.prepare('SELECT integrity_check FROM pragma_integrity_check LIMIT 1').get()?.[
    'integrity_check'
  ];
  if (answer !== 'ok') return String(answer);
  return driver.prepare('SELECT 1 FROM pragma_foreign_key_check').get() === undefined
    ? undefined
    : 'a row refers to one that is gone';
}

function revisionFault(driver: Driver): string | undefined {
  for (const row of everyRow(driver, 'revisions', 'revision', revisionColumns)) {
    if (wholeRow(row) === undefined) return `the digest of revision ${String(row['revision'])} does not hold`;
  }
  return undefined;
}

function readingFault(driver: Driver): string | undefined {
  for (const row of everyRow(driver, 'readings', 'entry', 'entry, job, at, reading, digest')) {
    if (!isWholeReading(row)) return `the digest of reading ${String(row['entry'])} does not hold`;
  }
  return undefined;
}

export function isWholeReading({ job, at, reading, digest }: Row): boolean {
  if (typeof job !== 'string' || typeof at !== 'string' || typeof reading !== 'string' || !isBytes(digest))
    return false;
  return sameBytes(readingDigest(job, at, reading), digest);
}

/** Rows in portions, so that a long history never lies in memory as a whole. */
function* everyRow(driver: Driver, table: string, key: string, columns: string): Generator<Row> {
  const portion = driver.prepare(`SELECT ${columns} FROM ${table} WHERE ${key} > ? ORDER BY ${key} LIMIT 200`);
  for (let last = 0; ; ) {
    const rows = portion.all(last);
    yield* rows;
    const number = rows.at(-1)?.[key];
    if (typeof number !== 'number') return;
    last = number;
  }
}

/** The first bytes of the file, by the published format of SQLite; this program's stores have the same in all of these places. */
export const headerPlaces = { userVersion: 60 } as const;
const fixedPlaces: readonly { readonly at: number; readonly bytes: readonly (readonly number[])[] }[] = [
  { at: 0, bytes: [[...Buffer.from('SQLite format 3\0', 'latin1')]] },
  // Page size 4096; written by way of a log, read likewise; no reserved bytes; payload fractions.
  { at: 16, bytes: [[0x10, 0x00, 2, 2, 0, 64, 32, 32]] },
  // Schema format and text encoding are 0 until the first table is made.
  {
    at: 44,
    bytes: [
      [0, 0, 0, 4],
      [0, 0, 0, 0],
    ],
  },
  { at: 52, bytes: [[0, 0, 0, 0]] },
  {
    at: 56,
    bytes: [
      [0, 0, 0, 1],
      [0, 0, 0, 0],
    ],
  },
  { at: 64, bytes: [[0, 0, 0, 0]] },
  { at: 72, bytes: [Array.from({ length: 20 }, () => 0)] },
];
const headerLength = 100;

function headerFault(header: Buffer, size: number): string | undefined {
  if (size < headerLength) return 'it is cut off';
  const wrong = fixedPlaces.find(
    ({ at, bytes }) => !bytes.some((each) => header.subarray(at, at + each.length).equals(Buffer.from(each))),
  );
  return wrong === undefined ? undefined : `its head is not that of a store (byte ${String(wrong.at)})`;
}

/** Puts right what is known beforehand of the head of a copy, and makes the engine find out the rest from the file. */
export function mendHeader(header: Buffer): void {
  for (const { at, bytes } of fixedPlaces) header.set(bytes[0] ?? [], at);
  // Free pages are of no use to a reader, and a size that is said to be out of date is taken from the file.
  header.fill(0, 32, 40);
  header.writeUInt32BE((header.readUInt32BE(24) + 1) >>> 0, 92);
}

function headerOf(file: string): Buffer {
  const header = Buffer.alloc(headerLength);
  const descriptor = openSync(file, 'r');
  try {
    readSync(descriptor, header, 0, headerLength, 0);
  } finally {
    closeSync(descriptor);
  }
  return header;
}

export function sizeOf(file: string): number {
  return statSync(file, { throwIfNoEntry: false })?.size ?? 0;
}

function damaged(why: string): Condition {
  return { is: 'damaged', why: why.replaceAll(/\s+/g, ' ').slice(0, 200) };
}
