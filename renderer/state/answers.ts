/** What the engine last answered about the open job: every operating case and the findings. */
import type { CheckedJob, CheckReport, OperatingPoint } from '../../core/api.ts';

export interface Answers {
  /** The edit that these answers belong to; lower than the open job's where newer ones are on their way. */
  readonly generation: number;
  readonly job: CheckedJob;
  /** By case id; `at-rest` is always among them. */
  readonly points: ReadonlyMap<string, OperatingPoint>;
  readonly report: CheckReport;
  /** How long the engine took, ms. */
  readonly ms: { readonly read: number; readonly solve: number; readonly check: number };
}
