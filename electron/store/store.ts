/** The store of jobs on disk, for one host; several hosts and windows may have it open at the same time. */
import { mkdirSync } from 'node:fs';
import type { HostNotice } from '../../core/host.ts';
import { Connection } from './connection.ts';
import { type Driver, type OpenDriver, SqlError } from './driver.ts';
import { inspect, isDamage } from './inspect.ts';
import { JobShelf } from './jobShelf.ts';
import { openDriver } from './openDriver.ts';
import { PersonShelf } from './personShelf.ts';
import { finishRecovery, recover, type StorePaths, storePaths } from './recover.ts';
import { Refused, storeRefusal } from './refused.ts';
import { migrate, newestVersion } from './schema.ts';

export interface StoreRequest {
  /** Where the store lies; made where it is missing. */
  readonly folder: string;
  readonly now: () => Date;
  /** Else by the runtime. */
  readonly open?: OpenDriver;
  /** How long to wait for another program that is writing. */
  readonly busyMs?: number;
}

export interface Store {
  readonly folder: string;
  /** What the person should know; grows where the clock is found to run behind. */
  readonly notices: readonly HostNotice[];
  readonly jobs: JobShelf;
  readonly person: PersonShelf;
  close(): void;
}

/**
 * Opens the store, after a check of every row; a damaged one is set aside and what can be read of it recovered, which `notices`
 * tell. Rejects with a `Refused` where the folder cannot be used, or where the store is of a newer version: that is not touched.
 */
export async function openStore({ folder, now, open = openDriver, busyMs = 3000 }: StoreRequest): Promise<Store> {
  const notices: HostNotice[] = [];
  const paths = storePaths(folder);
  try {
    mkdirSync(folder, { recursive: true });
    finishRecovery(paths);
    await makeWhole(paths, open, notices);
    const driver = await openWhole(paths, { open, busyMs, notices });
    return storeOf(new Connection({ driver, folder, file: paths.file, now, notices }), notices);
  } catch (error) {
    throw storeRefusal(folder, error) ?? error;
  }
}

function storeOf(connection: Connection, notices: readonly HostNotice[]): Store {
  connection.stamp();
  let isOpen = true;
  return {
    folder: connection.folder,
    notices,
    jobs: new JobShelf(connection),
    person: new PersonShelf(connection),
    close: () => {
      if (isOpen) connection.driver.close();
      isOpen = false;
    },
  };
}

async function makeWhole(paths: StorePaths, open: OpenDriver, notices: HostNotice[]): Promise<void> {
  const condition = await inspect(paths.file, open);
  if (condition.is === 'newer') throw newer(paths.folder, condition.version);
  if (condition.is === 'damaged') notices.push(...(await recover(paths, open, condition.why)));
}

interface Opening {
  readonly open: OpenDriver;
  readonly busyMs: number;
  readonly notices: HostNotice[];
}

/** A damage that only the walk through the versions comes upon is recovered from once. */
async function openWhole(paths: StorePaths, { open, busyMs, notices }: Opening): Promise<Driver> {
  try {
    return await prepared(paths.file, open, busyMs);
  } catch (error) {
    if (!(error instanceof SqlError) || !isDamage(error)) throw error;
    notices.push(...(await recover(paths, open, error.message)));
    return await prepared(paths.file, open, busyMs);
  }
}

async function prepared(file: string, open: OpenDriver, busyMs: number): Promise<Driver> {
  const driver = await open({ file });
  try {
    driver.exec(`PRAGMA busy_timeout = ${String(busyMs)}; PRAGMA synchronous = FULL; PRAGMA foreign_keys = ON;`);
    driver.exec('PRAGMA journal_mode = WAL;');
    migrate(driver);
    return driver;
  } catch (error) {
    driver.close();
    throw error;
  }
}

function newer(folder: string, version: number): Refused {
  return new Refused({
    code: 'cannot',
    message: `The store in ${folder} was written by a newer version of this program (store version ${String(version)}; this one knows ${String(newestVersion)}). It was not touched. Start the newer program, or name another folder by OHMWRIGHT_STORE.`,
  });
}
