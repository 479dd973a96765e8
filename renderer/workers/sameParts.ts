/**
 * What crosses to a worker arrives as a copy. This gives a part of the copy back as the object that it was last time wherever it
 * says the same, so that an edit of one part leaves what was found out about all others standing.
 */
import type { Draft } from '../../core/api.ts';

export class SameParts {
  private last = new Map<string, unknown>();

  in(draft: Draft): Draft {
    const parts = draft['parts'];
    if (!Array.isArray(parts)) return draft;
    const now = new Map<string, unknown>();
    const same = parts.map((part: unknown) => {
      const text = JSON.stringify(part);
      const known = this.last.get(text) ?? forGood(part);
      now.set(text, known);
      return known;
    });
    this.last = now;
    return { ...draft, parts: same };
  }
}

/** Frozen with all that is in it. */
function forGood<T>(value: T): T {
  if (typeof value === 'object' && value !== null) {
    Object.freeze(value);
    for (const inner of Object.values(value)) forGood(inner);
  }
  return value;
}
