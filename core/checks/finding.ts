/** An engineering verdict, and what could not be judged. */
import type { PartId } from '../job/part.ts';
import type { Status } from '../tables/status.ts';

/** `stop`: do not energise; `fix`: outside the chosen practice; `look`: needs a person's judgement; `note`: information. */
export type Severity = 'stop' | 'fix' | 'look' | 'note';

export interface Measure {
  readonly value: number;
  /** `A`, `V`, `W`, `ohm`, `1` (a fraction) … */
  readonly unit: string;
}

export interface Finding {
  readonly rule: string;
  readonly severity: Severity;
  readonly parts: readonly PartId[];
  readonly case: string;
  readonly measured: Measure;
  readonly limit: Measure;
  /** What is the matter, one sentence with the figures in it. */
  readonly message: string;
  /** What to do, one plain sentence. */
  readonly remedy: string;
  /** Source, clause and edition, as printed. */
  readonly basis: string;
  readonly basisStatus: Status;
}

/** A figure that a check wants: a field of a part, or (with no part) of the job itself, as `practice` or `settings.nominalV`. */
export interface WantedField {
  readonly part: PartId | null;
  readonly field: string;
}

/** A check that could not be made for want of a figure: never counted as passed. */
export interface NotChecked {
  readonly rule: string;
  readonly parts: readonly PartId[];
  /** What is missing, in words a person can act on, e.g. `ratingV of fuse F3`. */
  readonly missing: string;
  /** The fields that would settle it, where there are any; a cable of an out-and-back run by its own id. */
  readonly fields?: readonly WantedField[];
}

export interface Passed {
  readonly rule: string;
  readonly count: number;
}

export interface CheckReport {
  readonly findings: readonly Finding[];
  readonly notChecked: readonly NotChecked[];
  readonly passed: readonly Passed[];
}
