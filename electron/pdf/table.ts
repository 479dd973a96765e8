/** Tables: the header comes again on every page, rows stay whole, the last row never goes over alone. */
import type { TableBlock } from '../../core/api.ts';
import { breakLines } from './lines.ts';
import { drawMark } from './marks.ts';
import type { Element, Sheet } from './sheet.ts';
import { FINE, HAIR, PEN } from './sheet.ts';
import type { TextStyle } from './style.ts';
import { ascent, STYLES } from './style.ts';
import type { LaidCell, LaidColumn, LaidRow, LaidTable } from './tableLayout.ts';
import { layTable, MARK_PT, splitNumber } from './tableLayout.ts';
import { flowText } from './textBlocks.ts';

/** A table shorter than this fraction of a page is not divided while it fits a page. */
const KEPT_WHOLE = 0.34;
/** Rows that must follow a header at the foot of a page, and rows that must come along to the next. */
const ROWS_TOGETHER = 2;

/** The caption is left out where the heading right above already says it. */
export function drawTable(sheet: Sheet, block: TableBlock): void {
  const table = layTable(sheet.face, block, sheet.width);
  sheet.ensure(beginning(sheet, table, notesHeight(sheet, block)));
  const element = sheet.child(sheet.root, 'Table');
  if (block.caption !== sheet.headingAbove) {
    const { left: x, width: widthPt } = sheet;
    flowText(sheet, element, { text: block.caption, style: STYLES.caption, x, widthPt, tag: 'Caption' });
    sheet.y += 2;
  }
  taggedHead(sheet, table, element);
  drawRows(sheet, block, table, element);
  element.end();
  sheet.y += 3;
  for (const note of block.notes)
    flowText(sheet, sheet.root, { text: note, style: STYLES.small, x: sheet.left, widthPt: sheet.width });
  sheet.y += 12;
}
const CAPTION_PT = STYLES.caption.leadingPt + 2;

/** Height that must be free for a table to begin: caption, header and its first rows. */
export function tableStartPt(sheet: Sheet, block: TableBlock): number {
  return beginning(sheet, layTable(sheet.face, block, sheet.width), notesHeight(sheet, block));
}
function beginning(sheet: Sheet, table: LaidTable, notesPt: number): number {
  const wholePt = CAPTION_PT + table.head.heightPt + total(table.rows) + notesPt;
  return wholePt <= sheet.fullRoom * KEPT_WHOLE ? wholePt : startHeight(table);
}
function startHeight(table: LaidTable): number {
  const first = total(table.rows.slice(0, ROWS_TOGETHER));
  return CAPTION_PT + table.head.heightPt + Math.min(first, 160);
}

function taggedHead(sheet: Sheet, table: LaidTable, element: Element): void {
  const row = sheet.child(element, 'TR');
  table.columns.forEach((column, index) => {
    const cell = sheet.child(row, 'TH', { scope: 'Column' });
    sheet.tagged(cell, 'TH', () => drawHeadCell(sheet, table, index, column));
  });
  finishHead(sheet, table);
}

/** On the pages after the first, for the eye only: the tags already tie each cell to its header. */
function repeatedHead(sheet: Sheet, block: TableBlock, table: LaidTable): void {
  sheet.artifact(() => {
    const style = { ...STYLES.caption, face: 'regular' } as const;
    const text = breakLines(sheet.face, `${block.caption}, continued`, style, sheet.width)[0] ?? '';
    sheet.write(text, { x: sheet.left, baselineY: sheet.y + ascent(style) }, style);
    sheet.y += CAPTION_PT;
    for (const [index, column] of table.columns.entries()) {
      drawHeadCell(sheet, table, index, column);
    }
  });
  finishHead(sheet, table);
}

/** Heads stand on the same foot line, however many lines each has. */
function drawHeadCell(sheet: Sheet, table: LaidTable, index: number, column: LaidColumn): void {
  const lines = table.head.cells[index]?.lines ?? [];
  const ownPt = lines.reduce((sum, { style }) => sum + style.leadingPt, 0);
  let y = sheet.y + table.head.heightPt - table.padPt - ownPt;
  for (const { text, style } of lines) {
    place(sheet, text, style, column, y + ascent(style));
    y += style.leadingPt;
  }
}
function finishHead(sheet: Sheet, table: LaidTable): void {
  sheet.y += table.head.heightPt;
  sheet.artifact(() => sheet.rule({ x: sheet.left, y: sheet.y }, { x: sheet.left + sheet.width, y: sheet.y }, FINE));
}

function place(
  sheet: Sheet,
  text: string,
  style: TextStyle,
  { column, x, widthPt }: LaidColumn,
  baselineY: number,
): void {
  const left = sheet.left + x;
  if (column.align === 'left') sheet.write(text, { x: left, baselineY }, style);
  else sheet.write(text, { x: left + widthPt, baselineY, align: 'right' }, style);
}

