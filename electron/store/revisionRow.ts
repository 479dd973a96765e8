/** One kept state of a job as a row: it carries all that is needed to read it alone, and the proof that it is whole. */
import { createHash } from 'node:crypto';
import { deflateSync, inflateSync } from 'node:zlib';
import { largestTextLength } from '../../core/api.ts';
import type { Row, SqlValue } from './driver.ts';

export interface RevisionRow {
  readonly revision: number;
  readonly job: string;
  readonly parent: number | null;
  readonly title: string;
  readonly parts: number;
  readonly label: string;
  readonly at: string;
  readonly packed: Uint8Array;
}

export const revisionColumns = 'revision, job, parent, title, parts, label, at, packed, textDigest, rowDigest';

export function packText(text: string): Uint8Array {
  return deflateSync(Buffer.from(text, 'utf8'));
}

/** Throws where the bytes are no packed text. */
export function unpackText(packed: Uint8Array): string {
  return inflateSync(packed, { maxOutputLength: 4 * largestTextLength }).toString('utf8');
}

export function textDigest(text: string): Uint8Array {
  return createHash('sha256').update(text, 'utf8').digest();
}

/** Over everything of the row, so that a changed parent or label is noticed like a changed text. */
export function rowDigest({ revision, job, parent, title, parts, label, at, packed }: RevisionRow): Uint8Array {
  const head = JSON.stringify([revision, job, parent, title, parts, label, at]);
  return createHash('sha256').update(head, 'utf8').update(packed).digest();
}

/** The row if it is whole, by its own digest; `undefined` for anything else that a damaged store may hold. */
export function wholeRow(row: Row | undefined): RevisionRow | undefined {
  if (row === undefined) return undefined;
  const { revision, job, parent, title, parts, label, at, packed, rowDigest: digest } = row;
  if (typeof revision !== 'number' || typeof parts !== 'number') return undefined;
  if (typeof job !== 'string' || typeof title !== 'string' || typeof label !== 'string' || typeof at !== 'string') {
    return undefined;
  }
  if (!isBytes(packed) || !isBytes(digest) || !(parent === null || typeof parent === 'number')) return undefined;
  const whole = { revision, job, parent, title, parts, label, at, packed };
  return sameBytes(rowDigest(whole), digest) ? whole : undefined;
}

/** Over one entry of the log of readings. */
export function readingDigest(job: string, at: string, reading: string): Uint8Array {
  return createHash('sha256')
    .update(JSON.stringify([job, at, reading]), 'utf8')
    .digest();
}

export function isBytes(value: SqlValue | undefined): value is Uint8Array {
  return value instanceof Uint8Array;
}
export function sameBytes(one: Uint8Array, other: Uint8Array): boolean {
  return Buffer.compare(one, other) === 0;
}
