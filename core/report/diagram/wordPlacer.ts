/** Finds places for blocks of words where they cover neither a line, a symbol nor other words. */
import type { Box } from '../../diagram/labelPlacer.ts';
import { textWidthPt, WORD_PT } from '../../diagram/wiringWords.ts';

/** From line to line of a block. */
export const LINE_PT = 8;
const CELL_PT = 60;
/** Lines have no area: a hair on each side makes a crossing count. */
const HAIR_PT = 0.6;

/** Where a block may stand: `x` by its alignment, `top` its upper edge. */
export interface BlockPlace {
  readonly x: number;
  readonly top: number;
  readonly align: 'left' | 'centre' | 'right';
}

export function blockBox(lines: readonly string[], { x, top, align }: BlockPlace): Box {
  const width = Math.max(...lines.map(textWidthPt));
  const left = align === 'left' ? x : align === 'right' ? x - width : x - width / 2;
  return { x1: left, x2: left + width, y1: top, y2: top + lines.length * LINE_PT };
}
/** Baseline of a line of a block. */
export function baseline({ top }: BlockPlace, index: number): number {
  return top + index * LINE_PT + WORD_PT * 0.85;
}

export class WordPlacer {
  private readonly cells = new Map<string, Box[]>();

  take(box: Box): void {
    for (const key of keysOf(box)) {
      const cell = this.cells.get(key);
      if (cell === undefined) this.cells.set(key, [box]);
      else cell.push(box);
    }
  }

  hasFree(lines: readonly string[], places: readonly BlockPlace[]): boolean {
    return places.some((place) => this.coveredBy(blockBox(lines, place)) === 0);
  }

  /** The first place that is free; where none is, the one that covers least. What is chosen is taken. */
  choose(lines: readonly string[], places: readonly BlockPlace[]): BlockPlace | undefined {
    let best: { readonly place: BlockPlace; readonly covered: number } | undefined;
    for (const place of places) {
      const covered = this.coveredBy(blockBox(lines, place));
      if (best === undefined || covered < best.covered) best = { place, covered };
      if (covered === 0) break;
    }
    if (best !== undefined) this.take(blockBox(lines, best.place));
    return best?.place;
  }

  private coveredBy(box: Box): number {
    const near = new Set(keysOf(box).flatMap((key) => this.cells.get(key) ?? []));
    let area = 0;
    for (const other of near) {
      const width = Math.min(box.x2, other.x2 + HAIR_PT) - Math.max(box.x1, other.x1 - HAIR_PT);
      const height = Math.min(box.y2, other.y2 + HAIR_PT) - Math.max(box.y1, other.y1 - HAIR_PT);
      if (width > 0 && height > 0) area += width * height;
    }
    return area;
  }
}

function keysOf({ x1, y1, x2, y2 }: Box): readonly string[] {
  const keys: string[] = [];
  for (let column = Math.floor((x1 - 1) / CELL_PT); column <= Math.floor((x2 + 1) / CELL_PT); column += 1) {
    for (let row = Math.floor((y1 - 1) / CELL_PT); row <= Math.floor((y2 + 1) / CELL_PT); row += 1)
      keys.push(`${column},${row}`);
  }
  return keys;
}
