/** Rules that rest on yes-or-no figures of many parts: what nobody said of them is one question, not a line for each part. */
import type { SinglePart } from '../network/wiring.ts';
import type { WantedField } from './finding.ts';
import type { Judge } from './rule.ts';
import { type Failure, missing, type Tally, wanted } from './tally.ts';
import { field, shortList } from './wording.ts';

/** The one question about all parts of which a figure is not said; nothing where there are none. */
export function askOnce(tally: Tally, unsaid: readonly SinglePart[], name: string, why = ''): void {
  if (unsaid.length === 0) return;
  const words = `${shortList(unsaid.map((part) => field(part, name)))}${why}`;
  tally.judge(
    unsaid.map(({ id }) => id),
    [missing(words, ...unsaid.map((part) => wanted(part, name)))],
  );
}

/** The one question about the site. */
export function askOfSite(tally: Tally, parts: readonly SinglePart[], name: string, words: string): void {
  const asked: WantedField = { part: null, field: `site.${name}` };
  tally.judge(
    parts.map(({ id }) => id),
    [missing(words, asked)],
  );
}

/** True where the chosen practice has a clause on a matter; where there is trade practice only, a bad answer tells but none is asked for. */
export function isAsked({ practice }: Judge, rule: string): boolean {
  const status = practice.clauses.get(rule)?.status;
  return status !== undefined && status !== 'common-practice';
}

/** A failure that is a fact, with no figure to measure. */
export function fact(
  { cases }: { readonly cases: readonly { readonly id: string }[] },
  severity: Failure['severity'],
  message: string,
): Failure {
  return {
    kind: 'fail',
    severity,
    case: cases[0]?.id ?? '',
    measured: { value: 1, unit: '1' },
    limit: { value: 0, unit: '1' },
    excess: Number.POSITIVE_INFINITY,
    message,
  };
}
