/** What a rule is: one question about a job, what it compares, and how it answers. */
import type { CheckedJob } from '../job/job.ts';
import type { PartId } from '../job/part.ts';
import type { SinglePart } from '../network/wiring.ts';
import type { PracticeTable } from '../tables/practiceTable.ts';
import type { Basis } from '../tables/status.ts';
import type { Tables } from '../tables/tables.ts';
import type { CheckContext } from './checkContext.ts';
import type { Finding, WantedField } from './finding.ts';

/** What a rule is about; rules of one family stand in one file or a few. */
export type RuleFamily =
  | 'wiring'
  | 'cable'
  | 'fuse'
  | 'rating'
  | 'voltage'
  | 'battery'
  | 'strings'
  | 'charging'
  | 'solar';

/** Which book judges: a practice's own table, the tables it stands in, and the job's settings. */
export interface Judge {
  readonly job: CheckedJob;
  readonly tables: Tables;
  readonly practice: PracticeTable;
}

export interface Rule {
  /** In plain words joined by hyphens; kept for good, since lists and tests name it. */
  readonly id: string;
  readonly family: RuleFamily;
  readonly title: string;
  /** What is compared with what, in words; printed beside passes, so that a pass can be understood. */
  readonly compares: string;
  /** Kinds of part that it judges; it says nothing about a job that has none of them. */
  readonly kinds: readonly SinglePart['kind'][];
  /** What to do when it fails, one plain sentence. */
  readonly remedy: string;
  /** True when the answer depends on the chosen practice: such a rule is not done for a job that names none. */
  readonly byPractice: boolean;
  /**
   * What it judges: the drawing alone; the operating points of the cases without a starting load (what warms up); or of every
   * case. A rule is not done for a case that it should read and that has no operating point.
   */
  readonly reads: 'drawing' | 'steady-cases' | 'every-case';
  /** Clause and edition that the rule rests on in this job; a finding may add to it. */
  basisFor(judge: Judge): Basis;
  run(context: CheckContext): RuleOutcome;
}

/** A finding with how far beyond its limit it is (1 = at the limit), by which findings are ranked. */
export interface RankedFinding {
  readonly finding: Finding;
  readonly excess: number;
}

export interface NotJudged {
  readonly parts: readonly PartId[];
  readonly missing: string;
  readonly fields?: readonly WantedField[];
}

export interface RuleOutcome {
  readonly findings: readonly RankedFinding[];
  readonly notChecked: readonly NotJudged[];
  /** Parts (or groups of parts) judged in every solved case and found within the limit. */
  readonly passed: number;
}
