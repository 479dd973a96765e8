/** What can be asked of the worker of the Findings: fuses and faults, another rule book, and what could be changed. */
import type {
  CheckReport,
  Draft,
  FaultMethod,
  Finding,
  Practice,
  ProtectionProposal,
  ProtectionStudy,
  RunProposal,
} from '../../core/api.ts';

/** A run's proposal without its edit: that is a function and cannot travel. */
export interface ListedProposal extends Omit<RunProposal, 'edit'> {
  /** False where nothing is to be changed, or nothing that fits is known. */
  readonly canTake: boolean;
}
export interface ListedProposals extends Omit<ProtectionProposal, 'edit' | 'runs'> {
  readonly runs: readonly ListedProposal[];
}

/** What the ticked proposals leave, judged anew. */
export interface TickedOutcome {
  readonly leaves: Draft;
  readonly label: string;
  readonly gone: readonly Finding[];
  readonly arisen: readonly Finding[];
}

export interface ProtectionStudies {
  readonly now: { readonly asks: { readonly method: FaultMethod }; readonly answers: ProtectionStudy };
  readonly practice: { readonly asks: { readonly practice: Practice }; readonly answers: CheckReport };
  readonly proposals: { readonly asks: Record<string, never>; readonly answers: ListedProposals };
  readonly ticked: {
    readonly asks: { readonly runs: readonly string[] };
    readonly answers: TickedOutcome | { readonly refused: string };
  };
}
