/** What the page and the report worker say to each other. */
import type { CheckReport, Draft, OperatingPoint, ReportDocument, ReportOptions } from '../../core/api.ts';

export interface ReportAsk {
  readonly ask: number;
  readonly draft: Draft;
  readonly points: readonly OperatingPoint[];
  readonly report: CheckReport;
  readonly options: ReportOptions;
}

export type ReportReply =
  | { readonly ok: true; readonly ask: number; readonly document: ReportDocument }
  | { readonly ok: false; readonly ask: number; readonly message: string };
