/** What is proposed for the protection of a job: run by run, with reasons; nothing of it is done before somebody takes it. */
import type { Finding } from '../../checks/finding.ts';
import type { Draft } from '../../draft/draft.ts';
import type { Edit } from '../../draft/edit.ts';
import type { CheckedJob } from '../../job/job.ts';
import type { ConductorSize, PartId } from '../../job/part.ts';
import type { OperatingPoint } from '../../network/answer.ts';
import type { Tables } from '../../tables/tables.ts';
import type { ProtectionCost } from './cost.ts';
import type { FuseWindow } from './fuseWindow.ts';
import type { RunRole } from './runs.ts';

export interface ProtectionRequest {
  readonly draft: Draft;
  /** The draft, read. */
  readonly job: CheckedJob;
  readonly tables: Tables;
  /** Answers at hand, found by the id of their case. */
  readonly points?: readonly OperatingPoint[];
  /** Parts of a hundred done, now and then. */
  readonly progress?: (done: number, of: number) => void;
}

export interface ProposedDevice {
  /** The id that it has, or gets. */
  readonly device: PartId;
  readonly kind: 'fuse' | 'breaker';
  /** `null`: a device that is not there yet. */
  readonly fromA: number | null;
  readonly ratingA: number;
  /** Which end, and how far; of one in place, what is known of it. */
  readonly place: string;
  /** The most that it may have to break; `null` where no source reaches it or the case is not solved. */
  readonly faultA: number | null;
  /** Class of least interrupt rating that bears the fault at its volts; `null`: none listed. A usual figure of the class, never the device's own. */
  readonly type: string | null;
  readonly window: FuseWindow | { readonly missing: string };
}

export interface ProposedCable {
  readonly part: PartId;
  readonly field: 'size' | 'minusSize';
  readonly from: ConductorSize;
  readonly to: ConductorSize;
  readonly copperMmm2: number;
}

/** What was looked at and not taken. */
export interface Alternative {
  readonly words: string;
  readonly why: string;
}

/** `keep`: what stands passes; `change`; `none-fits`: nothing listed does; `unknown`: a figure is missing. */
export type RunVerdict = 'keep' | 'change' | 'none-fits' | 'unknown';

export interface RunProposal {
  /** The load or source that the run leads to, or its first part. */
  readonly id: PartId;
  readonly title: string;
  readonly role: RunRole;
  readonly verdict: RunVerdict;
  /** What is proposed, in a few words: `60 A fuse F3; cable C1 10 mm²`. */
  readonly words: string;
  readonly devices: readonly ProposedDevice[];
  readonly cables: readonly ProposedCable[];
  readonly cost: ProtectionCost;
  /** Sentences with figures. */
  readonly reasons: readonly string[];
  readonly alternatives: readonly Alternative[];
  /** Findings about the run that go, and that stay, once everything proposed is done. */
  readonly solves: readonly Finding[];
  readonly left: readonly Finding[];
  /** This run's changes as one step; `null` where nothing is to be changed. */
  readonly edit: Edit | null;
}

export interface ProtectionProposal {
  readonly runs: readonly RunProposal[];
  readonly cost: ProtectionCost;
  /** Findings that go with all changes, those that stay. */
  readonly solves: readonly Finding[];
  readonly left: readonly Finding[];
  /** All changes as one step; `null` where there are none. */
  readonly edit: Edit | null;
  /** What to keep in mind before anything is taken. */
  readonly cautions: readonly string[];
}
