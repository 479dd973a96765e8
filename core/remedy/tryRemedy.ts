/** What a finding's remedies would change, found by making each change on a copy of the job and judging it anew. */
import { CheckContext } from '../checks/checkContext.ts';
import type { CheckReport, Finding, NotChecked } from '../checks/finding.ts';
import type { Rule } from '../checks/rule.ts';
import { rules } from '../checks/rules.ts';
import { runRules } from '../checks/runChecks.ts';
import { SEVERITY_ORDER } from '../checks/tally.ts';
import type { Draft } from '../draft/draft.ts';
import { applyEdit } from '../draft/edit.ts';
import type { CheckedJob } from '../job/job.ts';
import { withPractice } from '../job/job.ts';
import type { OperatingPoint } from '../network/answer.ts';
import type { Tables } from '../tables/tables.ts';
import { Bench, type Candidate, EFFORTS, type Ladder } from './candidate.ts';
import { identityOf } from './identity.ts';
import { withKeptParts } from './keptParts.ts';
import { laddersFor } from './laddersFor.ts';
import type { RemedyTrial } from './remedyTrial.ts';

export interface RemedyRequest {
  readonly draft: Draft;
  /** The draft, read. */
  readonly job: CheckedJob;
  readonly tables: Tables;
  readonly finding: Finding;
  readonly report: CheckReport;
  /** The answers that the report was made from, where they are at hand. */
  readonly points?: readonly OperatingPoint[];
}

const MOST_TRIALS = 3;

/**
 * At most three remedies, best first: those that make the finding go and bring no other, then the fewest that come by it, then the
 * least effort. Where none makes it go, the one that brings it nearest to its limit, if any does. Empty where the job has no field
 * for what the remedy asks. Every trial is judged by all rules in all cases; before that, only the rule of the finding is asked.
 */
export function remedyTrials(request: RemedyRequest): readonly RemedyTrial[] {
  const ladders = easiestFirst(laddersFor(new Bench(request)));
  const tester = new Tester(request);
  const going: Tried[] = [];
  const seen = new Set<string>();
  for (const ladder of ladders) {
    // Once there are enough that bring nothing else, what takes more effort is not needed.
    if (going.filter(({ trial }) => isClean(trial)).length >= MOST_TRIALS || seen.size >= MOST_JUDGED) break;
    const candidate = tester.firstThatHelps(ladder);
    if (candidate === undefined || seen.has(candidate.edit.label)) continue;
    seen.add(candidate.edit.label);
    going.push(...tester.judge(candidate).filter(({ trial }) => !trial.stillThere));
  }
  if (going.length === 0) return tester.nearest(ladders);
  going.sort(
    (a, b) =>
      a.trial.arisen.length - b.trial.arisen.length ||
      a.trial.unchecked.length - b.trial.unchecked.length ||
      byEffort(a.candidate, b.candidate),
  );
  return going.slice(0, MOST_TRIALS).map(({ trial }) => trial);
}

/** Candidates that are judged by every rule. */
const MOST_JUDGED = 5;

function isClean({ stillThere, arisen, unchecked }: RemedyTrial): boolean {
  return !stillThere && arisen.length === 0 && unchecked.length === 0;
}

/** Ladders by the effort of their first rung. */
function easiestFirst(ladders: readonly Ladder[]): readonly Ladder[] {
  const list = [...ladders];
  list.sort((a, b) => byEffort(a.rungs[0]!, b.rungs[0]!));
  return list;
}

function byEffort(a: Candidate, b: Candidate): number {
  return EFFORTS.indexOf(a.effort) - EFFORTS.indexOf(b.effort) || a.amount - b.amount;
}

interface Tried {
  readonly candidate: Candidate;
  readonly trial: RemedyTrial;
}

class Tester {
  private readonly request: RemedyRequest;
  private readonly identity: string;
  private readonly rule: Rule | undefined;
  private known: readonly OperatingPoint[] | undefined;

