/** What the page and the solving worker say to each other. */
import type { CheckReport, Draft, OperatingPoint } from '../../core/api.ts';

export interface SolveAsk {
  readonly generation: number;
  readonly draft: Draft;
}

export type SolveReply =
  | {
      readonly ok: true;
      readonly generation: number;
      readonly points: ReadonlyMap<string, OperatingPoint>;
      readonly report: CheckReport;
      readonly ms: { readonly read: number; readonly solve: number; readonly check: number };
    }
  | { readonly ok: false; readonly generation: number; readonly message: string };
