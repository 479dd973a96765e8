/** The cover: a sheet as from a drawing board, with its title block at the foot for the pen. */
import type { CoverBlock } from '../../core/api.ts';
import { breakLines, truncate } from './lines.ts';
import type { Element, Sheet } from './sheet.ts';
import { FINE, HAIR } from './sheet.ts';
import { ascent, COPPER, STYLES } from './style.ts';
import { drawFact, flowText } from './textBlocks.ts';

const LABEL_PT = 104;
const CELL_PT = 44;

export function drawCover(sheet: Sheet, block: CoverBlock): ContentsPlace {
  sheet.startSection('Cover');
  sheet.artifact(() =>
    sheet.rule({ x: sheet.left, y: sheet.y }, { x: sheet.left + 72, y: sheet.y }, { widthPt: 3, colour: COPPER }),
  );
  sheet.y += 20;
  flowText(sheet, sheet.root, {
    text: block.title,
    style: titleStyle(sheet, block),
    x: sheet.left,
    widthPt: sheet.width,
    tag: 'H1',
  });
  sheet.y += 4;
  flowText(sheet, sheet.root, {
    text: block.subtitle,
    style: STYLES.coverSubtitle,
    x: sheet.left,
    widthPt: sheet.width,
  });
  sheet.y += 28;
  drawCoverFacts(sheet, block);
  sheet.y += 16;
  for (const text of block.statement) {
    flowText(sheet, sheet.root, { text, style: STYLES.body, x: sheet.left, widthPt: Math.min(sheet.width, 440) });
    sheet.y += 6;
  }
  const contents = reserveContents(sheet, block.blanks);
  drawTitleBlock(sheet, block.blanks);
  return contents;
}

/** Where the list of sections goes once their pages are known. */
export interface ContentsPlace {
  readonly element: Element;
  /** Index of its page. */
  readonly page: number;
  readonly topPt: number;
  readonly heightPt: number;
}
const CONTENTS_STYLE = STYLES.body;
const CONTENTS_TITLE_PT = 18;

function reserveContents(sheet: Sheet, blanks: readonly string[]): ContentsPlace {
  const element = sheet.child(sheet.root, 'TOC');
  const topPt = sheet.y + 22;
  return { element, page: sheet.sections.length - 1, topPt, heightPt: titleBlockTop(sheet, blanks) - 16 - topPt };
}

/** The sections and their pages, in one column or two; left out where the cover has no room for it. */
export function drawContents(
  sheet: Sheet,
  place: ContentsPlace,
  entries: readonly { readonly title: string; readonly page: number }[],
): void {
  const rowsThatFit = Math.floor((place.heightPt - CONTENTS_TITLE_PT) / CONTENTS_STYLE.leadingPt);
  const columns = entries.length <= rowsThatFit ? 1 : 2;
  const perColumn = Math.ceil(entries.length / columns);
  if (perColumn <= rowsThatFit) {
    sheet.doc.switchToPage(place.page);
    const columnPt = columns === 1 ? CONTENTS_WIDTH_PT : (sheet.width - 24) / 2;
    const title = sheet.child(place.element, 'Caption');
    sheet.tagged(title, 'Caption', () =>
      sheet.write('In this paper', { x: sheet.left, baselineY: place.topPt + ascent(STYLES.caption) }, STYLES.caption),
    );
    for (const [index, entry] of entries.entries()) {
      const x = sheet.left + Math.floor(index / perColumn) * (columnPt + 24);
      const baselineY =
        place.topPt + CONTENTS_TITLE_PT + (index % perColumn) * CONTENTS_STYLE.leadingPt + ascent(CONTENTS_STYLE);
      const item = sheet.child(place.element, 'TOCI');
      sheet.tagged(item, 'TOCI', () => {
        sheet.write(truncate(sheet.face, entry.title, CONTENTS_STYLE, columnPt - 30), { x, baselineY }, CONTENTS_STYLE);
        sheet.write(String(entry.page), { x: x + columnPt, baselineY, align: 'right' }, CONTENTS_STYLE);
      });
    }
  }
  place.element.end();
}
const CONTENTS_WIDTH_PT = 220;

/** Long titles are set smaller rather than over half the page. */
function titleStyle(sheet: Sheet, { title }: CoverBlock): typeof STYLES.coverTitle {
  const lines = breakLines(sheet.face, title, STYLES.coverTitle, sheet.width).length;
  return lines <= 3 ? STYLES.coverTitle : { ...STYLES.coverTitle, sizePt: 17, leadingPt: 22 };
}

function drawCoverFacts(sheet: Sheet, block: CoverBlock): void {
  const list = sheet.child(sheet.root, 'L');
  for (const fact of block.facts) {
    sheet.artifact(() => sheet.rule({ x: sheet.left, y: sheet.y }, { x: sheet.left + sheet.width, y: sheet.y }));
    sheet.y += 4;
    drawFact(sheet, list, fact, { x: sheet.left, labelPt: LABEL_PT, widthPt: sheet.width });
    sheet.y += 4;
  }
  sheet.artifact(() => sheet.rule({ x: sheet.left, y: sheet.y }, { x: sheet.left + sheet.width, y: sheet.y }));
  list.end();
}

function rowsOf(blanks: readonly string[]): readonly (readonly string[])[] {
  return [blanks.slice(0, 2), blanks.slice(2)].filter((row) => row.length > 0);
}
function titleBlockTop(sheet: Sheet, blanks: readonly string[]): number {
  return sheet.bottom - CELL_PT * rowsOf(blanks).length;
}

/** Cells in two rows: the signature wide above, the rest below. */
function drawTitleBlock(sheet: Sheet, blanks: readonly string[]): void {
  const rows = rowsOf(blanks);
  sheet.ensure(CELL_PT * rows.length + 8);
  const top = titleBlockTop(sheet, blanks);
  sheet.y = top;
  const list = sheet.child(sheet.root, 'L');
  rows.forEach((labels, rowIndex) => {
    const shares = labels.map((_, index) => (index === 0 ? 2 : 1));
    const whole = shares.reduce((sum, share) => sum + share, 0);
    let x = sheet.left;
    labels.forEach((label, index) => {
      const widthPt = (sheet.width * (shares[index] ?? 1)) / whole;
      drawBlank(sheet, list, label, { x, y: top + rowIndex * CELL_PT, widthPt });
      x += widthPt;
    });
  });
  list.end();
  sheet.y = sheet.bottom;
}

function drawBlank(
  sheet: Sheet,
  list: Element,
  label: string,
  { x, y, widthPt }: { readonly x: number; readonly y: number; readonly widthPt: number },
): void {
  sheet.artifact(() => {
    sheet.doc.lineWidth(HAIR.widthPt).strokeColor(FINE.colour).undash().rect(x, y, widthPt, CELL_PT).stroke();
  });
  const entry = sheet.child(list, 'LI');
  const body = sheet.child(entry, 'LBody');
  const style = STYLES.running;
  sheet.tagged(body, 'LBody', () =>
    sheet.write(sheet.face.drawable(label), { x: x + 5, baselineY: y + 3 + ascent(style) }, style),
  );
}
