/** The tables of the store and how a store of an older version becomes one of today. A step that has been shipped is never changed. */
import type { Driver } from './driver.ts';

/** Marks the file as a store of this program. */
export const applicationId = 0x4f_48_4d_57;

/**
 * Order is always that of the row numbers and of `turn`, never that of the clock. `head`, `turn`, `file` and `removed` of a job
 * change; a revision never does.
 */
const jobsAndRevisions = `
  CREATE TABLE revisions (
    revision INTEGER PRIMARY KEY,
    job TEXT NOT NULL,
    parent INTEGER REFERENCES revisions (revision) CHECK (parent < revision),
    title TEXT NOT NULL,
    parts INTEGER NOT NULL,
    label TEXT NOT NULL,
    at TEXT NOT NULL,
    textDigest BLOB NOT NULL,
    rowDigest BLOB NOT NULL,
    packed BLOB NOT NULL
  ) STRICT;
  CREATE INDEX revisionsOfJob ON revisions (job, revision);
  CREATE INDEX revisionsOfParent ON revisions (parent);
  CREATE TABLE jobs (
    job TEXT PRIMARY KEY,
    head INTEGER NOT NULL REFERENCES revisions (revision),
    turn INTEGER NOT NULL,
    changedAt TEXT NOT NULL,
    file TEXT,
    removed INTEGER NOT NULL DEFAULT 0
  ) STRICT;
`;

const snapshotsAndReadings = `
  CREATE TABLE snapshots (
    revision INTEGER PRIMARY KEY REFERENCES revisions (revision),
    name TEXT NOT NULL
  ) STRICT;
  CREATE TABLE readings (
    entry INTEGER PRIMARY KEY,
    job TEXT NOT NULL REFERENCES jobs (job),
    at TEXT NOT NULL,
    reading TEXT NOT NULL,
    digest BLOB NOT NULL
  ) STRICT;
  CREATE INDEX readingsOfJob ON readings (job, entry);
`;

/** Of a store that did not yet remember it, redo follows the newest child, and above each head the way that leads to it. */
const ownPartsPreferencesVisited = `
  CREATE TABLE ownParts (
    id TEXT PRIMARY KEY,
    label TEXT NOT NULL,
    part TEXT NOT NULL
  ) STRICT;
  CREATE TABLE preferences (
    name TEXT PRIMARY KEY,
    value TEXT NOT NULL
  ) STRICT;
  CREATE TABLE visited (
    parent INTEGER PRIMARY KEY REFERENCES revisions (revision),
    child INTEGER NOT NULL REFERENCES revisions (revision)
  ) STRICT;
  INSERT INTO visited (parent, child)
    SELECT parent, max(revision) FROM revisions WHERE parent IS NOT NULL GROUP BY parent;
  INSERT OR REPLACE INTO visited (parent, child)
    WITH RECURSIVE line (revision, parent) AS (
      SELECT revision, parent FROM revisions WHERE revision IN (SELECT head FROM jobs)
      UNION
      SELECT above.revision, above.parent FROM revisions AS above JOIN line ON above.revision = line.parent
    )
    SELECT parent, revision FROM line WHERE parent IS NOT NULL;
`;

/** Step 0 makes version 1 out of an empty file, and so on. */
const steps: readonly string[] = [jobsAndRevisions, snapshotsAndReadings, ownPartsPreferencesVisited];

export const newestVersion = steps.length;

export function versionOf(driver: Driver): number {
  return Number(driver.prepare('PRAGMA user_version').get()?.['user_version'] ?? 0);
}

/** Walks from the store's version to `until`, whole or not at all. */
export function migrate(driver: Driver, until = newestVersion): void {
  if (versionOf(driver) >= until) return;
  driver.transaction(() => {
    for (let version = versionOf(driver); version < until; version += 1) driver.exec(steps[version] ?? '');
    driver.exec(`PRAGMA user_version = ${String(until)}; PRAGMA application_id = ${String(applicationId)};`);
  });
}
