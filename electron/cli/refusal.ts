/** Why a command ends before its work is done: the user's words, the files, or the job; and the exit statuses of the program. */
import type { Issue } from '../../core/api.ts';

export const exitStatus = {
  /** Done; no finding that says stop or fix. */
  done: 0,
  /** Done, with such a finding, or with a collapse. */
  found: 1,
  /** The words of the call are wrong. */
  words: 2,
  /** The job has issues. */
  issues: 3,
  /** A file could not be read or written. */
  file: 4,
  /** The program is wrong. */
  defect: 70,
} as const;

/** Ends a command with a sentence for the user. Thrown inside the command line only, and caught by `main`. */
export class Refusal extends Error {
  readonly status: number;
  constructor(status: typeof exitStatus.words | typeof exitStatus.file, message: string) {
    super(message);
    this.name = 'Refusal';
    this.status = status;
  }
}

/** Ends a command because the job has issues. */
export class JobRefusal extends Error {
  readonly issues: readonly Issue[];
  readonly file: string;
  constructor(file: string, issues: readonly Issue[]) {
    super(`${file} has issues`);
    this.name = 'JobRefusal';
    this.issues = issues;
    this.file = file;
  }
}

const reasons: Readonly<Record<string, string>> = {
  ENOENT: 'there is no such file or folder',
  EACCES: 'the system does not allow it',
  EPERM: 'the system does not allow it',
  EISDIR: 'it is a folder',
  ENOTDIR: 'a part of the path is no folder',
  ENOSPC: 'there is no space left',
  EDQUOT: 'there is no space left',
  EROFS: 'the disk can only be read',
  ELOOP: 'its links go round in a circle',
  ENAMETOOLONG: 'its name is too long',
  EMFILE: 'too many files are open',
  EBUSY: 'it is in use',
  ERR_INVALID_ARG_VALUE: 'it is no name of a file',
};

/** The refusal for a failed file operation; any other error is not the file's fault and is thrown on. */
export function fileRefusal(what: string, error: unknown): Refusal {
  if (!(error instanceof Error) || !('code' in error) || typeof error.code !== 'string') throw error;
  return new Refusal(exitStatus.file, `${what}: ${reasons[error.code] ?? `the system says ${error.code}`}.`);
}
