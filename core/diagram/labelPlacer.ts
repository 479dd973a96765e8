/** Finds a place for a word where it crosses neither a line nor another word, among a few places near what it names. */
import { textWidthPt, WORD_PT } from './wiringWords.ts';

export interface Box {
  readonly x1: number;
  readonly y1: number;
  readonly x2: number;
  readonly y2: number;
}
export interface Place {
  readonly x: number;
  /** Of the baseline. */
  readonly y: number;
  readonly align: 'left' | 'centre' | 'right';
}

/** Height of capitals above, and of tails below the baseline, as fractions of the size. */
const ABOVE = 0.72;
const BELOW = 0.22;

/** What a word covers at a place. */
export function boxOf(text: string, { x, y, align }: Place): Box {
  const width = textWidthPt(text);
  const left = align === 'left' ? x : align === 'right' ? x - width : x - width / 2;
  return { x1: left, x2: left + width, y1: y - ABOVE * WORD_PT, y2: y + BELOW * WORD_PT };
}

export class LabelPlacer {
  private readonly taken: Box[] = [];

  /** Marks a line or a word that has its place already. */
  take(box: Box): void {
    this.taken.push(box);
  }

  /** The first free place of those offered, nearest first; where none is free, the one that covers least. */
  choose(text: string, places: readonly Place[]): Place | undefined {
    let best: { readonly place: Place; readonly covered: number } | undefined;
    for (const place of places) {
      const box = boxOf(text, place);
      const covered = this.taken.reduce((sum, other) => sum + sharedArea(box, other), 0);
      if (best === undefined || covered < best.covered) best = { place, covered };
      if (covered === 0) break;
    }
    if (best !== undefined) this.take(boxOf(text, best.place));
    return best?.place;
  }
}

/** Lines have no area of their own: a hair is added, so that a crossing counts. */
function sharedArea(one: Box, other: Box): number {
  const hair = 0.4;
  const width = Math.min(one.x2, other.x2 + hair) - Math.max(one.x1, other.x1 - hair);
  const height = Math.min(one.y2, other.y2 + hair) - Math.max(one.y1, other.y1 - hair);
  return width > 0 && height > 0 ? width * height : 0;
}
