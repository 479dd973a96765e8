/** Gathers a rule's verdicts: of all cases the worst is reported, a missing figure is never a pass. */
import type { CablePart, PartId } from '../job/part.ts';
import type { SinglePart } from '../network/wiring.ts';
import type { Basis, Status } from '../tables/status.ts';
import type { Measure, Severity, WantedField } from './finding.ts';
import type { NotJudged, RankedFinding, Rule, RuleOutcome } from './rule.ts';
import { field } from './wording.ts';

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
interface Missing {
  readonly kind: 'missing';
  readonly missing: string;
  readonly fields: readonly WantedField[];
}
export type Verdict =
  | { readonly kind: 'pass' }
  /** Another rule tells the matter: neither a pass nor a finding here. */
  | { readonly kind: 'elsewhere' }
  | Missing
  | Failure;

export const PASS: Verdict = { kind: 'pass' };
export const ELSEWHERE: Verdict = { kind: 'elsewhere' };
/** What is missing, in words, and the fields that would settle it. */
export function missing(what: string, ...fields: readonly WantedField[]): Verdict {
  return { kind: 'missing', missing: what, fields };
}
/** A field of a part that is not given; `why` follows it. */
export function missingField(part: SinglePart, name: string, why = ''): Verdict {
  return missing(`${field(part, name)}${why}`, wanted(part, name));
}
/** A field of the job itself that is not given. */
export const NOMINAL_VOLTS: WantedField = { part: null, field: 'settings.nominalV' };

/** The size of a cable that has none: what its ampacity wants. A size that no table knows is no missing field. */
export function sizeWanted(cable: CablePart): readonly WantedField[] {
  return cable.size === undefined ? [wanted(cable, 'size')] : [];
}

export function wanted(part: Pick<SinglePart, 'id'>, name: string): WantedField {
  return { part: part.id, field: name };
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
    const gaps = new Map(
      verdicts.flatMap((verdict) => (verdict.kind === 'missing' ? [[verdict.missing, verdict] as const] : [])),
    );
    for (const { missing: gap, fields } of gaps.values()) {
      this.notChecked.push({ parts, missing: gap, ...(fields.length === 0 ? {} : { fields }) });
    }
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

/** Verdicts about groups of parts (the strings of a bank) as they come, case by case; each group is then judged once. */
export class GroupVerdicts {
  private readonly groups = new Map<string, { readonly ids: readonly PartId[]; readonly found: Verdict[] }>();

  /** No verdict: the rule has nothing to say about the group in this case. */
  add(ids: readonly PartId[], verdict: Verdict | undefined): void {
    if (verdict === undefined) return;
    const key = ids.join(' ');
    const group = this.groups.get(key) ?? { ids, found: [] };
    group.found.push(verdict);
    this.groups.set(key, group);
  }

  outcome(rule: Pick<Rule, 'id' | 'remedy'>, basis: Basis): RuleOutcome {
    const tally = new Tally(rule, basis);
    for (const { ids, found } of this.groups.values()) tally.judge(ids, found);
    return tally.outcome();
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
