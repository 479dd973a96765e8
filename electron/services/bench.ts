/** What the services work with, and how trouble on the way becomes an answer. */
import { type CheckedJob, type Issue, missingFigures, parseJob, quoted } from '../../core/api.ts';
import type { HostEvent, TroubleCode } from '../../core/host.ts';
import { tables } from '../../data/index.ts';
import { Refused } from '../store/refused.ts';
import type { Store } from '../store/store.ts';
import type { FileDoor, HostFacts } from './fileDoor.ts';

export interface Bench {
  readonly store: Store;
  readonly door: FileDoor;
  readonly about: HostFacts;
  /** Tells every window. */
  readonly tell: (event: HostEvent) => void;
}

/** The job that a text stands for; throws a `Refused` with every issue where it stands for none. */
export function checkedJob(text: string): CheckedJob {
  const read = parseJob(text);
  if (!read.ok) throw issuesRefusal('The job cannot be read', read.issues);
  return read.value;
}

/** As `checkedJob`, and fit to be solved. */
export function solvableJob(text: string): CheckedJob {
  const job = checkedJob(text);
  const missing = missingFigures({ job, tables });
  if (missing.length > 0) throw issuesRefusal('The job cannot be solved', missing);
  return job;
}

export function issuesRefusal(what: string, issues: readonly Issue[]): Refused {
  const [first] = issues;
  const more = issues.length > 1 ? ` There are ${String(issues.length - 1)} more.` : '';
  const where = first === undefined || first.path === '' ? '' : `${first.path}: `;
  const message = `${what}: ${where}${first?.message ?? 'it has issues.'}${more} Nothing was changed.`;
  return new Refused({ code: 'issues', message, issues });
}

const codes: Readonly<Record<string, TroubleCode>> = {
  ENOENT: 'not-found',
  ENOTDIR: 'not-found',
  EISDIR: 'not-found',
  ENAMETOOLONG: 'not-found',
  ELOOP: 'not-found',
  ERR_INVALID_ARG_VALUE: 'not-found',
  ENOSPC: 'disk-full',
  EDQUOT: 'disk-full',
  EACCES: 'read-only',
  EPERM: 'read-only',
  EROFS: 'read-only',
  EBUSY: 'busy',
  ETXTBSY: 'busy',
  EMFILE: 'busy',
  EIO: 'damaged',
};
const reasons: Readonly<Partial<Record<TroubleCode, string>>> = {
  'not-found': 'there is no such file or folder',
  'disk-full': 'there is no space left',
  'read-only': 'the system does not allow it, or the disk can only be read',
  busy: 'it is in use',
  damaged: 'the disk reports an error',
};

/** Runs work on a file of the person; the system's refusal becomes a `Refused` in words. */
export function onFile<T>(path: string, doing: 'read' | 'written', work: () => T): T {
  try {
    return work();
  } catch (error) {
    const code = error instanceof Error && 'code' in error ? codes[String(error.code)] : undefined;
    if (code === undefined) throw error;
    const half = doing === 'written' ? ' Nothing was written, not even in part.' : '';
    throw new Refused({
      code,
      message: `${quoted(path)} cannot be ${doing}: ${reasons[code] ?? 'the system refuses'}.${half}`,
    });
  }
}
