/** The few words that stand at a part of the one-line diagram, and the room that they ask for. */
import type { Part } from '../job/part.ts';
import { sizeText } from '../units/conductorSize.ts';
import { numberText } from '../units/numberText.ts';
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
      return `${part.inParallel === 1 ? '' : `${part.inParallel} × `}${sizeText(part.size).replaceAll(' ', '\u00a0')}`;
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

/** The rating line of any part, as short as it can be: `2 × 12 V, 150 Ah`, `60 A`, `35 mm²`. */
export function ratingWords(part: Part): string {
  switch (part.kind) {
    case 'cable':
    case 'pair':
      return [conductorWords(part), `${plain(part.lengthM)}\u00a0m`].filter((words) => words !== '').join(', ');
    case 'busbar':
      return part.ratingA === undefined ? '' : `${plain(part.ratingA)}\u00a0A`;
    case 'controller':
      return `${part.type === 'mppt' ? 'tracking' : 'direct'}, ${plain(part.outputA)}\u00a0A`;
    case 'converter':
      return `${plain(part.outputV)}\u00a0V, ${plain(part.outputA)}\u00a0A`;
    default: {
      const detail = linkDetail(part);
      return detail === '' ? deviceDetail(part) : detail;
    }
  }
}
function conductorWords({ size, inParallel }: Extract<Part, { kind: 'cable' | 'pair' }>): string {
  if (size === undefined) return '';
  return `${inParallel === 1 ? '' : `${inParallel} × `}${sizeText(size).replaceAll(' ', '\u00a0')}`;
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

/** A figure as it was entered: all its digits up to six. */
function plain(value: number): string {
  return numberText({ value, digits: 6 });
}
