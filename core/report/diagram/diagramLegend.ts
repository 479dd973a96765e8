/** The symbols that a sheet of the one-line diagram uses, with their names. */

import { KIND_WORDS } from '../../diagram/kindWords.ts';
import type { Shape } from '../../diagram/shape.ts';
import * as symbols from '../../diagram/symbols.ts';
import { label, line, U } from '../../diagram/symbols.ts';
import { textWidthPt, WORD_PT } from '../../diagram/wiringWords.ts';
import type { Part } from '../../job/part.ts';

interface LegendEntry {
  readonly isShown: (kinds: ReadonlySet<Part['kind']>, isDivided: boolean) => boolean;
  readonly word: string;
  readonly draw: (at: { readonly x: number; readonly y: number }) => readonly Shape[];
}
const onLine =
  (symbol: LegendEntry['draw']): LegendEntry['draw'] =>
  ({ x, y }) => [line(x - 2 * U, y, x + 2 * U, y), ...symbol({ x, y })];

const LEGEND: readonly LegendEntry[] = [
  { isShown: (kinds) => kinds.has('fuse'), word: KIND_WORDS.fuse, draw: onLine(symbols.fuseSymbol) },
  { isShown: (kinds) => kinds.has('breaker'), word: KIND_WORDS.breaker, draw: onLine(symbols.breakerSymbol) },
  {
    isShown: (kinds) => kinds.has('switch'),
    word: 'switch (ring: breaks load)',
    draw: onLine((at) => symbols.switchSymbol(at, true)),
  },
  { isShown: (kinds) => kinds.has('shunt'), word: KIND_WORDS.shunt, draw: onLine(symbols.shuntSymbol) },
  { isShown: (kinds) => kinds.has('diode'), word: KIND_WORDS.diode, draw: onLine((at) => symbols.diodeSymbol(at, 1)) },
  { isShown: (kinds) => kinds.has('joint'), word: KIND_WORDS.joint, draw: onLine(symbols.jointSymbol) },
  {
    isShown: (kinds) => kinds.has('busbar'),
    word: 'busbar with its taps',
    draw: ({ x, y }) => [line(x, y - 6, x, y + 4, 'heavy')],
  },
  {
    isShown: (_kinds, isDivided) => isDivided,
    word: 'goes on on another sheet',
    draw: ({ x, y }) => [line(x, y - 5, x, y + 2), symbols.goesOn({ x, y: y + 2 }, 1)],
  },
];

/** A reader then needs no standard beside the sheet. */
export function drawLegend(
  kinds: ReadonlySet<Part['kind']>,
  { widthPt, y, isDivided }: { readonly widthPt: number; readonly y: number; readonly isDivided: boolean },
): readonly Shape[] {
  let x = 4;
  return LEGEND.filter(({ isShown }) => isShown(kinds, isDivided)).flatMap(({ word, draw }) => {
    const entry = [
      ...draw({ x: x + 2 * U, y }),
      label(word, { x: x + 4 * U + 4, y: y + 2.4 }, { sizePt: WORD_PT, align: 'left', tone: 'quiet' }),
    ];
    x += 4 * U + 18 + textWidthPt(word);
    return x > widthPt ? [] : entry;
  });
}
