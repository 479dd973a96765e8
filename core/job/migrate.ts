/**
 * Versions of the job file. A change that breaks the contract takes a new version and one step here, from each version to the next;
 * an old file walks the chain and is then checked like any other.
 */
import { described, own, type RawObject } from './field.ts';
import type { Issue, Result } from './issue.ts';

/** The version that this program writes and checks. */
export const currentVersion = 1;

/**
 * Turns a job of one version into the next. It is given an unchecked object and must not throw on any; what it cannot make sense
 * of it leaves for the check to name. It need not set `version`.
 */
export type Migration = (job: RawObject) => RawObject;

/** The step that leads away from each version; version 1 is the first, so there is none yet. */
export const migrations: ReadonlyMap<number, Migration> = new Map();

/** The job in the current version, or one issue that says in words why it cannot be brought there. */
export function migrate(
  job: RawObject,
  { steps = migrations, target = currentVersion }: { steps?: ReadonlyMap<number, Migration>; target?: number } = {},
): Result<RawObject, readonly Issue[]> {
  const given = own(job, 'version');
  const wrong = troubleWithVersion(given, steps, target);
  if (wrong !== undefined)
    return { ok: false, issues: [{ path: 'version', code: wrong.code, message: wrong.message }] };
  let migrated = job;
  for (let version = given as number; version < target; version += 1) {
    migrated = { ...steps.get(version)!(migrated), version: version + 1 };
  }
  return { ok: true, value: migrated };
}

function troubleWithVersion(
  version: unknown,
  steps: ReadonlyMap<number, Migration>,
  target: number,
): Pick<Issue, 'code' | 'message'> | undefined {
  if (version === undefined)
    return { code: 'missing', message: `A job needs its version: "version": ${String(target)}.` };
  if (typeof version !== 'number' || !Number.isInteger(version)) {
    return { code: 'wrong-type', message: `version must be a whole number, got ${described(version)}.` };
  }
  if (version > target) {
    const message = `This job was written by a newer program (version ${String(version)}); this one reads versions up to ${String(target)}.`;
    return { code: 'wrong-version', message };
  }
  for (let from = version; from < target; from += 1) {
    if (!steps.has(from))
      return {
        code: 'wrong-version',
        message: `There is no version ${String(version)} of the job file; the version is ${String(target)}.`,
      };
    if (from - version > 1000) break;
  }
  return undefined;
}
