/** The SQLite that newer runtimes bring along (`node:sqlite`), for the Electron host. Its differences are levelled out here. */
import { type Driver, type DriverRequest, type Row, SqlError, type SqlValue, transactionBy } from './driver.ts';

/** As much of `node:sqlite` as is used; the declarations of Node 20 do not have it. */
export interface BuiltInModule {
  readonly DatabaseSync: new (file: string, options: { readonly readOnly: boolean }) => BuiltInDatabase;
}
export interface BuiltInDatabase {
  exec(sql: string): void;
  prepare(sql: string): BuiltInStatement;
  close(): void;
}
interface BuiltInStatement {
  run(...values: readonly SqlValue[]): { readonly changes: number | bigint; readonly lastInsertRowid: number | bigint };
  get(...values: readonly SqlValue[]): object | undefined;
  all(...values: readonly SqlValue[]): readonly object[];
}

export async function openBuiltIn(request: DriverRequest): Promise<Driver> {
  // The name stands in a variable, since neither the declarations nor the bundler of Node 20 know the module.
  const name = 'node:sqlite';
  return builtInDriver((await import(/* @vite-ignore */ name)) as BuiltInModule, request);
}

export function builtInDriver({ DatabaseSync }: BuiltInModule, { file, readOnly = false }: DriverRequest): Driver {
  const database = told(() => new DatabaseSync(file, { readOnly }));
  const exec = (sql: string): void => {
    told(() => {
      database.exec(sql);
    });
  };
  return {
    exec,
    prepare: (sql) => {
      const statement = told(() => database.prepare(sql));
      return {
        run: (...values) => {
          const { changes, lastInsertRowid } = told(() => statement.run(...values));
          return { changes: Number(changes), lastRow: Number(lastInsertRowid) };
        },
        get: (...values) => plain(told(() => statement.get(...values))),
        all: (...values) => told(() => statement.all(...values)).map((row) => plain(row)!),
      };
    },
    transaction: transactionBy(exec),
    close: () => {
      told(() => {
        database.close();
      });
    },
  };
}

/** Its rows have no prototype; a plain object compares and prints like any other. */
function plain(row: object | undefined): Row | undefined {
  return row === undefined ? undefined : { ...row };
}

function told<T>(work: () => T): T {
  try {
    return work();
  } catch (error) {
    if (error instanceof Error && 'errcode' in error && typeof error.errcode === 'number') {
      throw new SqlError(codeName(error.errcode), error.message);
    }
    throw error;
  }
}

/** Result codes of SQLite by number (published in its documentation); the low byte is the kind. */
const kinds: Readonly<Record<number, string>> = {
  1: 'ERROR',
  3: 'PERM',
  5: 'BUSY',
  6: 'LOCKED',
  7: 'NOMEM',
  8: 'READONLY',
  10: 'IOERR',
  11: 'CORRUPT',
  13: 'FULL',
  14: 'CANTOPEN',
  19: 'CONSTRAINT',
  26: 'NOTADB',
};
const narrowed: Readonly<Record<number, string>> = { 522: 'IOERR_SHORT_READ', 4874: 'IOERR_SHMSIZE' };

function codeName(errcode: number): string {
  return narrowed[errcode] ?? kinds[errcode & 0xff] ?? `CODE${String(errcode)}`;
}
