/**
 * Has the shape and the ways of the runtime's own `node:sqlite`, made out of the compiled package: rows without a prototype, errors
 * with a number instead of a name, foreign keys on.
 */
import Database from 'better-sqlite3';
import type { BuiltInDatabase } from '../../electron/store/builtInSqlite.ts';
import type { SqlValue } from '../../electron/store/driver.ts';

const numbers: Readonly<Record<string, number>> = {
  SQLITE_ERROR: 1,
  SQLITE_BUSY: 5,
  SQLITE_READONLY: 8,
  SQLITE_FULL: 13,
  SQLITE_CANTOPEN: 14,
  SQLITE_CONSTRAINT_CHECK: 275,
};

export class DatabaseSync implements BuiltInDatabase {
  private readonly database: Database.Database;

  constructor(file: string, { readOnly }: { readonly readOnly: boolean }) {
    this.database = told(() => new Database(file, { readonly: readOnly }));
    this.database.pragma('foreign_keys = ON');
  }
  exec(sql: string): void {
    told(() => this.database.exec(sql));
  }
  close(): void {
    this.database.close();
  }
  prepare(sql: string) {
    const statement = told(() => this.database.prepare(sql));
    return {
      run: (...values: readonly SqlValue[]) => told(() => statement.run(...values)),
      get: (...values: readonly SqlValue[]) => bare(told(() => statement.get(...values)) as object | undefined),
      all: (...values: readonly SqlValue[]) => told(() => statement.all(...values)).map((row) => bare(row as object)!),
    };
  }
}

function bare(row: object | undefined): object | undefined {
  return row === undefined ? undefined : Object.assign<object, object>(Object.create(null) as object, row);
}

function told<T>(work: () => T): T {
  try {
    return work();
  } catch (error) {
    const name = error instanceof Database.SqliteError ? error.code : 'SQLITE_CANTOPEN';
    throw Object.assign(new Error((error as Error).message), { code: 'ERR_SQLITE_ERROR', errcode: numbers[name] ?? 1 });
  }
}
