/** What the page and the remedy worker say to each other. */
import type { CheckReport, Draft, Finding, Measure, OperatingPoint } from '../../core/api.ts';

export interface RemedyAsk {
  readonly ask: number;
  readonly draft: Draft;
  readonly finding: Finding;
  readonly report: CheckReport;
  readonly points: readonly OperatingPoint[];
}

/** A remedy as it was tried on the job, with the job that it leaves: an edit is a function and cannot travel. */
export interface TriedRemedy {
  readonly label: string;
  readonly before: { readonly measured: Measure; readonly limit: Measure };
  readonly after: { readonly measured: Measure | null; readonly limit: Measure };
  readonly gone: readonly Finding[];
  readonly arisen: readonly Finding[];
  readonly stillThere: boolean;
  readonly cost?: string;
  readonly leaves: Draft;
}

export type RemedyReply =
  | { readonly ok: true; readonly ask: number; readonly trials: readonly TriedRemedy[] }
  | { readonly ok: false; readonly ask: number; readonly message: string };
