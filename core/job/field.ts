/** What a field of a job may hold, as data, and how that is said in words. */
import { quoted } from '../units/parsed.ts';
import { describeUnit, type UnitName, unitKinds } from '../units/unitName.ts';
import type { IssueList } from './issueList.ts';

/** Bounds of a number; `above` and `below` are not themselves allowed. */
export interface Bounds {
  readonly atLeast?: number;
  readonly above?: number;
  readonly atMost?: number;
  readonly below?: number;
}

export type Rule =
  | ({ readonly holds: 'quantity'; readonly unit: UnitName } & Bounds)
  | ({ readonly holds: 'count' } & Bounds)
  | { readonly holds: 'text'; readonly longest: number }
  | { readonly holds: 'choice'; readonly of: readonly string[] }
  | { readonly holds: 'flag' }
  | { readonly holds: 'junction' }
  | { readonly holds: 'poles' }
  | { readonly holds: 'junction-list' }
  | { readonly holds: 'size' }
  | { readonly holds: 'point' }
  | { readonly holds: 'efficiency' }
  /** Points `[currentA, meltS, clearS]` of a fuse or breaker, by rising current. */
  | { readonly holds: 'curve' }
  /** One number for each of `length` steps; with `orSame` a single number stands for all of them. */
  | ({ readonly holds: 'numbers'; readonly length: number; readonly orSame?: true; readonly unit: UnitName } & Bounds)
  /** Left to whoever reads the object around it. */
  | { readonly holds: 'anything' };

export interface Field {
  readonly rule: Rule;
  readonly required?: true;
  /** Contract default of a field that is not given. */
  readonly standard?: number | string | boolean;
}

export type Fields = Readonly<Record<string, Field>>;

/** Where an object stands in the job, and how it is called in a sentence (`cable C1`). */
export interface Place {
  readonly issues: IssueList;
  readonly path: string;
  readonly owner: string;
}

/** An object of the file before checking. Only own fields count. */
export type RawObject = Readonly<Record<string, unknown>>;

/** True for an object with named fields, as JSON has them. */
export function isRawObject(value: unknown): value is RawObject {
  return typeof value === 'object' && value !== null && !Array.isArray(value);
}

/** The value as given, `undefined` where the object has no such field of its own. */
export function own(raw: RawObject, field: string): unknown {
  return Object.hasOwn(raw, field) ? raw[field] : undefined;
}

/** A value of the file in a few words, for a message. */
export function described(value: unknown): string {
  if (typeof value === 'string') return quoted(value);
  if (Array.isArray(value)) return `a list of ${String(value.length)}`;
  if (value === null) return 'null';
  switch (typeof value) {
    case 'number':
    case 'boolean':
      return String(value);
    case 'object':
      return 'an object';
    default:
      return `a ${typeof value}`;
  }
}

/** What a field may hold, in words. */
export function expectation(rule: Rule): string {
  switch (rule.holds) {
    case 'quantity':
      if (rule.unit === '1' || rule.unit === '1/K') return describeUnit(rule.unit);
      return `${unitKinds[rule.unit].noun}, a number in ${rule.unit} or a text such as ${unitKinds[rule.unit].example}`;
    case 'count':
      return 'a whole number';
    case 'numbers':
      return `a list of ${String(rule.length)} numbers${rule.orSame === true ? ' or one number' : ''}`;
    case 'efficiency':
      return 'a number from 0 to 1, or a list of points [fraction of rated output, efficiency]';
    case 'curve':
      return 'a list of points [current in A, melting time in s, clearing time in s]';
    case 'flag':
      return 'true or false';
    case 'choice':
      return `one of ${rule.of.join(', ')}`;
    case 'size':
      return 'a conductor size such as "35 mm2", "2/0 AWG", "250 kcmil", "6 SAE" or "6 auto"';
    case 'text':
      return 'a text';
    case 'junction':
      return 'the name of a junction';
    case 'poles':
      return 'an object { "plus": junction, "minus": junction }';
    case 'junction-list':
      return 'a list of two or more junctions in order along the bar';
    case 'point':
      return 'an object { "x": number, "y": number }';
    case 'anything':
      return 'a value';
  }
}
