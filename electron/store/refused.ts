/** Trouble on its way to the person: thrown inside the store and the services, and caught where the answer is made. */
import type { Trouble } from '../../core/host.ts';
import { SqlError } from './driver.ts';

export class Refused extends Error {
  readonly trouble: Trouble;
  constructor(trouble: Trouble) {
    super(trouble.message);
    this.name = 'Refused';
    this.trouble = trouble;
  }
}

/** Runs store work; a refusal of the engine or of the system becomes trouble in words, anything else is thrown on. */
export function refusing<T>(folder: string, work: () => T): T {
  try {
    return work();
  } catch (error) {
    throw storeRefusal(folder, error) ?? error;
  }
}

/** `undefined` where the error is no fault of the disk, the store or another program. */
export function storeRefusal(folder: string, error: unknown): Refused | undefined {
  const code = error instanceof SqlError ? troubleOfSql(error) : troubleOfSystem(error);
  return code === undefined ? undefined : new Refused({ code, message: sentences[code](folder) });
}

type StoreTrouble = 'disk-full' | 'read-only' | 'busy' | 'damaged';

const sentences: Readonly<Record<StoreTrouble, (folder: string) => string>> = {
  'disk-full': (folder) =>
    `The disk of the store (${folder}) is full. Nothing was written, not even in part; make room and try again.`,
  'read-only': (folder) =>
    `The store (${folder}) cannot be written: the system does not allow it, or the disk can only be read. Nothing was written, not even in part.`,
  busy: (folder) =>
    `Another program holds the store (${folder}) and did not let go in time. Nothing was written, not even in part; try again.`,
  damaged: (folder) =>
    `The store (${folder}) cannot be read here: it is damaged, or its disk is. Nothing was written, not even in part. Start again: the damaged store is then set aside and all that can be read of it is recovered.`,
};

function troubleOfSql(error: SqlError): StoreTrouble | undefined {
  if (error.code === 'IOERR_SHMSIZE') return 'disk-full';
  switch (error.kind) {
    case 'FULL':
      return 'disk-full';
    case 'READONLY':
    case 'CANTOPEN':
    case 'PERM':
      return 'read-only';
    case 'BUSY':
    case 'LOCKED':
      return 'busy';
    case 'CORRUPT':
    case 'NOTADB':
    case 'IOERR':
      return 'damaged';
    default:
      return undefined;
  }
}

function troubleOfSystem(error: unknown): StoreTrouble | undefined {
  if (!(error instanceof Error) || !('code' in error)) return undefined;
  switch (error.code) {
    case 'ENOSPC':
    case 'EDQUOT':
      return 'disk-full';
    case 'EACCES':
    case 'EPERM':
    case 'EROFS':
    case 'ENOTDIR':
    case 'EEXIST':
    case 'ENOENT':
      return 'read-only';
    case 'EBUSY':
      return 'busy';
    case 'EIO':
      return 'damaged';
    default:
      return undefined;
  }
}
