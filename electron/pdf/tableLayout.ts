/** How wide the columns of a table are, at which size its text fits, and what stands in each cell, line by line. */
import type { Cell, Column, Severity, TableBlock } from '../../core/api.ts';
import { breakLines, widestWord } from './lines.ts';
import type { TextStyle } from './style.ts';
import { INK, QUIET, TABLE_LEADING, TABLE_SIZES_PT } from './style.ts';
import type { Typeface } from './typeface.ts';

/** Between two columns; more between figures that end and words that begin. */
const GUTTER_PT = 9;
const GUTTER_AFTER_FIGURES_PT = 17;
/** Above and below the text of a row. */
const ROW_PAD_PT = 2.75;
const DENSE_PAD_PT = 1.5;
/** Height of a row that a pen writes in. */
const PEN_ROW_PT = 20;
/** Room for a severity shape in front of a text. */
export const MARK_PT = 13;
/** No column asks for more than this fraction of the table before the others have what they need. */
const GREEDIEST = 0.5;
/** Narrowest column that a pen can write in. */
const PEN_COLUMN_PT = 54;

interface TableStyles {
  readonly text: TextStyle;
  readonly under: TextStyle;
  readonly head: TextStyle;
  readonly unit: TextStyle;
}

interface LaidLine {
  readonly text: string;
  readonly style: TextStyle;
}
export interface LaidCell {
  readonly lines: readonly LaidLine[];
  readonly mark: Severity | undefined;
}
export interface LaidRow {
  readonly cells: readonly LaidCell[];
  readonly heightPt: number;
}
export interface LaidColumn {
  readonly column: Column;
  /** From the left edge of the table. */
  readonly x: number;
  readonly widthPt: number;
  /** Decimal columns: from the right edge of the column to the decimal point. */
  readonly fractionPt: number;
}
export interface LaidTable {
  /** Above and below the text of a row. */
  readonly padPt: number;
  readonly styles: TableStyles;
  readonly columns: readonly LaidColumn[];
  readonly head: LaidRow;
  readonly rows: readonly LaidRow[];
}

interface Need {
  readonly minimumPt: number;
  readonly naturalPt: number;
  /** Mean width of the cells, each in one line: how much there is to set. */
  readonly meanPt: number;
  readonly fractionPt: number;
}

export function layTable(face: Typeface, block: TableBlock, widthPt: number): LaidTable {
  const gaps = block.columns.map((column, index) => gapBefore(column, block.columns[index - 1]));
  const gutters = total(gaps);
  const padPt = block.dense === true ? DENSE_PAD_PT : ROW_PAD_PT;
  const sizes = block.dense === true ? TABLE_SIZES_PT.slice(1) : TABLE_SIZES_PT;
  let styles = stylesAt(sizes[0] ?? 8);
  let needs: readonly Need[] = [];
  for (const sizePt of sizes) {
    styles = stylesAt(sizePt);
    needs = block.columns.map((column, index) =>
      needOf(
        face,
        column,
        block.rows.map((row) => row[index] ?? ''),
        styles,
      ),
    );
    if (total(needs.map(({ minimumPt }) => minimumPt)) <= widthPt - gutters) break;
  }
  const widths = share(needs, block.columns, widthPt - gutters);
  let x = 0;
  const columns = block.columns.map((column, index): LaidColumn => {
    x += gaps[index] ?? 0;
    const laid = { column, x, widthPt: widths[index] ?? 0, fractionPt: needs[index]?.fractionPt ?? 0 };
    x += laid.widthPt;
    return laid;
  });
  return {
    padPt,
    styles,
    columns,
    head: layRow(
      columns.map(({ column, widthPt }) => headLines(face, column, widthPt, styles)),
      { padPt, minimumPt: 0 },
    ),
    rows: block.rows.map((row) =>
      layRow(
        columns.map((column, index) => layCell(face, row[index] ?? '', column, styles)),
        { padPt, minimumPt: minimumHeight(block) },
      ),
    ),
  };
}

function gapBefore(column: Column, before: Column | undefined): number {
  if (before === undefined) return 0;
  return before.align !== 'left' && column.align === 'left' ? GUTTER_AFTER_FIGURES_PT : GUTTER_PT;
}

function minimumHeight(block: TableBlock): number {
  return block.columns.some(({ kind }) => kind === 'blank') ? PEN_ROW_PT : 0;
}

