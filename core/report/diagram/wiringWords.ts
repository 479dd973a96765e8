/** The few words that stand at a part of the one-line diagram, and the room that they ask for. */
import type { Part } from '../../job/part.ts';
import { plain } from '../figures.ts';
import { sizeAsGiven } from '../sizes.ts';
import type { Link } from './wiringGraph.ts';

/** Size of all words of the drawing at full scale, points. */
export const WORD_PT = 7;
/** Mean width of a character of the report's typeface as a fraction of its size, on the wide side. */
const CHARACTER = 0.53;
/** Longest name that a layer makes room for, by preference and where the drawing is too wide; longer ones are cut. */
export const LONGEST_PT = { roomy: 62, tight: 44 } as const;
/** Room for a symbol alone. */
const SYMBOL_PT = 30;
const BOX_PT = 44;

export function textWidthPt(text: string): number {
  return text.length * WORD_PT * CHARACTER;
}
/** The text cut to a width, with an ellipsis where something is missing. */
export function cut(text: string, widthPt: number): string {
  const characters = Math.floor(widthPt / (WORD_PT * CHARACTER));
  return text.length <= characters ? text : `${text.slice(0, Math.max(1, characters - 1))}…`;
}

export function nameWidthPt(name: string, longestPt: number): number {
  return Math.min(textWidthPt(name), longestPt);
}
/** Room between the two points of a link. */
export function linkWidthPt({ id, part }: Link, longestPt: number): number {
  if (part.kind === 'controller' || part.kind === 'converter') return BOX_PT;
  const wordsPt = Math.min(Math.max(textWidthPt(id), textWidthPt(linkDetail(part))), longestPt);
  return Math.max(SYMBOL_PT, wordsPt + 8);
}

export function linkDetail(part: Part): string {
  switch (part.kind) {
    case 'cable':
      if (part.size === undefined) return '';
      return `${part.inParallel === 1 ? '' : `${part.inParallel} × `}${sizeAsGiven(part.size)}`;
    case 'fuse':
    case 'breaker':
    case 'shunt':
      return `${plain(part.ratingA)}\u00a0A`;
    case 'switch':
      return part.ratingA === undefined ? '' : `${plain(part.ratingA)}\u00a0A`;
    default:
      return '';
  }
}

export function deviceDetail(part: Part): string {
  switch (part.kind) {
    case 'string':
      return `${part.blocksInSeries} × ${plain(part.blockNominalV)} V, ${plain(part.capacityAh)} Ah`;
    case 'array':
      return `${part.modulesInSeries} in series × ${part.stringsInParallel}`;
    case 'inverter':
      return `${plain(part.ratedW)} W`;
    case 'charger':
      return `${plain(part.outputA)} A`;
    case 'load':
      if (part.powerW !== undefined) return `${plain(part.powerW)} W`;
      return part.currentA === undefined ? '' : `${plain(part.currentA)} A`;
    default:
      return '';
  }
}
