/** The findings of one job under two rule books, side by side. */
import type { CheckReport, Finding } from '../checks/finding.ts';
import { SEVERITY_ORDER } from '../checks/tally.ts';
import { identityOf } from './identity.ts';

export interface FindingPair {
  readonly key: string;
  /** Null where the book has no such finding. */
  readonly own: Finding | null;
  readonly other: Finding | null;
}

export interface ComparedPractices {
  /** One book says nothing, another severity, another limit, or measures otherwise; worst first. */
  readonly apart: readonly FindingPair[];
  readonly alike: readonly FindingPair[];
}

/** Pairs by `identityOf`: by what is judged and of which parts; clauses always differ between books and tell nothing apart. */
export function comparePractices(own: CheckReport, other: CheckReport): ComparedPractices {
  const others = new Map(listed(other.findings).map(({ key, finding }) => [key, finding]));
  const owns = listed(own.findings);
  const known = new Set(owns.map(({ key }) => key));
  const pairs: readonly FindingPair[] = [
    ...owns.map(({ key, finding }) => ({ key, own: finding, other: others.get(key) ?? null })),
    ...[...others].flatMap(([key, finding]) => (known.has(key) ? [] : [{ key, own: null, other: finding }])),
  ];
  const sorted = [...pairs];
  sorted.sort((a, b) => rank(a) - rank(b));
  return { apart: sorted.filter(isApart), alike: sorted.filter((pair) => !isApart(pair)) };
}

/** Findings with names of their own: a second of the same identity gets a number. */
function listed(findings: readonly Finding[]): readonly { readonly key: string; readonly finding: Finding }[] {
  const seen = new Map<string, number>();
  return findings.map((finding) => {
    const identity = identityOf(finding);
    const count = (seen.get(identity) ?? 0) + 1;
    seen.set(identity, count);
    return { key: count === 1 ? identity : `${identity} #${String(count)}`, finding };
  });
}

function rank({ own, other }: FindingPair): number {
  const of = (finding: Finding | null): number =>
    finding === null ? SEVERITY_ORDER.length : SEVERITY_ORDER.indexOf(finding.severity);
  return Math.min(of(own), of(other));
}

/** Figures that differ only by rounding are the same. */
const SAME = 1e-9;

function isApart({ own, other }: FindingPair): boolean {
  if (own === null || other === null) return true;
  if (own.severity !== other.severity) return true;
  return differs(own.limit.value, other.limit.value) || differs(own.measured.value, other.measured.value);
}

function differs(a: number, b: number): boolean {
  return a !== b && !(Math.abs(a - b) <= SAME * Math.max(Math.abs(a), Math.abs(b)));
}