function stylesAt(sizePt: number): TableStyles {
  const at = (face: TextStyle['face'], size: number, colour: string): TextStyle => ({
    face,
    sizePt: size,
    leadingPt: size * TABLE_LEADING,
    colour,
  });
  return {
    text: at('regular', sizePt, INK),
    under: at('regular', sizePt - 0.75, QUIET),
    head: at('strong', sizePt - 0.5, INK),
    unit: at('light', sizePt - 0.5, INK),
  };
}

const total = (numbers: readonly number[]): number => numbers.reduce((sum, number) => sum + number, 0);
const parts = (cell: Cell): { readonly text: string; readonly under: string; readonly mark: Severity | undefined } =>
  typeof cell === 'string'
    ? { text: cell, under: '', mark: undefined }
    : { text: cell.text, under: cell.under ?? '', mark: cell.mark };

function needOf(face: Typeface, column: Column, cells: readonly Cell[], styles: TableStyles): Need {
  const headMinimum = Math.max(
    widestWord(face, column.head, styles.head),
    widestWord(face, column.unit ?? '', styles.unit),
  );
  const headNatural = Math.max(face.width(column.head, styles.head), face.width(column.unit ?? '', styles.unit));
  if (column.kind === 'blank')
    return {
      minimumPt: Math.max(headMinimum, PEN_COLUMN_PT),
      naturalPt: Math.max(headNatural, PEN_COLUMN_PT),
      meanPt: 0,
      fractionPt: 0,
    };
  if (column.align === 'decimal') return decimalNeed(face, cells, styles, { headMinimum });
  let minimumPt = headMinimum;
  let naturalPt = headNatural;
  let sumPt = 0;
  for (const cell of cells) {
    const { text, under, mark } = parts(cell);
    const markPt = mark === undefined ? 0 : MARK_PT;
    const drawn = face.drawable(text);
    const underPt = Math.min(face.width(face.drawable(under), styles.under), UNDER_LIMIT_PT);
    const whole = Math.max(face.width(drawn, styles.text) + markPt, underPt);
    naturalPt = Math.max(naturalPt, whole);
    sumPt += whole;
    const words = Math.max(widestWord(face, text, styles.text) + markPt, widestWord(face, under, styles.under));
    minimumPt = Math.max(
      minimumPt,
      column.kind === 'text' || whole > ID_LIMIT_PT
        ? Math.min(words, WORD_LIMIT_PT)
        : Math.max(face.width(drawn, styles.text) + markPt, Math.min(words, WORD_LIMIT_PT)),
    );
  }
  return { minimumPt, naturalPt, meanPt: sumPt / Math.max(1, cells.length), fractionPt: 0 };
}
/** A second line asks for no more than this; beyond it, it wraps. */
const UNDER_LIMIT_PT = 96;
/** A name wider than this may be broken between its words; a word wider than the second, inside. */
const ID_LIMIT_PT = 84;
const WORD_LIMIT_PT = 72;

/** Digits before and after the point, each as wide as the widest of the column. */
function decimalNeed(
  face: Typeface,
  cells: readonly Cell[],
  styles: TableStyles,
  { headMinimum }: { readonly headMinimum: number },
): Need {
  let wholePt = 0;
  let fractionPt = 0;
  for (const cell of cells) {
    const { whole, fraction } = splitNumber(face.drawable(parts(cell).text));
    wholePt = Math.max(wholePt, face.width(whole, styles.text));
    fractionPt = Math.max(fractionPt, face.width(fraction, styles.text));
  }
  const numbersPt = wholePt + fractionPt;
  return {
    minimumPt: Math.max(headMinimum, numbersPt),
    naturalPt: Math.max(headMinimum, numbersPt),
    meanPt: numbersPt,
    fractionPt,
  };
}

/** `-12.75` → `-12` and `.75`; words and marks count as whole numbers. */
export function splitNumber(text: string): { readonly whole: string; readonly fraction: string } {
  const point = /^[−\d\u00a0]*\.\d/.test(text) ? text.indexOf('.') : -1;
  return point === -1 ? { whole: text, fraction: '' } : { whole: text.slice(0, point), fraction: text.slice(point) };
}

