/** Jobs: made, opened, kept, undone, named. */
import type { KeepRequest } from '../store/jobShelf.ts';
import { type Bench, checkedJob } from './bench.ts';
import { bareName } from './fileName.ts';
import type { Doing } from './services.ts';

/** A text as it is kept, with what its reader found in it; throws a `Refused` with its issues where it cannot be read. */
export function keepable(text: string, label: string): KeepRequest {
  const { title, parts } = checkedJob(text);
  return { text, title, parts: parts.length, label };
}

type JobMethods =
  | 'jobs.list'
  | 'jobs.create'
  | 'jobs.open'
  | 'jobs.keep'
  | 'jobs.go'
  | 'jobs.history'
  | 'jobs.line'
  | 'jobs.revision'
  | 'jobs.snapshot'
  | 'jobs.remove'
  | 'jobs.restore';

export function jobServices({ store: { jobs }, tell }: Bench): { readonly [M in JobMethods]: Doing<M> } {
  return {
    'jobs.list': () => jobs.list(),
    'jobs.create': ({ text, label, file }, { window }) => {
      // A page knows the name of a file at most; where a job lies is for the host to say.
      const kept = jobs.create({ ...keepable(text, label), file: file === undefined ? undefined : bareName(file) });
      tell({ event: 'job-changed', job: kept.job, head: kept.head, by: window });
      return kept;
    },
    'jobs.open': ({ job }) => jobs.open(job),
    'jobs.keep': ({ job, after, text, label }, { window }) => {
      const kept = jobs.keep(job, after, keepable(text, label));
      tell({ event: 'job-changed', job, head: kept.head, by: window });
      return kept;
    },
    'jobs.go': ({ job, from, to }, { window }) => {
      const kept = jobs.go(job, from, to);
      tell({ event: 'job-changed', job, head: kept.head, by: window });
      return kept;
    },
    'jobs.history': ({ job, before, most }) => ({
      head: jobs.head(job),
      revisions: jobs.history(job, most, before),
    }),
    'jobs.line': ({ job, most }) => ({ head: jobs.head(job), line: jobs.line(job, most) }),
    'jobs.revision': ({ job, revision }) => jobs.revision(job, revision),
    'jobs.snapshot': ({ job, revision, name }) => jobs.snapshot(job, revision, name.trim()),
    'jobs.remove': ({ job }) => {
      jobs.remove(job);
      return null;
    },
    'jobs.restore': ({ job }) => jobs.restore(job),
  };
}
