/** Gathers a rule's verdicts: of all cases the worst is reported, a missing figure is never a pass. */
import type { PartId } from '../job/part.ts';
import type { Basis, Status } from '../tables/status.ts';
import type { Measure, Severity } from './finding.ts';
import type { NotJudged, RankedFinding, Rule, RuleOutcome } from './rule.ts';

/** Rounding slack of every comparison, as a fraction: a figure exactly at its limit passes, also after a solve. */
const ROUNDING = 1e-9;

/** True when `value` is beyond `limit`; exactly at the limit is within it. */
export function isOver(value: number, limit: number): boolean {
  return value > limit + ROUNDING * Math.max(Math.abs(value), Math.abs(limit));
}
/** True when `value` falls short of `limit`; exactly at the limit is enough. */
export function isUnder(value: number, limit: number): boolean {
  return isOver(limit, value);
}

/** Worst first. */
export const SEVERITY_ORDER: readonly Severity[] = ['stop', 'fix', 'look', 'note'];

export interface Failure {
  readonly kind: 'fail';
  readonly severity: Severity;
  readonly case: string;
  readonly measured: Measure;
  readonly limit: Measure;
  /** How far beyond the limit, as a ratio of at least 1; `Infinity` where the limit is nothing at all. */
  readonly excess: number;
  /** A function where the sentence takes work to find: it is asked of the worst verdict only. */
  readonly message: string | (() => string);
  /** Instead of the rule's own remedy. */
  readonly remedy?: string;
  /** Instead of the rule's own basis. */
  readonly basis?: { readonly text: string; readonly status: Status };
  /** Parts beside the judged ones that the finding is about. */
  readonly others?: readonly PartId[];
}
export type Verdict =
  | { readonly kind: 'pass' }
  /** Another rule tells the matter: neither a pass nor a finding here. */
  | { readonly kind: 'elsewhere' }
  | { readonly kind: 'missing'; readonly missing: string }
  | Failure;

export const PASS: Verdict = { kind: 'pass' };
export const ELSEWHERE: Verdict = { kind: 'elsewhere' };
export function missing(what: string): Verdict {
  return { kind: 'missing', missing: what };
}

export class Tally {
  private readonly rule: Pick<Rule, 'id' | 'remedy'>;
  private readonly basis: Basis;
  private readonly findings: RankedFinding[] = [];
  private readonly notChecked: NotJudged[] = [];
  private passed = 0;

  constructor(rule: Pick<Rule, 'id' | 'remedy'>, basis: Basis) {
    this.rule = rule;
    this.basis = basis;
  }

  /**
   * Adds one part's verdicts over all cases. Any failure: the worst one is a finding. Else anything missing: not done, with
   * each missing figure once. Else any pass: passed. No verdict at all: the rule does not apply to the part.
   */
  judge(parts: readonly PartId[], verdicts: readonly Verdict[]): void {
    const worst = worstOf(verdicts);
    if (worst !== undefined) {
      this.findings.push(this.findingOf(parts, worst));
      return;
    }
    if (verdicts.length === 0) return;
    if (verdicts.every(({ kind }) => kind === 'pass')) {
      this.passed++;
      return;
    }
    const gaps = new Set(verdicts.flatMap((verdict) => (verdict.kind === 'missing' ? [verdict.missing] : [])));
    for (const gap of gaps) this.notChecked.push({ parts, missing: gap });
  }

  outcome(): RuleOutcome {
    return { findings: this.findings, notChecked: this.notChecked, passed: this.passed };
  }

  private findingOf(parts: readonly PartId[], failure: Failure): RankedFinding {
    const { severity, measured, limit, message, excess } = failure;
    const basis = failure.basis ?? this.basis;
    return {
      finding: {
        rule: this.rule.id,
        severity,
        parts: [...new Set([...parts, ...(failure.others ?? [])])],
        case: failure.case,
        measured,
        limit,
        message: typeof message === 'string' ? message : message(),
        remedy: failure.remedy ?? this.rule.remedy,
        basis: basis.text,
        basisStatus: basis.status,
      },
      excess: ranked(excess),
    };
  }
}

/** An excess to six figures: rounding in a solve must not decide an order. */
function ranked(excess: number): number {
  return Number.isFinite(excess) ? Number(excess.toPrecision(6)) : excess;
}

function worstOf(verdicts: readonly Verdict[]): Failure | undefined {
  let worst: Failure | undefined;
  for (const verdict of verdicts) {
    if (verdict.kind === 'fail' && (worst === undefined || isWorse(verdict, worst))) worst = verdict;
  }
  return worst;
}

function isWorse(a: Failure, b: Failure): boolean {
  const rank = SEVERITY_ORDER.indexOf(a.severity) - SEVERITY_ORDER.indexOf(b.severity);
  return rank < 0 || (rank === 0 && ranked(a.excess) > ranked(b.excess));
}
