/** How the paper looks: a drawing board. Ink and hairlines on white, one copper accent, everything on a grid of 4 points. */
import type { Stroke, Tone } from '../../core/api.ts';

export type Face = 'regular' | 'light' | 'strong';

/** Files inside the font package, one folder a weight. Tabular figures are the face's default. */
export const FACE_FILES: Readonly<Record<Face, string>> = {
  regular: '@expo-google-fonts/source-sans-3/400Regular/SourceSans3_400Regular.ttf',
  light: '@expo-google-fonts/source-sans-3/300Light/SourceSans3_300Light.ttf',
  strong: '@expo-google-fonts/source-sans-3/600SemiBold/SourceSans3_600SemiBold.ttf',
};

/** Contrast against white: ink 15 : 1, quiet 6 : 1, copper 5.5 : 1; the hairline is ornament only. */
export const INK = '#1b2430';
export const QUIET = '#56616d';
export const COPPER = '#9a4f22';
export const HAIRLINE = '#9aa3ab';

export const TONES: Readonly<Record<Tone, string>> = { ink: INK, quiet: QUIET, copper: COPPER, paper: '#ffffff' };
export const STROKES: Readonly<Record<Stroke, number>> = { hair: 0.5, line: 0.9, heavy: 2.4 };

export const PAGE_SIZES_PT = { A4: [595.28, 841.89], Letter: [612, 792] } as const;

/** Margins in points; the head and the foot of the page stand inside them. */
export const MARGINS_PT = { left: 52, right: 44, top: 68, bottom: 60 } as const;

export interface TextStyle {
  readonly face: Face;
  readonly sizePt: number;
  readonly leadingPt: number;
  readonly colour: string;
}
const style = (face: Face, sizePt: number, leadingPt: number, colour = INK): TextStyle => ({
  face,
  sizePt,
  leadingPt,
  colour,
});

export const STYLES = {
  body: style('regular', 9.5, 13),
  lead: style('regular', 11, 15),
  small: style('regular', 8.5, 11.5, QUIET),
  label: style('regular', 9, 13, QUIET),
  heading1: style('strong', 18, 22),
  heading2: style('strong', 12.5, 16),
  heading3: style('strong', 10, 13),
  caption: style('strong', 9, 12),
  coverTitle: style('strong', 28, 34),
  coverSubtitle: style('regular', 11, 16, COPPER),
  running: style('regular', 7.5, 10, QUIET),
} as const;

/** Table text at the largest size at which the table fits. */
export const TABLE_SIZES_PT: readonly number[] = [8.75, 8.25, 7.75, 7.25];
export const TABLE_LEADING = 1.3;

/** How far below the top of its line a text's baseline stands. */
export function ascent({ sizePt, leadingPt }: TextStyle): number {
  return (leadingPt - sizePt) / 2 + sizePt * 0.8;
}
