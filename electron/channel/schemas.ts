/** What each message to a host must look like. Types hold these schemas and the contract together, field by field. */
import { z } from 'zod';
import { largestTextLength, type Practice } from '../../core/api.ts';
import type { HostAsk, HostMethod, ListKind } from '../../core/host.ts';
import { preferenceChoices } from '../services/preferences.ts';

/** Every field of every ask has a schema, those that may be left out too. */
type Shapes = {
  readonly [M in HostMethod]: { readonly [F in keyof HostAsk<M>]-?: z.ZodType<HostAsk<M>[F]> };
};

const practices = ['us-land', 'us-marine', 'iso-marine', 'iec-land'] as const satisfies readonly Practice[];
const lists = ['cables', 'fuses', 'parts'] as const satisfies readonly ListKind[];

/** Longest JSON text of one reading or one own part. */
const largestRecord = 64 * 1024;

const job = z.string().min(1).max(100);
const revision = z.int().min(1);
const text = z.string().max(largestTextLength);
const label = z.string().max(1000);
const most = z.int().min(1).max(10_000);
const record = z.record(z.string().max(200), z.unknown()).refine(isSmallJson, {
  message: `must be plain JSON of at most ${String(largestRecord)} characters`,
});
const pdf = {
  text,
  paper: z.enum(preferenceChoices.paper),
  preparedOn: z.string().regex(/^\d{4}-\d{2}-\d{2}$/, { message: 'must be a day as 2025-03-31' }),
  practice: z.enum(practices).optional(),
};

const shapes = {
  'host.about': {},
  'host.end': {},
  'jobs.list': {},
  'jobs.create': { text, label, file: z.string().min(1).max(1000).optional() },
  'jobs.open': { job },
  'jobs.keep': { job, after: revision, text, label },
  'jobs.go': { job, from: revision, to: revision },
  'jobs.history': { job, before: revision.optional(), most },
  'jobs.line': { job, most },
  'jobs.revision': { job, revision },
  'jobs.snapshot': { job, revision, name: z.string().max(200) },
  'jobs.remove': { job },
  'jobs.restore': { job },
  'files.open': {},
  'files.saveJob': { job, revision, where: z.enum(['known', 'ask']) },
  'files.show': { path: z.string().min(1).max(4096) },
  'reports.pdf': pdf,
  'reports.save': pdf,
  'lists.csv': { text, list: z.enum(lists) },
  'library.list': {},
  'library.keep': { id: z.string().min(1).max(100), label: z.string().max(200), part: record },
  'library.remove': { id: z.string().min(1).max(100) },
  'preferences.read': {},
  'preferences.change': {
    theme: z.enum(preferenceChoices.theme).optional(),
    paper: z.enum(preferenceChoices.paper).optional(),
    units: z.enum(preferenceChoices.units).optional(),
    textPercent: z.literal(preferenceChoices.textPercent).optional(),
    motion: z.enum(preferenceChoices.motion).optional(),
  },
  'readings.add': { job, reading: record },
  'readings.list': { job },
} satisfies Shapes;

/** The schema of each method's ask; a field too many is refused like a field too few. */
export const schemas: ReadonlyMap<string, z.ZodType> = new Map(
  Object.entries(shapes).map(([method, shape]) => [method, z.strictObject(shape)]),
);

function isSmallJson(value: unknown): boolean {
  try {
    return JSON.stringify(value).length <= largestRecord;
  } catch {
    return false; // goes round in a circle, or holds what JSON has no word for
  }
}