/** Natural widths where they fit, the rest spread; else the least widths and a share of what is left, after what each still lacks. */
function share(needs: readonly Need[], columns: readonly Column[], widthPt: number): readonly number[] {
  const natural = needs.map(({ minimumPt, naturalPt }) =>
    Math.max(minimumPt, Math.min(naturalPt, widthPt * GREEDIEST)),
  );
  const minimum = needs.map(({ minimumPt }) => minimumPt);
  const spare = widthPt - total(natural);
  if (spare >= 0) return spread(natural, needs, columns, spare);
  const left = widthPt - total(minimum);
  if (left < 0) return minimum.map((need) => (need * widthPt) / total(minimum));
  const lacking = natural.map((wish, index) => wish - (minimum[index] ?? 0));
  const weights = lacking.map((lack, index) => (lack <= 0 ? 0 : Math.max(needs[index]?.meanPt ?? 0, 1)));
  return pour(left, { onto: minimum, upTo: natural, weights });
}

/** Shares a width out by weight; what one column does not need goes to the others. */
function pour(
  leftPt: number,
  {
    onto,
    upTo,
    weights,
  }: { readonly onto: readonly number[]; readonly upTo: readonly number[]; readonly weights: readonly number[] },
): readonly number[] {
  const widths = [...onto];
  let left = leftPt;
  let open = weights.map((weight, index) => (weight > 0 ? index : -1)).filter((index) => index >= 0);
  while (left > 0.01 && open.length > 0) {
    const whole = total(open.map((index) => weights[index] ?? 0));
    const full = open.filter(
      (index) => (upTo[index] ?? 0) - (widths[index] ?? 0) <= (left * (weights[index] ?? 0)) / whole,
    );
    if (full.length === 0) {
      for (const index of open) widths[index] = (widths[index] ?? 0) + (left * (weights[index] ?? 0)) / whole;
      return widths;
    }
    for (const index of full) {
      left -= (upTo[index] ?? 0) - (widths[index] ?? 0);
      widths[index] = upTo[index] ?? 0;
    }
    open = open.filter((index) => !full.includes(index));
  }
  return widths;
}

/** With so few columns the rest of the line stays empty rather than the columns far apart. */
const FEW_COLUMNS = 2;

/** Spare width goes first to texts that are longer than their column, then to all columns alike, up to a limit that keeps rows readable. */
function spread(
  natural: readonly number[],
  needs: readonly Need[],
  columns: readonly Column[],
  sparePt: number,
): readonly number[] {
  const lacking = needs.map(({ naturalPt }, index) => Math.max(0, naturalPt - (natural[index] ?? 0)));
  const given = Math.min(sparePt, total(lacking));
  const filled = natural.map(
    (width, index) => width + (total(lacking) === 0 ? 0 : (given * (lacking[index] ?? 0)) / total(lacking)),
  );
  if (columns.length <= FEW_COLUMNS)
    return filled.map((width, index) => width + (index === columns.length - 1 ? sparePt - given : 0));
  const each = (sparePt - given) / columns.length;
  return filled.map((width) => width + each);
}

function headLines(face: Typeface, column: Column, widthPt: number, styles: TableStyles): LaidCell {
  const head = breakLines(face, column.head, styles.head, widthPt).map((text) => ({ text, style: styles.head }));
  const unit =
    column.unit === undefined || column.unit === ''
      ? []
      : breakLines(face, column.unit, styles.unit, widthPt).map((text) => ({ text, style: styles.unit }));
  return { lines: [...head, ...unit], mark: undefined };
}

function layCell(face: Typeface, cell: Cell, { widthPt }: LaidColumn, styles: TableStyles): LaidCell {
  const { text, under, mark } = parts(cell);
  const lines =
    text === ''
      ? []
      : breakLines(face, text, styles.text, widthPt - (mark === undefined ? 0 : MARK_PT)).map((line) => ({
          text: line,
          style: styles.text,
        }));
  const quiet =
    under === ''
      ? []
      : breakLines(face, under, styles.under, widthPt).map((line) => ({ text: line, style: styles.under }));
  return { lines: [...lines, ...quiet], mark };
}

function layRow(
  cells: readonly LaidCell[],
  { padPt, minimumPt }: { readonly padPt: number; readonly minimumPt: number },
): LaidRow {
  const tallest = Math.max(0, ...cells.map(({ lines }) => total(lines.map(({ style }) => style.leadingPt))));
  return { cells, heightPt: Math.max(tallest + 2 * padPt, minimumPt) };
}
