/** The faces, what they can draw, and how wide it comes out. */
import { createRequire } from 'node:module';
import type { Face } from './style.ts';
import { FACE_FILES } from './style.ts';

/** The font package stands beside this program, whether it runs from its sources or from its bundle. */
const packages = createRequire(import.meta.url);
const files = new Map<Face, string>();

/** Path of a face; also its key with pdfkit, which opens a file again each time when it is called by another name. */
export function faceFile(face: Face): string {
  const known = files.get(face);
  if (known !== undefined) return known;
  const file = packages.resolve(FACE_FILES[face]);
  files.set(face, file);
  return file;
}

/** What the outline of a font can tell. */
interface GlyphSource {
  hasGlyphForCodePoint(codePoint: number): boolean;
}

/** Marks that steer text and draw nothing: left out. */
const UNDRAWN = /[\p{Cf}\p{Variation_Selector}]/gu;

/** A number and its unit stay on one line. */
const BEFORE_UNIT = /(?<=\d) (?=(?:%|°C|m?V|m?A|kA|k?W|m?Ω|µΩ|mm²|m|ft|AWG|kcmil|k?Wh|Ah|W\/m²|h|s)(?![\p{L}\d]))/gu;

export class Typeface {
  private readonly doc: PDFKit.PDFDocument;
  /** Advance of single characters at 1 pt, by face. */
  private readonly advances: Readonly<Record<Face, Map<string, number>>> = {
    regular: new Map(),
    light: new Map(),
    strong: new Map(),
  };
  private glyphs: GlyphSource | undefined;

  constructor(doc: PDFKit.PDFDocument) {
    this.doc = doc;
  }

  /**
   * Width of a text in points, summed over its characters. Kerning is left out: it can only bring letters a hair closer, so what
   * fits by this measure fits on paper; figures are not kerned and stand exactly.
   */
  width(text: string, { face, sizePt }: { readonly face: Face; readonly sizePt: number }): number {
    let sum = 0;
    for (const character of text) sum += this.advance(face, character);
    return sum * sizePt;
  }

  private advance(face: Face, character: string): number {
    const known = this.advances[face].get(character);
    if (known !== undefined) return known;
    const measured = this.doc.font(faceFile(face)).fontSize(1000).widthOfString(character) / 1000;
    this.advances[face].set(character, measured);
    return measured;
  }

  /**
   * The text as it can be drawn: composed, line ends and tabs as spaces, units tied to their numbers, and each character that the face lacks told by its code
   * (`[U+26A0]`), so that nothing drops out without a trace.
   */
  drawable(text: string): string {
    const plain = text
      .normalize('NFC')
      .replaceAll(UNDRAWN, '')
      .replaceAll(/[\t\n\v\f\r\u2028\u2029]+/g, ' ');
    const glued = plain.replaceAll(BEFORE_UNIT, '\u00a0');
    let drawn = '';
    for (const character of glued) {
      const codePoint = character.codePointAt(0) ?? 0;
      drawn += this.has(codePoint) ? character : `[U+${codePoint.toString(16).toUpperCase().padStart(4, '0')}]`;
    }
    return drawn;
  }

  private has(codePoint: number): boolean {
    this.glyphs ??= glyphsOf(this.doc.font(faceFile('regular')));
    return codePoint >= 0x20 && this.glyphs.hasGlyphForCodePoint(codePoint);
  }
}

/** pdfkit keeps the opened font on the document; its declarations do not say so. */
function glyphsOf(doc: PDFKit.PDFDocument): GlyphSource {
  return (doc as unknown as { readonly _font: { readonly font: GlyphSource } })._font.font;
}
