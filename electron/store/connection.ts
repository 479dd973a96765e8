/** An open store file: every access goes through here, so that refusals become words and no clock can hurt. */
import { type Stats, statSync } from 'node:fs';
import type { HostNotice } from '../../core/host.ts';
import type { Driver } from './driver.ts';
import { Refused, refusing } from './refused.ts';

export interface ConnectionRequest {
  readonly driver: Driver;
  readonly folder: string;
  readonly file: string;
  readonly now: () => Date;
  readonly notices: HostNotice[];
}

/** A clock that is set by a server now and then jumps by less; no notice is made of that. */
const toleratedMs = 60_000;

export class Connection {
  readonly driver: Driver;
  readonly folder: string;
  private readonly file: string;
  private readonly identity: Pick<Stats, 'dev' | 'ino'>;
  private readonly now: () => Date;
  private readonly notices: HostNotice[];

  constructor({ driver, folder, file, now, notices }: ConnectionRequest) {
    this.driver = driver;
    this.folder = folder;
    this.file = file;
    this.now = now;
    this.notices = notices;
    this.identity = statSync(file);
  }

  /** Runs work that only reads; throws a `Refused` where the store or its disk refuses. */
  read<T>(work: () => T): T {
    return refusing(this.folder, work);
  }

  /** Runs work as one transaction: all of it is kept on the disk, or nothing; else as `read`. */
  write<T>(work: (at: string) => T): T {
    return refusing(this.folder, () => {
      this.stillInPlace();
      return this.driver.transaction(() => work(this.stamp()));
    });
  }

  /** The present moment; only told to the person, never used for order. */
  stamp(): string {
    const now = this.now();
    const newest = this.driver.prepare('SELECT max(changedAt) AS newest FROM jobs').get()?.['newest'];
    if (typeof newest === 'string' && Date.parse(newest) - now.getTime() > toleratedMs) this.tellClock(newest, now);
    return now.toISOString();
  }

  private tellClock(newest: string, now: Date): void {
    if (this.notices.some(({ kind }) => kind === 'clock-behind')) return;
    this.notices.push({
      kind: 'clock-behind',
      message: `The clock of this machine says ${now.toISOString()}, but the store holds work of ${newest}. Times shown may be wrong; the order of your work is kept without the clock, and nothing is lost.`,
    });
  }

  /** Another program may have set the file aside or removed it; what would be written into it then would be lost. */
  private stillInPlace(): void {
    const found = statSync(this.file, { throwIfNoEntry: false });
    if (found?.dev === this.identity.dev && found.ino === this.identity.ino) return;
    throw new Refused({
      code: 'damaged',
      message: `The store in ${this.folder} was moved or replaced while it was open. Nothing was written, not even in part; save your job to a file and start again.`,
    });
  }
}
