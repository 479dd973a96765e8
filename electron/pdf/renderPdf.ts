import type { Block, CoverBlock, HeadingBlock, ReportDocument } from '../../core/api.ts';
import type { ContentsPlace } from './cover.ts';
import { drawContents, drawCover } from './cover.ts';
import { drawFigure, figureHeightPt } from './figure.ts';
import { truncate } from './lines.ts';
import { HAIR, Sheet } from './sheet.ts';
import { MARGINS_PT, STYLES } from './style.ts';
import { drawTable, tableStartPt } from './table.ts';
import {
  cautionHeightPt,
  drawCaution,
  drawEntry,
  drawFacts,
  drawHeading,
  drawList,
  drawParagraph,
  drawSources,
} from './textBlocks.ts';

/**
 * A report as a PDF: tagged, with outline and metadata, its typeface embedded. The same document gives the same bytes, on any day
 * and in any time zone. Throws where the font files that belong to the program are missing.
 */
export async function renderPdf(report: ReportDocument): Promise<Uint8Array> {
  const sheet = new Sheet(report);
  const bytes = collect(sheet.doc);
  const outline = new Outline(sheet);
  let contents: ContentsPlace | undefined;
  sheet.newPage();
  for (const [index, block] of report.blocks.entries()) {
    if (block.kind === 'cover') {
      outline.add('Cover', 1);
      contents = drawCover(sheet, block);
    } else if (block.kind === 'heading') {
      drawHeading(sheet, block, companionPt(sheet, report.blocks.slice(index + 1, index + 4)));
      outline.add(block.text, block.level);
    } else {
      drawBlock(sheet, block);
    }
  }
  if (contents !== undefined) drawContents(sheet, contents, outline.sections.slice(1));
  sheet.root.end();
  drawMargins(sheet, report);
  sheet.doc.end();
  return await bytes;
}

function drawBlock(sheet: Sheet, block: Exclude<Block, CoverBlock | HeadingBlock>): void {
  switch (block.kind) {
    case 'paragraph':
      drawParagraph(sheet, block);
      break;
    case 'list':
      drawList(sheet, block);
      break;
    case 'caution':
      drawCaution(sheet, block);
      break;
    case 'facts':
      drawFacts(sheet, block);
      break;
    case 'entry':
      drawEntry(sheet, block);
      break;
    case 'table':
      drawTable(sheet, block);
      break;
    case 'figure':
      drawFigure(sheet, block);
      break;
    case 'sources':
      drawSources(sheet, block);
      break;
    case 'pageBreak':
      if (!sheet.isFresh || sheet.orientation !== block.orientation) sheet.newPage(block.orientation);
      break;
  }
}

/** What has to follow a heading on its page: the next heading with its own, a few lines, or the beginning of a table. */
function companionPt(sheet: Sheet, following: readonly Block[]): number {
  const [next, ...rest] = following;
  if (next === undefined) return 0;
  switch (next.kind) {
    case 'heading':
      return 40 + companionPt(sheet, rest);
    case 'table':
      return tableStartPt(sheet, next);
    case 'figure':
      return figureHeightPt(sheet, next);
    case 'caution':
      return cautionHeightPt(sheet, next) + (rest[0]?.kind === 'table' ? 10 + tableStartPt(sheet, rest[0]) : 0);
    case 'paragraph':
      return 44 + (next.text.length > 400 ? 0 : afterParagraphPt(sheet, rest[0]));
    default:
      return 64;
  }
}

/** A table or figure that a few lines introduce stays with them. */
function afterParagraphPt(sheet: Sheet, next: Block | undefined): number {
  if (next?.kind === 'table') return tableStartPt(sheet, next);
  if (next?.kind === 'sources') return FEW_SOURCES_PT;
  return next?.kind === 'figure' ? figureHeightPt(sheet, next, INTRODUCTION_PT) : 0;
}
/** Height of the first few sources of the list. */
const FEW_SOURCES_PT = 48;
/** Heading and introduction above a figure. */
const INTRODUCTION_PT = 100;

