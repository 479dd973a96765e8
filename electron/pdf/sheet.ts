/** The paper under the pen: pages, the place reached, text and lines on it, and the tags that say what each stroke means. */
import PDFDocument from 'pdfkit';
import type { ReportDocument, Shape } from '../../core/api.ts';
import type { TitledDocumentInfo } from './pdfkitTypes.ts';
import type { TextStyle } from './style.ts';
import { HAIRLINE, INK, MARGINS_PT, PAGE_SIZES_PT, STROKES, TONES } from './style.ts';
import { faceFile, Typeface } from './typeface.ts';

export type Element = PDFKit.PDFStructureElement;
export type Orientation = 'portrait' | 'landscape';

/** A day for papers that carry no date of their own, so that the same report gives the same bytes. */
const UNDATED = new Date('2000-01-01T00:00:00Z');

export class Sheet {
  readonly doc: PDFKit.PDFDocument;
  readonly face: Typeface;
  readonly root: Element;
  /** Distance of the next thing from the top edge, points. */
  y = 0;
  /** Text of the heading that ends just where the pen stands, if one does. */
  get headingAbove(): string | undefined {
    return this.y === this.headingEnd.y ? this.headingEnd.text : undefined;
  }
  private headingEnd = { y: -1, text: '' };
  /** Marks the end of a heading. */
  endHeading(text: string): void {
    this.headingEnd = { y: this.y, text };
  }
  /** First-level heading in force on each page, for its head. */
  readonly sections: string[] = [];
  private readonly paper: readonly [number, number];
  orientation: Orientation = 'portrait';
  private section = '';
  private marked: { readonly element: Element; readonly tag: string } | undefined;

  constructor(report: ReportDocument) {
    this.paper = PAGE_SIZES_PT[report.paper];
    this.doc = new TitledDocument(optionsFor(report));
    this.face = new Typeface(this.doc);
    this.root = this.doc.struct('Document');
    this.doc.addStructure(this.root);
  }

  get left(): number {
    return MARGINS_PT.left;
  }
  get width(): number {
    return this.doc.page.width - MARGINS_PT.left - MARGINS_PT.right;
  }
  get bottom(): number {
    return this.doc.page.height - MARGINS_PT.bottom;
  }
  /** Height left on this page. */
  get room(): number {
    return this.bottom - this.y;
  }
  /** Height of a page that is still empty. */
  get fullRoom(): number {
    return this.bottom - MARGINS_PT.top;
  }
  get isFresh(): boolean {
    return this.y <= MARGINS_PT.top;
  }

  /** A new page, of the same orientation unless another is asked for. What is being tagged goes on there. */
  newPage(orientation: Orientation = this.orientation): void {
    const { marked } = this;
    if (marked !== undefined) this.unmark();
    this.orientation = orientation;
    const [short, long] = this.paper;
    this.doc.addPage({ size: [short, long], layout: orientation, margin: 0 });
    this.y = MARGINS_PT.top;
    this.sections.push(this.section);
    if (marked !== undefined) this.mark(marked.element, marked.tag);
  }

  /** A new page where fewer than `heightPt` points are left and the page is not empty. */
  ensure(heightPt: number): void {
    if (this.room < heightPt && !this.isFresh) this.newPage();
  }

  startSection(title: string): void {
    this.section = title;
    if (this.isFresh || this.sections.at(-1) === '') this.sections[this.sections.length - 1] = title;
  }

  child(parent: Element, tag: string, options: PDFKit.Mixins.StructureElementOptions = {}): Element {
    const element = this.doc.struct(tag, options);
    parent.add(element);
    return element;
  }

  /** Draws something as the content of an element. */
  tagged(element: Element, tag: string, draw: () => void): void {
    this.mark(element, tag);
    draw();
    this.unmark();
  }

  /** Draws ornament: nothing that a reader who cannot see it would miss. */
  artifact(draw: () => void): void {
    const { marked } = this;
    if (marked !== undefined) this.unmark();
    this.doc.markContent('Artifact', { type: 'Layout' });
    draw();
    this.doc.endMarkedContent();
    if (marked !== undefined) this.mark(marked.element, marked.tag);
  }

  private mark(element: Element, tag: string): void {
    element.add(this.doc.markStructureContent(tag));
    this.marked = { element, tag };
  }
  private unmark(): void {
    this.doc.endMarkedContent();
    this.marked = undefined;
  }

  /** One line of text with its baseline at `baselineY`; `x` is its left end, middle or right end. */
  write(
    text: string,
    place: { readonly x: number; readonly baselineY: number; readonly align?: 'left' | 'centre' | 'right' },
    style: TextStyle,
  ): void {
    if (text === '') return;
    const widthPt = place.align === undefined || place.align === 'left' ? 0 : this.face.width(text, style);
    const x = place.align === 'centre' ? place.x - widthPt / 2 : place.x - widthPt;
    this.doc
      .font(faceFile(style.face))
      .fontSize(style.sizePt)
      .fillColor(style.colour)
      .text(text, x, place.baselineY, { lineBreak: false, baseline: 'alphabetic' });
  }

