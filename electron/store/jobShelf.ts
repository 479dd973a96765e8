/** Jobs and their trees of revisions: every kept state stays, undo and redo only move the head. */
import { randomUUID } from 'node:crypto';
import type { JobKey, JobSummary, KeptJob, RevisionNumber, RevisionSummary } from '../../core/host.ts';
import type { Connection } from './connection.ts';
import type { Row } from './driver.ts';
import { Refused } from './refused.ts';
import {
  packText,
  type RevisionRow,
  revisionColumns,
  rowDigest,
  textDigest,
  unpackText,
  wholeRow,
} from './revisionRow.ts';

/** What is kept of a job, its title and number of parts as its reader found them. */
export interface KeepRequest {
  readonly text: string;
  readonly title: string;
  readonly parts: number;
  readonly label: string;
}

interface Head {
  readonly head: RevisionNumber;
  readonly at: string;
}

/** Every method throws a `Refused` in words where it cannot do its work. */
export class JobShelf {
  private readonly connection: Connection;

  constructor(connection: Connection) {
    this.connection = connection;
  }

  /** Last changed first. */
  list(): readonly JobSummary[] {
    return this.connection.read(() =>
      this.rows(`${summarySelect} WHERE removed = 0 ORDER BY turn DESC`).map(summaryOf),
    );
  }

  create(request: KeepRequest & { readonly file?: string | undefined }): KeptJob {
    const job = randomUUID();
    this.connection.write((at) => {
      const head = this.insert(job, null, request, at);
      this.prepare('INSERT INTO jobs (job, head, turn, changedAt, file) VALUES (?, ?, ?, ?, ?)').run(
        job,
        head,
        this.nextTurn(),
        at,
        request.file ?? null,
      );
    });
    return this.open(job);
  }

  open(job: JobKey): KeptJob {
    return this.connection.read(() => {
      const { head, file } = this.jobRow(job);
      const row = this.revisionRow(job, head);
      return { job, title: row.title, head, text: this.textOf(row), file };
    });
  }

  /** A child of `after`, which must be the head. A job that had been taken off the list comes back to it. */
  keep(job: JobKey, after: RevisionNumber, request: KeepRequest): Head {
    return this.connection.write((at) => {
      this.expectHead(job, after);
      const head = this.insert(job, after, request, at);
      this.prepare('INSERT OR REPLACE INTO visited (parent, child) VALUES (?, ?)').run(after, head);
      this.moveHead(job, head, at);
      return { head, at };
    });
  }

  /** Moves the head and remembers the way to it, so that redo follows it again. */
  go(job: JobKey, from: RevisionNumber, to: RevisionNumber): KeptJob {
    this.connection.write((at) => {
      this.expectHead(job, from);
      this.revisionRow(job, to);
      this.prepare(rememberWay).run(to);
      this.moveHead(job, to, at);
    });
    return this.open(job);
  }

  /** Newest first. */
  history(job: JobKey, most: number, before?: RevisionNumber): readonly RevisionSummary[] {
    return this.connection.read(() =>
      this.rows(
        `${revisionSelect} WHERE job = ? AND revisions.revision < ? ORDER BY revisions.revision DESC LIMIT ?`,
        job,
        before ?? Number.MAX_SAFE_INTEGER,
        most,
      ).map(revisionSummaryOf),
    );
  }

  head(job: JobKey): RevisionNumber {
    return this.connection.read(() => this.jobRow(job).head);
  }

  /** The head's ancestors and its last-visited descendants, oldest first; the nearest `most` of them, the head among them. */
  line(job: JobKey, most: number): readonly RevisionSummary[] {
    return this.connection.read(() => {
      const { head } = this.jobRow(job);
      const above = this.rows(ancestors, head, most).map((row) => Number(row['revision']));
      const below = this.rows(descendants, head, most).map((row) => Number(row['revision']));
      const ahead = Math.min(below.length, Math.max(Math.floor((most - 1) / 2), most - 1 - above.length));
      const behind = Math.min(above.length, most - 1 - ahead);
      const numbers = [...above.slice(above.length - behind), head, ...below.slice(0, ahead)];
      return numbers.map((revision) => this.summary(job, revision));
    });
  }

