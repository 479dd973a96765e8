import type { CheckReport } from '../checks/finding.ts';
import type { ProtectionFigures } from '../checks/protectionFigures.ts';
import type { CheckedJob } from '../job/job.ts';
import type { OperatingPoint } from '../network/answer.ts';
import type { StringsStudy } from '../strings/study.ts';
import type { Tables } from '../tables/tables.ts';
import type { Paper } from './document.ts';

export interface ReportOptions {
  /** Default A4. */
  readonly paper?: Paper;
  /** The date as the host writes it, best as `2025-03-31`; core has no clock. */
  readonly preparedOn?: string;
  readonly programVersion: string;
}

/** Everything that a report is made from: results only, nothing is solved here. */
export interface ReportInput {
  readonly job: CheckedJob;
  readonly tables: Tables;
  readonly points: readonly OperatingPoint[];
  readonly checkReport: CheckReport;
  /** Where the job has strings to speak of. */
  readonly strings?: StringsStudy | undefined;
  /** Where the job has something that a short circuit could come from. */
  readonly protection?: ProtectionFigures | undefined;
  readonly options: ReportOptions;
}