function drawRows(sheet: Sheet, block: TableBlock, table: LaidTable, element: Element): void {
  const headPt = CAPTION_PT + table.head.heightPt;
  const notesPt = notesHeight(sheet, block);
  table.rows.forEach((row, index) => {
    const left = table.rows.length - index;
    const together = left > ROWS_TOGETHER ? row.heightPt : notesPt + total(table.rows.slice(index));
    const tooTall = row.heightPt > sheet.fullRoom - headPt;
    if (
      !tooTall &&
      sheet.room < together &&
      !(left === ROWS_TOGETHER && index < ROWS_TOGETHER && sheet.room >= row.heightPt)
    ) {
      sheet.newPage();
      repeatedHead(sheet, block, table);
    }
    if (tooTall) drawTallRow(sheet, block, table, element, row);
    else drawRow(sheet, table, element, row);
  });
}

const total = (rows: readonly LaidRow[]): number => rows.reduce((sum, { heightPt }) => sum + heightPt, 0);

/** Notes stay with the last rows. */
function notesHeight(sheet: Sheet, block: TableBlock): number {
  const lines = block.notes.flatMap((note) => breakLines(sheet.face, note, STYLES.small, sheet.width));
  return Math.min(3 + lines.length * STYLES.small.leadingPt, sheet.fullRoom / 3);
}

function drawRow(sheet: Sheet, table: LaidTable, element: Element, row: LaidRow): void {
  const tagged = sheet.child(element, 'TR');
  table.columns.forEach((column, index) => {
    const cell = row.cells[index];
    const holder = sheet.child(tagged, 'TD');
    if (cell !== undefined && cell.lines.length > 0) drawCell(sheet, table, { holder, column, cell });
  });
  sheet.y += row.heightPt;
  underline(sheet, table);
}

function drawCell(
  sheet: Sheet,
  { padPt }: LaidTable,
  { holder, column, cell }: { readonly holder: Element; readonly column: LaidColumn; readonly cell: LaidCell },
): void {
  const indent = cell.mark === undefined ? 0 : MARK_PT;
  const first = cell.lines[0];
  if (cell.mark !== undefined && first !== undefined) {
    drawMark(sheet, cell.mark, {
      x: sheet.left + column.x + 4.5,
      y: sheet.y + padPt + ascent(first.style) - 3,
      radius: 4.5,
    });
  }
  sheet.tagged(holder, 'TD', () => {
    let y = sheet.y + padPt;
    for (const { text, style } of cell.lines) {
      const baselineY = y + ascent(style);
      if (column.column.align === 'decimal') placeDecimal(sheet, text, style, column, baselineY);
      else place(sheet, text, style, { ...column, x: column.x + indent }, baselineY);
      y += style.leadingPt;
    }
  });
}

/** The point of every number of a column stands on one line; the whole is drawn in one piece. */
function placeDecimal(
  sheet: Sheet,
  text: string,
  style: TextStyle,
  { x, widthPt, fractionPt }: LaidColumn,
  baselineY: number,
): void {
  const { whole } = splitNumber(text);
  const pointX = sheet.left + x + widthPt - fractionPt;
  sheet.write(text, { x: pointX - sheet.face.width(whole, style), baselineY }, style);
}

/** The line under a row; darker where a pen is to write on it. */
function underline(sheet: Sheet, table: LaidTable): void {
  sheet.artifact(() => {
    sheet.rule({ x: sheet.left, y: sheet.y }, { x: sheet.left + sheet.width, y: sheet.y }, HAIR);
    for (const { column, x, widthPt } of table.columns) {
      if (column.kind !== 'blank') continue;
      sheet.rule({ x: sheet.left + x, y: sheet.y }, { x: sheet.left + x + widthPt, y: sheet.y }, PEN);
    }
  });
}

/** A row taller than a page, told line by line over as many pages as it takes. */
function drawTallRow(sheet: Sheet, block: TableBlock, table: LaidTable, element: Element, row: LaidRow): void {
  const tagged = sheet.child(element, 'TR');
  const holders = table.columns.map(() => sheet.child(tagged, 'TD'));
  const lineCount = Math.max(...row.cells.map(({ lines }) => lines.length));
  let from = 0;
  while (from < lineCount) {
    const leadingPt = table.styles.text.leadingPt;
    const fits = Math.floor((sheet.room - 2 * table.padPt) / leadingPt);
    if (fits < 2) {
      sheet.newPage();
      repeatedHead(sheet, block, table);
      continue;
    }
    const to = Math.min(from + fits, lineCount);
    const start = from;
    table.columns.forEach((column, index) => {
      const cell = row.cells[index];
      const holder = holders[index];
      const lines = cell?.lines.slice(start, to) ?? [];
      if (holder !== undefined && lines.length > 0)
        drawCell(sheet, table, { holder, column, cell: { lines, mark: start === 0 ? cell?.mark : undefined } });
    });
    sheet.y += (to - from) * leadingPt + 2 * table.padPt;
    from = to;
  }
  underline(sheet, table);
}