  revision(job: JobKey, revision: RevisionNumber): RevisionSummary & { readonly text: string } {
    return this.connection.read(() => {
      const text = this.textOf(this.revisionRow(job, revision));
      return { ...this.summary(job, revision), text };
    });
  }

  /** An empty name takes the name away. */
  snapshot(job: JobKey, revision: RevisionNumber, name: string): RevisionSummary {
    return this.connection.write(() => {
      this.summary(job, revision);
      if (name === '') this.prepare('DELETE FROM snapshots WHERE revision = ?').run(revision);
      else this.prepare('INSERT OR REPLACE INTO snapshots (revision, name) VALUES (?, ?)').run(revision, name);
      return this.summary(job, revision);
    });
  }

  remove(job: JobKey): void {
    this.connection.write(() => {
      this.jobRow(job);
      this.prepare('UPDATE jobs SET removed = 1 WHERE job = ?').run(job);
    });
  }

  restore(job: JobKey): JobSummary {
    return this.connection.write(() => {
      this.jobRow(job);
      this.prepare('UPDATE jobs SET removed = 0 WHERE job = ?').run(job);
      return summaryOf(this.rows(`${summarySelect} WHERE jobs.job = ?`, job)[0]!);
    });
  }

  /** The job that was read from a file or last written to it, taken off the list or not. */
  ofFile(file: string): JobKey | undefined {
    return this.connection.read(() => {
      const row = this.rows('SELECT job FROM jobs WHERE file = ? ORDER BY turn DESC LIMIT 1', file)[0];
      return row === undefined ? undefined : String(row['job']);
    });
  }

  /** The file that the job goes to from now on. */
  setFile(job: JobKey, file: string): void {
    this.connection.write(() => {
      this.jobRow(job);
      this.prepare('UPDATE jobs SET file = ? WHERE job = ?').run(file, job);
    });
  }

  /** Was the job ever kept with exactly this text? */
  hasText(job: JobKey, text: string): boolean {
    return this.connection.read(() => {
      const sql = 'SELECT 1 FROM revisions WHERE job = ? AND textDigest = ? LIMIT 1';
      return this.prepare(sql).get(job, textDigest(text)) !== undefined;
    });
  }

  private insert(job: JobKey, parent: RevisionNumber | null, request: KeepRequest, at: string): RevisionNumber {
    const next = this.prepare('SELECT coalesce(max(revision), 0) + 1 AS next FROM revisions').get();
    const { text, parts } = request;
    insertRevision(this.connection, {
      row: {
        revision: Number(next?.['next']),
        job,
        parent,
        title: storable(request.title),
        parts,
        label: storable(request.label),
        at,
        packed: packText(text),
      },
      textDigest: textDigest(text),
    });
    return Number(next?.['next']);
  }

  private moveHead(job: JobKey, head: RevisionNumber, at: string): void {
    this.prepare('UPDATE jobs SET head = ?, turn = ?, changedAt = ?, removed = 0 WHERE job = ?').run(
      head,
      this.nextTurn(),
      at,
      job,
    );
  }

  private nextTurn(): number {
    return Number(this.prepare('SELECT coalesce(max(turn), 0) + 1 AS next FROM jobs').get()?.['next']);
  }

  private expectHead(job: JobKey, revision: RevisionNumber): void {
    const { head } = this.jobRow(job);
    if (head === revision) return;
    throw new Refused({
      code: 'conflict',
      message:
        'This job was changed by another window or program in between. Nothing was written, and its change is kept as well.',
      head,
    });
  }

  private jobRow(job: JobKey): { readonly head: RevisionNumber; readonly file: string | null } {
    const row = this.prepare('SELECT head, file FROM jobs WHERE job = ?').get(job);
    if (row === undefined) throw notFound('There is no such job in the store');
    const file = row['file'];
    return { head: Number(row['head']), file: typeof file === 'string' ? file : null };
  }

  private revisionRow(job: JobKey, revision: RevisionNumber): RevisionRow {
    const row = this.prepare(`SELECT ${revisionColumns} FROM revisions WHERE revision = ? AND job = ?`).get(
      revision,
      job,
    );
    if (row === undefined) throw noRevision(revision);
    const whole = wholeRow(row);
    if (whole === undefined) throw damagedRevision(revision);
    return whole;
  }

