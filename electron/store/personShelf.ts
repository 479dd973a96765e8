/** What the person keeps beside jobs: a log of readings, own parts, preferences. */
import type { JobKey, LoggedReading, OwnPart } from '../../core/host.ts';
import type { Connection } from './connection.ts';
import { Refused } from './refused.ts';
import { readingDigest } from './revisionRow.ts';

type Fields = Readonly<Record<string, unknown>>;

/** Every method throws a `Refused` in words where it cannot do its work. */
export class PersonShelf {
  private readonly connection: Connection;

  constructor(connection: Connection) {
    this.connection = connection;
  }

  /** The log only grows. */
  addReading(job: JobKey, reading: Fields): LoggedReading {
    const text = JSON.stringify(reading);
    return this.connection.write((at) => {
      if (this.prepare('SELECT 1 FROM jobs WHERE job = ?').get(job) === undefined) {
        throw new Refused({
          code: 'not-found',
          message: 'There is no such job in the store. The reading was not logged.',
        });
      }
      const insert = this.prepare('INSERT INTO readings (job, at, reading, digest) VALUES (?, ?, ?, ?)');
      const { lastRow } = insert.run(job, at, text, readingDigest(job, at, text));
      return { entry: lastRow, job, at, reading };
    });
  }

  /** In the order of logging. */
  readings(job: JobKey): readonly LoggedReading[] {
    return this.connection.read(() =>
      this.prepare('SELECT entry, at, reading FROM readings WHERE job = ? ORDER BY entry')
        .all(job)
        .flatMap((row) => {
          const reading = fieldsOf(row['reading']);
          return reading === undefined ? [] : [{ entry: Number(row['entry']), job, at: String(row['at']), reading }];
        }),
    );
  }

  /** In the order in which they were first kept. */
  ownParts(): readonly OwnPart[] {
    return this.connection.read(() =>
      this.prepare('SELECT id, label, part FROM ownParts ORDER BY rowid')
        .all()
        .flatMap((row) => {
          const part = fieldsOf(row['part']);
          return part === undefined ? [] : [{ id: String(row['id']), label: String(row['label']), part }];
        }),
    );
  }

  /** A part of the same id is replaced. */
  keepPart({ id, label, part }: OwnPart): void {
    this.connection.write(() => {
      this.prepare(
        'INSERT INTO ownParts (id, label, part) VALUES (?, ?, ?) ON CONFLICT (id) DO UPDATE SET label = excluded.label, part = excluded.part',
      ).run(id, label, JSON.stringify(part));
    });
  }

  removePart(id: string): void {
    this.connection.write(() => {
      const { changes } = this.prepare('DELETE FROM ownParts WHERE id = ?').run(id);
      if (changes === 0)
        throw new Refused({ code: 'not-found', message: 'There is no such part among your own parts.' });
    });
  }

  /** As they were written; whoever asks checks them. */
  preferences(): ReadonlyMap<string, unknown> {
    return this.connection.read(() => {
      const rows = this.prepare('SELECT name, value FROM preferences').all();
      return new Map(rows.map((row) => [String(row['name']), jsonOf(row['value'])]));
    });
  }

  changePreferences(changes: ReadonlyMap<string, unknown>): void {
    this.connection.write(() => {
      const insert = this.prepare('INSERT OR REPLACE INTO preferences (name, value) VALUES (?, ?)');
      for (const [name, value] of changes) insert.run(name, JSON.stringify(value));
    });
  }

  private prepare(sql: string) {
    return this.connection.driver.prepare(sql);
  }
}

/** `undefined` for a text that is no JSON. */
export function jsonOf(text: unknown): unknown {
  if (typeof text !== 'string') return undefined;
  try {
    return JSON.parse(text) as unknown;
  } catch {
    return undefined; // a damaged entry is left out, the others stand
  }
}

export function fieldsOf(text: unknown): Fields | undefined {
  const value = jsonOf(text);
  return typeof value === 'object' && value !== null && !Array.isArray(value) ? (value as Fields) : undefined;
}
