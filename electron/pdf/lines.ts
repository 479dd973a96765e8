/** Breaking text into lines. */
import type { TextStyle } from './style.ts';
import type { Typeface } from './typeface.ts';

/** Where a name too long for its line may be divided. */
const SOFT_BREAK = /(?<=[-–—/._,;:+→)\]])/;

/** Lines no wider than `widthPt`; a word that is wider by itself is divided, at a mark if it has one, else anywhere. */
export function breakLines(face: Typeface, text: string, style: TextStyle, widthPt: number): readonly string[] {
  const lines: string[] = [];
  let line = '';
  for (const word of face.drawable(text).split(/ +/)) {
    const longer = line === '' ? word : `${line} ${word}`;
    if (face.width(longer, style) <= widthPt) {
      line = longer;
      continue;
    }
    if (line !== '') lines.push(line);
    const pieces = divide(face, word, style, widthPt);
    lines.push(...pieces.slice(0, -1));
    line = pieces.at(-1) ?? '';
  }
  return line === '' && lines.length > 0 ? lines : [...lines, line];
}

/** The pieces of a word, each fitting a line. */
function divide(face: Typeface, word: string, style: TextStyle, widthPt: number): readonly string[] {
  if (face.width(word, style) <= widthPt) return [word];
  const pieces: string[] = [];
  let piece = '';
  for (const part of word.split(SOFT_BREAK)) {
    if (face.width(piece + part, style) <= widthPt) {
      piece += part;
      continue;
    }
    if (piece !== '') pieces.push(piece);
    piece = '';
    for (const character of part) {
      if (piece !== '' && face.width(piece + character, style) > widthPt) {
        pieces.push(piece);
        piece = '';
      }
      piece += character;
    }
  }
  return [...pieces, piece];
}

/** Width of the widest word: below it a column would have to divide words. */
export function widestWord(face: Typeface, text: string, style: TextStyle): number {
  return Math.max(
    0,
    ...face
      .drawable(text)
      .split(/ +/)
      .map((word) => face.width(word, style)),
  );
}

/** The text cut to a width, with an ellipsis where something is missing. */
export function truncate(face: Typeface, text: string, style: TextStyle, widthPt: number): string {
  const drawn = face.drawable(text);
  if (face.width(drawn, style) <= widthPt) return drawn;
  let kept = drawn;
  while (kept !== '' && face.width(`${kept}…`, style) > widthPt) kept = kept.slice(0, -1);
  return `${kept.trimEnd()}…`;
}
