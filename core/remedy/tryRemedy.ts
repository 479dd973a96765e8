/** What a finding's remedies would change, found by making each change on a copy of the job and judging it anew. */
import { CheckContext } from '../checks/checkContext.ts';
import type { CheckReport, Finding, NotChecked } from '../checks/finding.ts';
import { rules } from '../checks/rules.ts';
import { runChecks } from '../checks/runChecks.ts';
import { SEVERITY_ORDER } from '../checks/tally.ts';
import type { Draft } from '../draft/draft.ts';
import { applyEdit } from '../draft/edit.ts';
import type { CheckedJob } from '../job/job.ts';
import { withPractice } from '../job/job.ts';
import type { OperatingPoint } from '../network/answer.ts';
import type { Tables } from '../tables/tables.ts';
import { Bench, type Candidate, EFFORTS, type Ladder } from './candidate.ts';
import { identityOf } from './identity.ts';
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
  const bench = new Bench(request);
  const tester = new Tester(request);
  const chosen = laddersFor(bench).flatMap((ladder) => tester.firstThatHelps(ladder) ?? []);
  // One field is changed by one remedy only: the smallest change of it that helps.
  const tried = cheapest(chosen).slice(0, MOST_JUDGED).flatMap((candidate) => tester.judge(candidate));
  const going = tried.filter(({ trial }) => !trial.stillThere);
  if (going.length === 0) return tester.nearest(bench);
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

function cheapest(candidates: readonly Candidate[]): readonly Candidate[] {
  const byLabel = new Map(candidates.map((candidate) => [candidate.edit.label, candidate]));
  const list = [...byLabel.values()];
  list.sort(byEffort);
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

  constructor(request: RemedyRequest) {
    this.request = request;
    this.identity = identityOf(request.finding);
  }

  /** The lowest rung of a ladder with which the finding's own rule no longer finds it. */
  firstThatHelps({ rungs, rising }: Ladder): Candidate | undefined {
    if (!rising) return rungs.find((rung) => this.helps(rung));
    let [low, high] = [0, rungs.length - 1];
    if (high < 0 || !this.helps(rungs[high]!)) return undefined;
    while (low < high) {
      const middle = Math.floor((low + high) / 2);
      if (this.helps(rungs[middle]!)) high = middle;
      else low = middle + 1;
    }
    return rungs[low];
  }

  /** Judges the changed job by every rule. */
  judge(candidate: Candidate): readonly Tried[] {
    const job = this.changed(candidate);
    if (job === undefined) return [];
    const { finding, report, tables } = this.request;
    const after = runChecks({ job, tables });
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
  nearest(bench: Bench): readonly RemedyTrial[] {
    const largest = laddersFor(bench).flatMap(({ rungs }) => rungs.at(-1) ?? []);
    const tried = cheapest(largest)
      .slice(0, MOST_TRIALS)
      .flatMap((candidate) => this.judge(candidate))
      .map(({ trial }) => ({ trial, excess: excessOf(trial.after.measured, trial.after.limit) }))
      .filter(({ trial, excess }) => excess < excessOf(trial.before.measured, trial.before.limit) * NOTICEABLE);
    tried.sort((a, b) => a.excess - b.excess);
    return tried.slice(0, 1).map(({ trial }) => trial);
  }

  private helps(candidate: Candidate): boolean {
    const job = this.changed(candidate);
    const rule = rules.find(({ id }) => id === this.request.finding.rule);
    if (job === undefined || rule === undefined) return false;
    const outcome = rule.run(new CheckContext({ job, tables: this.request.tables }));
    return !outcome.findings.some(({ finding }) => identityOf(finding) === this.identity);
  }

  /** The job after the change; `undefined` where the change cannot be made. */
  private changed({ edit }: Candidate): CheckedJob | undefined {
    const { draft, tables, job } = this.request;
    const edited = applyEdit(draft, edit, tables);
    if (!edited.ok || edited.value.draft === draft) return undefined;
    return edited.value.job.practice === job.practice ? edited.value.job : withPractice(edited.value.job, job.practice);
  }
}

/** A change of less than this is not worth showing. */
const NOTICEABLE = 0.99;

/** How far beyond its limit, whichever side of it is wrong. */
function excessOf(measured: { readonly value: number } | null, limit: { readonly value: number }): number {
  if (measured === null) return 0;
  const [a, b] = [Math.abs(measured.value), Math.abs(limit.value)];
  return a === 0 || b === 0 ? Number.POSITIVE_INFINITY : Math.max(a / b, b / a);
}

/** What could be checked before and cannot now. */
function newGaps(before: CheckReport, after: CheckReport): readonly NotChecked[] {
  const key = ({ rule, parts, missing }: NotChecked) => JSON.stringify([rule, parts, missing]);
  const known = new Set(before.notChecked.map(key));
  return after.notChecked.filter((row) => !known.has(key(row)));
}

/** New, or of a graver kind than before. */
function isWorse(now: Finding, before: Finding | undefined): boolean {
  if (before === undefined) return true;
  return SEVERITY_ORDER.indexOf(now.severity) < SEVERITY_ORDER.indexOf(before.severity);
}
