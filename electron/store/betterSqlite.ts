/** The compiled SQLite package, for hosts that run on Node. */
import Database from 'better-sqlite3';
import { type Driver, type DriverRequest, type Row, SqlError, type Statement, transactionBy } from './driver.ts';

export async function openBetter({ file, readOnly = false }: DriverRequest): Promise<Driver> {
  const database = told(() => new Database(file, { readonly: readOnly, fileMustExist: readOnly }));
  const exec = (sql: string): void => {
    told(() => database.exec(sql));
  };
  return {
    exec,
    prepare: (sql) => statementOf(told(() => database.prepare(sql))),
    transaction: transactionBy(exec),
    close: () => {
      told(() => database.close());
    },
  };
}

function statementOf(statement: Database.Statement): Statement {
  return {
    run: (...values) => {
      const { changes, lastInsertRowid } = told(() => statement.run(...values));
      return { changes, lastRow: Number(lastInsertRowid) };
    },
    get: (...values) => told(() => statement.get(...values)) as Row | undefined,
    all: (...values) => told(() => statement.all(...values)) as readonly Row[],
  };
}

function told<T>(work: () => T): T {
  try {
    return work();
  } catch (error) {
    if (error instanceof Database.SqliteError) throw new SqlError(error.code.replace('SQLITE_', ''), error.message);
    // The package checks the folder itself before it asks the engine, and says so with an error of its own.
    if (error instanceof TypeError && error.message.includes('directory does not exist')) {
      throw new SqlError('CANTOPEN', error.message);
    }
    throw error;
  }
}
