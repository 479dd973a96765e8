/** How the person looks at the drawing: what is shown, what is under way. None of it is part of the job. */
import { create } from 'zustand';
import type { JunctionId, PartId, Point } from '../../core/api.ts';

/** What a hand is moving, and how far. */
export interface Drag {
  readonly parts: ReadonlySet<PartId>;
  readonly junctions: ReadonlySet<JunctionId>;
  readonly by: Point;
}

/** A menu at a place of the window. */
export type OpenMenu =
  | { readonly menu: 'part'; readonly part: PartId; readonly at: Point }
  | { readonly menu: 'junction'; readonly junction: JunctionId; readonly at: Point }
  | { readonly menu: 'ground'; readonly at: Point; readonly place: Point }
  | { readonly menu: 'connect'; readonly from: JunctionId; readonly to: JunctionId; readonly at: Point }
  | { readonly menu: 'choose-end'; readonly from: JunctionId; readonly at: Point }
  | { readonly menu: 'choose-start'; readonly part: PartId; readonly at: Point }
  | { readonly menu: 'new-part'; readonly from: JunctionId; readonly at: Point; readonly place: Point };

interface View {
  readonly volts: boolean;
  readonly amps: boolean;
  readonly labels: boolean;
  readonly palette: boolean;
  readonly walk: boolean;
  /** For how much room palette and walk were last folded or unfolded: a person's own choice holds until that changes. */
  readonly foldedFor: string | null;
  readonly walkLoad: PartId | null;
  readonly drag: Drag | null;
  readonly menu: OpenMenu | null;
  /** Why the last change could not be made, until the next one. */
  readonly refusal: string | null;
  /** Size that was last given to a cable, and its length as it was written. */
  readonly lastSize: string;
  readonly lastLength: string;
}

export const useView = create<View>()(() => ({
  volts: true,
  amps: true,
  labels: true,
  palette: true,
  walk: true,
  foldedFor: null,
  walkLoad: null,
  drag: null,
  menu: null,
  refusal: null,
  lastSize: '6 mm2',
  lastLength: '2 m',
}));
