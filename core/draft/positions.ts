/** Where parts and junctions stand on the drawing. */
import { changed, type OpenDraft, type Point } from './draft.ts';
import type { Edit } from './edit.ts';
import { noteOn } from './junctions.ts';
import { junctionNamesOf } from './naming.ts';
import { partsWords } from './words.ts';

export interface Positions {
  readonly parts?: Readonly<Record<string, Point>>;
  readonly junctions?: Readonly<Record<string, Point>>;
}

/** Moves parts and junctions; those not named stay. */
export function move(positions: Positions): Edit {
  const names = [...Object.keys(positions.parts ?? {}), ...Object.keys(positions.junctions ?? {})];
  return {
    label: `Moved ${partsWords(names)}`,
    apply: (draft) =>
      changed(draft, (open) => {
        put(open, positions);
      }),
  };
}

/** Takes over a whole layout. */
export function place(positions: Positions): Edit {
  return {
    label: 'Tidied the drawing',
    apply: (draft) =>
      changed(draft, (open) => {
        put(open, positions);
      }),
  };
}

function put(open: OpenDraft, { parts = {}, junctions = {} }: Positions): void {
  for (const part of open.parts) {
    const at = Object.hasOwn(parts, part.id) ? parts[part.id] : undefined;
    if (at !== undefined) part['at'] = { x: at.x, y: at.y };
  }
  const known = junctionNamesOf(open);
  for (const [name, at] of Object.entries(junctions)) if (known.has(name)) noteOn(open, name).at = { x: at.x, y: at.y };
}