  constructor(request: RemedyRequest) {
    this.request = request;
    this.identity = identityOf(request.finding);
    this.rule = rules.find(({ id }) => id === request.finding.rule);
  }

  /** The lowest rung of a ladder with which the finding's own rule no longer finds it. */
  firstThatHelps({ rungs, rising }: Ladder): Candidate | undefined {
    const start = rising ? this.byHalving(rungs) : 0;
    // What helps in the case that the finding is told for may not yet do in another.
    return start === undefined ? undefined : rungs.slice(start).find((rung) => this.helps(rung));
  }

  /** The lowest rung that helps in the finding's own case, of a ladder on which every higher one then does. */
  private byHalving(rungs: readonly Candidate[]): number | undefined {
    const here = this.rule?.reads === 'drawing' ? undefined : this.request.finding.case;
    let [low, high] = [0, rungs.length - 1];
    if (high < 0 || !this.helps(rungs[high]!, here)) return undefined;
    while (low < high) {
      const middle = Math.floor((low + high) / 2);
      if (this.helps(rungs[middle]!, here)) high = middle;
      else low = middle + 1;
    }
    return low;
  }

  /** Judges the changed job by every rule. */
  judge(candidate: Candidate): readonly Tried[] {
    const job = this.changed(candidate);
    if (job === undefined) return [];
    const { finding, report, tables } = this.request;
    const context = new CheckContext({ job, tables, points: this.pointsFor(candidate) });
    const isSettled = (rule: string) => candidate.sameAnswers === true && !READS_RATINGS.has(rule);
    const judged = runRules(
      context,
      rules.filter(({ id }) => !isSettled(id)),
    );
    const after = {
      findings: [...judged.findings, ...report.findings.filter(({ rule }) => isSettled(rule))],
      notChecked: [...judged.notChecked, ...report.notChecked.filter(({ rule }) => isSettled(rule))],
    };
    const before = new Map(report.findings.map((one) => [identityOf(one), one]));
    const now = new Map(after.findings.map((one) => [identityOf(one), one]));
    const same = now.get(this.identity);
    const gone = report.findings.filter((one) => !now.has(identityOf(one)));
    gone.sort((a, b) => Number(identityOf(b) === this.identity) - Number(identityOf(a) === this.identity));
    const trial: RemedyTrial = {
      edit: candidate.edit,
      label: candidate.edit.label,
      before: { measured: finding.measured, limit: finding.limit },
      after: { measured: same?.measured ?? null, limit: same?.limit ?? finding.limit },
      gone,
      arisen: after.findings.filter((one) => isWorse(one, before.get(identityOf(one)))),
      stillThere: same !== undefined,
      unchecked: newGaps(report, after),
      cost: candidate.cost,
    };
    return [{ candidate, trial }];
  }

  /** Where nothing makes the finding go: the largest change of each kind, and of these the one that helps most. */
  nearest(ladders: readonly Ladder[]): readonly RemedyTrial[] {
    const tried = ladders
      .flatMap(({ rungs }) => rungs.at(-1) ?? [])
      .slice(0, MOST_TRIALS)
      .flatMap((candidate) => this.judge(candidate))
      .map(({ trial }) => ({ trial, excess: excessOf(trial.after.measured, trial.after.limit) }))
      .filter(({ trial, excess }) => excess < excessOf(trial.before.measured, trial.before.limit) * NOTICEABLE);
    tried.sort((a, b) => a.excess - b.excess);
    return tried.slice(0, 1).map(({ trial }) => trial);
  }

  /** Asks the finding's own rule alone: in all cases, or in one of the job's. */
  private helps(candidate: Candidate, caseId?: string): boolean {
    const job = this.changed(candidate);
    const { rule } = this;
    if (job === undefined || rule === undefined) return false;
    const one = job.cases.filter(({ id }) => id === caseId);
    const cases = one.length === 0 ? job.cases : one;
    const outcome = rule.run(
      new CheckContext({ job, tables: this.request.tables, cases, points: this.pointsToAsk(candidate) }),
    );
    return !outcome.findings.some(({ finding }) => identityOf(finding) === this.identity);
  }