  private textOf({ packed, revision }: RevisionRow): string {
    try {
      return unpackText(packed);
    } catch {
      throw damagedRevision(revision);
    }
  }

  private summary(job: JobKey, revision: RevisionNumber): RevisionSummary {
    const row = this.rows(`${revisionSelect} WHERE job = ? AND revisions.revision = ?`, job, revision)[0];
    if (row === undefined) throw noRevision(revision);
    return revisionSummaryOf(row);
  }

  private prepare(sql: string) {
    return this.connection.driver.prepare(sql);
  }
  private rows(sql: string, ...values: readonly (string | number)[]): readonly Row[] {
    return this.prepare(sql).all(...values);
  }
}

/** Writes a revision's row with its digest; to be called in a transaction. */
export function insertRevision(
  { driver }: Pick<Connection, 'driver'>,
  { row, textDigest }: { readonly row: RevisionRow; readonly textDigest: Uint8Array },
): void {
  driver
    .prepare(`INSERT INTO revisions (${revisionColumns}) VALUES (?, ?, ?, ?, ?, ?, ?, ?, ?, ?)`)
    .run(
      row.revision,
      row.job,
      row.parent,
      row.title,
      row.parts,
      row.label,
      row.at,
      row.packed,
      textDigest,
      rowDigest(row),
    );
}

/** Half a surrogate pair has no form in UTF-8, and a text with a zero in it comes back short from some engines. */
function storable(text: string): string {
  return Buffer.from(text, 'utf8').toString('utf8').replaceAll('\0', '\ufffd');
}

const summarySelect =
  'SELECT jobs.job, title, parts, changedAt, file FROM jobs JOIN revisions ON revisions.revision = jobs.head';
const revisionSelect =
  'SELECT revisions.revision, parent, label, at, name FROM revisions LEFT JOIN snapshots ON snapshots.revision = revisions.revision';

/** A parent has always the smaller number, so the nearest ancestors have the largest. */
const ancestors = `
  WITH RECURSIVE way (revision) AS (
    SELECT parent FROM revisions WHERE revision = ?
    UNION ALL
    SELECT revisions.parent FROM way JOIN revisions ON revisions.revision = way.revision
  )
  SELECT revision FROM (SELECT revision FROM way WHERE revision IS NOT NULL ORDER BY revision DESC LIMIT ?) ORDER BY revision`;
const descendants = `
  WITH RECURSIVE way (revision) AS (
    SELECT child FROM visited WHERE parent = ?
    UNION ALL
    SELECT child FROM way JOIN visited ON visited.parent = way.revision
  )
  SELECT revision FROM way ORDER BY revision LIMIT ?`;
const rememberWay = `
  INSERT OR REPLACE INTO visited (parent, child)
    WITH RECURSIVE way (revision, parent) AS (
      SELECT revision, parent FROM revisions WHERE revision = ?
      UNION ALL
      SELECT revisions.revision, revisions.parent FROM way JOIN revisions ON revisions.revision = way.parent
    )
    SELECT parent, revision FROM way WHERE parent IS NOT NULL`;

function summaryOf(row: Row): JobSummary {
  const file = row['file'];
  return {
    job: String(row['job']),
    title: String(row['title']),
    parts: Number(row['parts']),
    changedAt: String(row['changedAt']),
    file: typeof file === 'string' ? file : null,
  };
}

function revisionSummaryOf(row: Row): RevisionSummary {
  const { parent, name } = row;
  return {
    revision: Number(row['revision']),
    parent: typeof parent === 'number' ? parent : null,
    label: String(row['label']),
    at: String(row['at']),
    snapshot: typeof name === 'string' ? name : null,
  };
}

function notFound(what: string): Refused {
  return new Refused({ code: 'not-found', message: `${what}. Nothing was changed.` });
}
function noRevision(revision: RevisionNumber): Refused {
  return notFound(`The job has no revision ${String(revision)}`);
}
function damagedRevision(revision: RevisionNumber): Refused {
  return new Refused({
    code: 'damaged',
    message: `Revision ${String(revision)} is damaged on the disk and is not shown. Nothing was changed. Start again: the damaged store is then set aside and all that can be read of it is recovered.`,
  });
}
