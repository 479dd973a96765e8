/** What the store needs of an SQL engine, and no more: two engines offer it, so that no host has to compile a binding of its own. */

export type SqlValue = string | number | null | Uint8Array;
export type Row = Readonly<Record<string, SqlValue>>;

export interface Statement {
  run(...values: readonly SqlValue[]): { readonly changes: number; readonly lastRow: number };
  get(...values: readonly SqlValue[]): Row | undefined;
  all(...values: readonly SqlValue[]): readonly Row[];
}

/** Every method throws an `SqlError` where the engine refuses. */
export interface Driver {
  exec(sql: string): void;
  prepare(sql: string): Statement;
  /** Runs `work` as one transaction that holds the right to write from its beginning; whatever is thrown in it undoes all of it. */
  transaction<T>(work: () => T): T;
  close(): void;
}

export interface DriverRequest {
  readonly file: string;
  /** True for a connection that changes nothing, not even by closing. */
  readonly readOnly?: boolean;
}
export type OpenDriver = (request: DriverRequest) => Promise<Driver>;

/** A refusal of the engine, by the name of its result code without `SQLITE_`: `FULL`, `BUSY`, `IOERR_SHMSIZE` … */
export class SqlError extends Error {
  readonly code: string;
  constructor(code: string, message: string) {
    super(message);
    this.name = 'SqlError';
    this.code = code;
  }
  /** The code without what narrows it down: `IOERR` for `IOERR_SHMSIZE`. */
  get kind(): string {
    return this.code.split('_')[0] ?? this.code;
  }
}

/** Transactions by plain statements, alike for both engines. */
export function transactionBy(exec: (sql: string) => void): Driver['transaction'] {
  return (work) => {
    exec('BEGIN IMMEDIATE');
    let answer: ReturnType<typeof work>;
    try {
      answer = work();
      exec('COMMIT');
    } catch (trouble) {
      undo(exec);
      throw trouble;
    }
    return answer;
  };
}

function undo(exec: (sql: string) => void): void {
  try {
    exec('ROLLBACK');
  } catch {
    // The engine has undone it by itself already, as it does on a full disk; the first trouble is the one to tell.
  }
}