/** Bookmarks: first-level headings, with the second level inside. */
class Outline {
  private readonly sheet: Sheet;
  private open: PDFKit.PDFOutline | undefined;
  /** First-level titles with their pages, counted from 1. */
  readonly sections: { readonly title: string; readonly page: number }[] = [];

  constructor(sheet: Sheet) {
    this.sheet = sheet;
  }

  /** Call it right after the heading was drawn: the bookmark leads to the page where it stands. */
  add(title: string, level: 1 | 2 | 3): void {
    if (level === 3) return;
    const { doc, face } = this.sheet;
    const top = Math.max(0, this.sheet.y - 60);
    // `left` is taken off the page's width by pdfkit, so the full width leads to the left edge; the declarations know none of these.
    const options = { top, left: doc.page.width, fit: false, zoom: 0, expanded: level === 1 } as object;
    const parent = level === 1 ? doc.outline : (this.open ?? doc.outline);
    const item = parent.addItem(face.drawable(title), options);
    if (level > 1) return;
    this.open = item;
    this.sections.push({ title, page: this.sheet.sections.length });
  }
}

/** Head and foot of every page, once the number of pages is known. */
function drawMargins(sheet: Sheet, report: ReportDocument): void {
  const { doc } = sheet;
  const { count } = doc.bufferedPageRange();
  for (let index = 0; index < count; index += 1) {
    doc.switchToPage(index);
    doc.markContent('Artifact', { type: 'Pagination' });
    if (index > 0) drawHead(sheet, report, sheet.sections[index] ?? '');
    drawFoot(sheet, report, `Page ${index + 1} of ${count}`);
    doc.endMarkedContent();
  }
}

function drawHead(sheet: Sheet, report: ReportDocument, section: string): void {
  const baselineY = MARGINS_PT.top - 32;
  const right = sheet.left + sheet.width;
  const style = STYLES.running;
  sheet.write(truncate(sheet.face, report.title, style, sheet.width * 0.6), { x: sheet.left, baselineY }, style);
  sheet.write(truncate(sheet.face, section, style, sheet.width * 0.35), { x: right, baselineY, align: 'right' }, style);
  sheet.rule({ x: sheet.left, y: baselineY + 6 }, { x: right, y: baselineY + 6 }, HAIR);
}

function drawFoot(sheet: Sheet, report: ReportDocument, pageText: string): void {
  const top = sheet.bottom + 16;
  const right = sheet.left + sheet.width;
  const style = STYLES.running;
  sheet.rule({ x: sheet.left, y: top }, { x: right, y: top }, HAIR);
  sheet.write(
    truncate(sheet.face, report.footer, style, sheet.width * 0.76),
    { x: sheet.left, baselineY: top + 11 },
    style,
  );
  sheet.write(pageText, { x: right, baselineY: top + 11, align: 'right' }, style);
  const origin = report.preparedOn === null ? report.program : `${report.program} · ${report.preparedOn}`;
  sheet.write(truncate(sheet.face, origin, style, sheet.width * 0.5), { x: sheet.left, baselineY: top + 21 }, style);
  const initials = 'Initials';
  const lineX = right - 64;
  sheet.write(initials, { x: lineX - 6, baselineY: top + 23, align: 'right' }, style);
  sheet.rule({ x: lineX, y: top + 24 }, { x: right, y: top + 24 }, { widthPt: 0.5, colour: style.colour });
}

function collect(doc: PDFKit.PDFDocument): Promise<Uint8Array> {
  const chunks: Uint8Array[] = [];
  return new Promise((resolve, reject) => {
    doc.on('data', (chunk: Uint8Array) => chunks.push(chunk));
    doc.on('error', reject);
    doc.on('end', () => {
      const bytes = new Uint8Array(chunks.reduce((sum, { length }) => sum + length, 0));
      let offset = 0;
      for (const chunk of chunks) {
        bytes.set(chunk, offset);
        offset += chunk.length;
      }
      resolve(bytes);
    });
  });
}