  rule(
    from: { readonly x: number; readonly y: number },
    to: { readonly x: number; readonly y: number },
    pen: { readonly widthPt: number; readonly colour: string } = HAIR,
  ): void {
    this.doc.lineWidth(pen.widthPt).strokeColor(pen.colour).undash().moveTo(from.x, from.y).lineTo(to.x, to.y).stroke();
  }

  /** A shape of a figure, moved and scaled. */
  shape(shape: Shape, { x, y, scale }: { readonly x: number; readonly y: number; readonly scale: number }): void {
    const { doc } = this;
    const colour = TONES[shape.tone];
    if (shape.shape === 'text') {
      const style: TextStyle = {
        face: shape.strong ? 'strong' : 'regular',
        sizePt: shape.sizePt * scale,
        leadingPt: 0,
        colour,
      };
      this.write(
        this.face.drawable(shape.text),
        { x: x + shape.x * scale, baselineY: y + shape.y * scale, align: shape.align },
        style,
      );
      return;
    }
    doc
      .lineWidth(STROKES[shape.stroke] * Math.max(scale, 0.6))
      .strokeColor(colour)
      .lineJoin('round')
      .lineCap('round');
    if (shape.shape === 'line' && shape.dashed === true) doc.dash(3 * scale, { space: 2.5 * scale });
    switch (shape.shape) {
      case 'line':
        doc
          .moveTo(x + shape.x1 * scale, y + shape.y1 * scale)
          .lineTo(x + shape.x2 * scale, y + shape.y2 * scale)
          .stroke();
        break;
      case 'polyline':
        shape.points.forEach(([px, py], index) => {
          if (index === 0) doc.moveTo(x + px * scale, y + py * scale);
          else doc.lineTo(x + px * scale, y + py * scale);
        });
        if (shape.closed) doc.closePath();
        if (shape.filled) doc.fillAndStroke(colour, colour);
        else doc.stroke();
        break;
      case 'rect':
        doc.rect(x + shape.x * scale, y + shape.y * scale, shape.width * scale, shape.height * scale);
        this.finish(shape.fill, colour);
        break;
      case 'circle':
        doc.circle(x + shape.x * scale, y + shape.y * scale, shape.radius * scale);
        this.finish(shape.fill, colour);
        break;
    }
    doc.undash();
  }

  private finish(fill: 'none' | 'paper' | 'ink', colour: string): void {
    if (fill === 'none') this.doc.stroke();
    else this.doc.fillAndStroke(fill === 'paper' ? '#ffffff' : colour, colour);
  }
}

export const HAIR = { widthPt: 0.4, colour: HAIRLINE } as const;
/** Where a pen is to write. */
export const PEN = { widthPt: 0.6, colour: INK } as const;
export const FINE = { widthPt: 0.8, colour: INK } as const;

function optionsFor(report: ReportDocument): PDFKit.PDFDocumentOptions {
  const date = dateOf(report.preparedOn);
  const info = {
    Title: report.title,
    Author: report.author,
    Subject: report.subject,
    Creator: report.program,
    Producer: report.program,
    CreationDate: date,
    ModDate: date,
  };
  return {
    font: faceFile('regular'),
    autoFirstPage: false,
    bufferPages: true,
    tagged: true,
    lang: report.language,
    displayTitle: true,
    pdfVersion: '1.7',
    info,
    // The declarations do not know this subset.
    ...({ subset: 'PDF/UA' } as object),
  };
}

function dateOf(preparedOn: string | null): Date {
  if (preparedOn === null || !/^\d{4}-\d{2}-\d{2}/.test(preparedOn)) return UNDATED;
  const date = new Date(`${preparedOn.slice(0, 10)}T00:00:00Z`);
  return Number.isNaN(date.getTime()) ? UNDATED : date;
}

/** pdfkit writes the title, author and subject into an XML block as they stand; here they are escaped on the way. */
class TitledDocument extends PDFDocument {
  /** Called by pdfkit at the end. */
  _addInfo(): void {
    const { info } = this;
    this.info = escaped(info);
    (PDFDocument.prototype as unknown as { _addInfo(this: unknown): void })._addInfo.call(this);
    this.info = info;
  }
}

function escaped(info: PDFKit.DocumentInfo): TitledDocumentInfo {
  const entries = Object.entries(info).map(([key, value]: [string, unknown]) => [
    key,
    typeof value === 'string' ? escapeXml(value) : value,
  ]);
  return Object.fromEntries(entries) as TitledDocumentInfo;
}

/** XML 1.0 has no way to write most control characters or half a surrogate pair: they go. */
function escapeXml(text: string): string {
  let allowed = '';
  for (const character of text) {
    const codePoint = character.codePointAt(0) ?? 0;
    const forbidden =
      codePoint < FIRST_PRINTABLE || (codePoint >= 0xd800 && codePoint <= 0xdfff) || codePoint === 0xfffe;
    if (!forbidden && codePoint !== 0xffff) allowed += character;
  }
  return allowed.replaceAll('&', '&amp;').replaceAll('<', '&lt;').replaceAll('>', '&gt;').replaceAll('"', '&quot;');
}
const FIRST_PRINTABLE = 0x20;
