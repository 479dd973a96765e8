/** What a remedy would change, found by really trying it on the job. */
import type { Finding, Measure, NotChecked } from '../checks/finding.ts';
import type { Edit } from '../draft/edit.ts';

export interface RemedyTrial {
  /** Makes the change to the draft, as one step that can be undone. */
  readonly edit: Edit;
  /** What would be done, in words: `Cable W-INV.minus: 1/0 AWG instead of 8 AWG`. */
  readonly label: string;
  readonly before: { readonly measured: Measure; readonly limit: Measure };
  /** `measured` is null where the finding is gone. */
  readonly after: { readonly measured: Measure | null; readonly limit: Measure };
  /** Findings that go with it, this one first where it goes. */
  readonly gone: readonly Finding[];
  /** Findings that come by it. */
  readonly arisen: readonly Finding[];
  readonly stillThere: boolean;
  /** Checks that could be made before and can no longer be made for want of a figure: none of them counts as passed. */
  readonly unchecked: readonly NotChecked[];
  /** What has to be bought or done, in words: `3.2 m of 1/0 AWG`. */
  readonly cost?: string;
}