  /** The job after the change; `undefined` where the change cannot be made. */
  private changed({ edit }: Candidate): CheckedJob | undefined {
    const { draft, tables, job } = this.request;
    const edited = applyEdit(draft, edit, tables);
    if (!edited.ok || edited.value.draft === draft) return undefined;
    const after = withKeptParts({ draft, job }, edited.value);
    return after.practice === job.practice ? after : withPractice(after, job.practice);
  }

  /** The answers that hold after a change as before it. */
  private pointsFor({ sameAnswers }: Candidate): readonly OperatingPoint[] {
    return sameAnswers === true ? this.points : [];
  }

  /** A rule that reads no volt and no ampere needs no new answers to be asked; the judgement at the end has them. */
  private pointsToAsk(candidate: Candidate): readonly OperatingPoint[] {
    return READS_NO_ANSWERS.has(this.request.finding.rule) ? this.points : this.pointsFor(candidate);
  }

  /** The answers before any change, as the report was made from them. */
  private get points(): readonly OperatingPoint[] {
    this.known ??= this.request.points ?? this.request.job.cases.map((one) => new Bench(this.request).solve(one));
    return this.known;
  }
}

/**
 * Strings joined rush through their fuses; the fuse of an inverter and of an array string; how long a bond carries a fault; and what is
 * fitted where batteries stand, which changes no volt and no ampere.
 */
const ALSO_READ_RATINGS: ReadonlySet<string> = new Set([
  'joining-surge',
  'inverter-cable',
  'pv-string-fuse',
  'bond-too-small',
  'gas-no-vent',
  'spark-near-gas',
  'battery-loose',
  'spring-or-crocodile-clip',
  'bare-live-stud',
]);

/** Rules in which a rating of a device, switch, bar or diode has a say; the others judge volts and amperes alone. */
const READS_RATINGS: ReadonlySet<string> = new Set(
  rules
    .filter(({ id, family }) => family === 'fuse' || family === 'rating' || ALSO_READ_RATINGS.has(id))
    .map(({ id }) => id),
);

/** Rules that judge the drawing and the settings alone. */
const READS_NO_ANSWERS: ReadonlySet<string> = new Set([
  'fuse-over-cable',
  'small-wire-cap',
  'charger-volts-off',
  'cold-charge',
  'charge-too-strong',
  'no-fuse-on-source',
  'fuse-over-device-limit',
  'wrong-metal-or-solid',
  'bond-too-small',
  'big-bank-needs-more',
  'pv-volts-cold',
  'pv-volts-hot',
  'controller-amps',
  'pv-cable-156',
  'pv-string-fuse',
  'pv-wrong-way',
  'inverter-cable',
]);

/** A change of less than this is not worth showing. */
const NOTICEABLE = 0.99;

/** How far beyond its limit, whichever side of it is wrong. */
function excessOf(measured: { readonly value: number } | null, limit: { readonly value: number }): number {
  if (measured === null) return 0;
  const [a, b] = [Math.abs(measured.value), Math.abs(limit.value)];
  return a === 0 || b === 0 ? Number.POSITIVE_INFINITY : Math.max(a / b, b / a);
}

/** What could be checked before and cannot now. */
type Gaps = Pick<CheckReport, 'notChecked'>;

function newGaps(before: Gaps, after: Gaps): readonly NotChecked[] {
  const key = ({ rule, parts, missing }: NotChecked) => JSON.stringify([rule, parts, missing]);
  const known = new Set(before.notChecked.map(key));
  return after.notChecked.filter((row) => !known.has(key(row)));
}

/** New, or of a graver kind than before. */
function isWorse(now: Finding, before: Finding | undefined): boolean {
  if (before === undefined) return true;
  return SEVERITY_ORDER.indexOf(now.severity) < SEVERITY_ORDER.indexOf(before.severity);
}
