/** Headings, paragraphs, lists, facts, cautions, findings, sources: everything that is mainly text. */
import type {
  CautionBlock,
  EntryBlock,
  Fact,
  FactsBlock,
  HeadingBlock,
  ListBlock,
  ParagraphBlock,
  SourcesBlock,
} from '../../core/api.ts';
import { breakLines } from './lines.ts';
import { drawCautionSign, drawMark } from './marks.ts';
import type { Element, Sheet } from './sheet.ts';
import type { TextStyle } from './style.ts';
import { ascent, COPPER, MARGINS_PT, STYLES } from './style.ts';

/** Text in a column, tagged, going on over the page where it must. */
export function flowText(
  sheet: Sheet,
  parent: Element,
  {
    text,
    style,
    x,
    widthPt,
    tag = 'P',
  }: {
    readonly text: string;
    readonly style: TextStyle;
    readonly x: number;
    readonly widthPt: number;
    readonly tag?: string;
  },
): void {
  const lines = breakLines(sheet.face, text, style, widthPt);
  const element = sheet.child(parent, tag);
  // A paragraph leaves no single line behind and takes none along.
  if (lines.length > 1) sheet.ensure(style.leadingPt * Math.min(lines.length, lines.length === 3 ? 3 : 2));
  sheet.tagged(element, tag, () => {
    lines.forEach((line, index) => {
      const isLastButOne = index === lines.length - 2 && lines.length > 3;
      if (sheet.room < style.leadingPt * (isLastButOne ? 2 : 1)) sheet.newPage();
      sheet.write(line, { x, baselineY: sheet.y + ascent(style) }, style);
      sheet.y += style.leadingPt;
    });
  });
  element.end();
}

const HEADING_STYLES = { 1: STYLES.heading1, 2: STYLES.heading2, 3: STYLES.heading3 } as const;
const SPACE_BEFORE = { 1: 24, 2: 18, 3: 12 } as const;
const SPACE_AFTER = { 1: 14, 2: 6, 3: 4 } as const;

/** Between two headings, one right under the other. */
const STACKED_PT = 2;

/** A heading never stands alone at the foot of a page: `companionPt` is the height that must follow it there. */
export function drawHeading(sheet: Sheet, block: HeadingBlock, companionPt: number): void {
  const style = HEADING_STYLES[block.level];
  const before = sheet.isFresh ? 0 : sheet.headingAbove === undefined ? SPACE_BEFORE[block.level] : STACKED_PT;
  sheet.ensure(before + style.leadingPt + SPACE_AFTER[block.level] + companionPt);
  if (!sheet.isFresh) sheet.y += before;
  if (block.level === 1) {
    sheet.startSection(block.text);
    sheet.artifact(() => {
      sheet.rule({ x: sheet.left, y: sheet.y }, { x: sheet.left + sheet.width, y: sheet.y });
      sheet.rule({ x: sheet.left, y: sheet.y }, { x: sheet.left + 40, y: sheet.y }, { widthPt: 2.4, colour: COPPER });
    });
    sheet.y += 8;
  }
  flowText(sheet, sheet.root, { text: block.text, style, x: sheet.left, widthPt: sheet.width, tag: `H${block.level}` });
  sheet.y += SPACE_AFTER[block.level];
  sheet.endHeading(block.text);
}

export function drawParagraph(sheet: Sheet, block: ParagraphBlock): void {
  const style = STYLES[block.tone];
  flowText(sheet, sheet.root, { text: block.text, style, x: sheet.left, widthPt: Math.min(sheet.width, READABLE_PT) });
  sheet.y += 6;
}
/** Longest comfortable line of running text. */
const READABLE_PT = 440;

export function drawList(sheet: Sheet, block: ListBlock): void {
  const list = sheet.child(sheet.root, 'L');
  for (const [index, item] of block.items.entries()) {
    listItem(sheet, list, { item, label: block.ordered ? `${index + 1}` : '–', style: STYLES.body, x: sheet.left });
  }
  list.end();
  sheet.y += 6;
}

const LABEL_PT = 16;

function listItem(
  sheet: Sheet,
  list: Element,
  {
    item,
    label,
    style,
    x,
  }: { readonly item: string; readonly label: string; readonly style: TextStyle; readonly x: number },
): void {
  sheet.ensure(style.leadingPt * Math.min(2, breakLines(sheet.face, item, style, READABLE_PT - LABEL_PT).length));
  const entry = sheet.child(list, 'LI');
  const lead = sheet.child(entry, 'Lbl');
  sheet.tagged(lead, 'Lbl', () =>
    sheet.write(label, { x, baselineY: sheet.y + ascent(style) }, { ...style, colour: COPPER }),
  );
  flowText(sheet, entry, {
    text: item,
    style,
    x: x + LABEL_PT,
    widthPt: Math.min(sheet.width - (x - sheet.left), READABLE_PT) - LABEL_PT,
    tag: 'LBody',
  });
  sheet.y += 2;
}

const FACT_LABEL_PT = 148;
/** Height of a line that a pen is to fill. */
const PEN_LINE_PT = 16;

export function drawFacts(sheet: Sheet, block: FactsBlock): void {
  const list = sheet.child(sheet.root, 'L');
  for (const fact of block.facts) {
    drawFact(sheet, list, fact, { x: sheet.left, labelPt: FACT_LABEL_PT, widthPt: sheet.width });
    sheet.artifact(() =>
      sheet.rule({ x: sheet.left, y: sheet.y + 2 }, { x: sheet.left + sheet.width, y: sheet.y + 2 }),
    );
    sheet.y += 5;
  }
  list.end();
  sheet.y += 6;
}

/** A label and its value side by side; an empty value leaves room for a pen. */
export function drawFact(
  sheet: Sheet,
  list: Element,
  { label, value }: Fact,
  {
    x,
    labelPt,
    widthPt,
    style = STYLES.body,
  }: { readonly x: number; readonly labelPt: number; readonly widthPt: number; readonly style?: TextStyle },
): void {
  const labelStyle = { ...STYLES.label, leadingPt: style.leadingPt };
  const labels = breakLines(sheet.face, label, labelStyle, labelPt - 8);
  const values = breakLines(sheet.face, value, style, widthPt - labelPt);
  sheet.ensure(style.leadingPt * Math.min(Math.max(labels.length, values.length), 4));
  const entry = sheet.child(list, 'LI');
  const lead = sheet.child(entry, 'Lbl');
  const top = sheet.y;
  sheet.tagged(lead, 'Lbl', () => {
    for (const [index, line] of labels.entries()) {
      sheet.write(line, { x, baselineY: top + index * style.leadingPt + ascent(style) }, labelStyle);
    }
  });
  if (value !== '')
    flowText(sheet, entry, { text: value, style, x: x + labelPt, widthPt: widthPt - labelPt, tag: 'LBody' });
  const leastPt = Math.max(labels.length * style.leadingPt, value === '' ? PEN_LINE_PT : 0);
  if (sheet.y >= top) sheet.y = Math.max(sheet.y, top + leastPt);
}

const CAUTION_INDENT_PT = 28;

const CAUTION_STYLE = { ...STYLES.body, sizePt: 9, leadingPt: 12 } as const;

function cautionWidth(sheet: Sheet): number {
  return Math.min(sheet.width, READABLE_PT + CAUTION_INDENT_PT) - CAUTION_INDENT_PT;
}
export function cautionHeightPt(sheet: Sheet, { points }: CautionBlock): number {
  const widthPt = cautionWidth(sheet) - LABEL_PT;
  const linesOf = (point: string): number => breakLines(sheet.face, point, CAUTION_STYLE, widthPt).length;
  const textPt = points.reduce((sum, point) => sum + linesOf(point) * CAUTION_STYLE.leadingPt + 2, 0);
  return Math.min(STYLES.heading3.leadingPt + textPt + 8, sheet.fullRoom);
}

export function drawCaution(sheet: Sheet, block: CautionBlock): void {
  const style = CAUTION_STYLE;
  const widthPt = cautionWidth(sheet);
  sheet.ensure(cautionHeightPt(sheet, block));
  sheet.y += 2;
  const top = sheet.y;
  const startPage = sheet.sections.length;
  const box = sheet.child(sheet.root, 'Div');
  drawCautionSign(sheet, { x: sheet.left + 13, y: top + 7.5, radius: 7 });
  flowText(sheet, box, {
    text: `Caution — ${lowerFirst(block.title)}`,
    style: STYLES.heading3,
    x: sheet.left + CAUTION_INDENT_PT,
    widthPt,
  });
  const list = sheet.child(box, 'L');
  for (const item of block.points)
    listItem(sheet, list, { item, label: '–', style, x: sheet.left + CAUTION_INDENT_PT });
  box.end();
  const ruleTop = sheet.sections.length === startPage ? top : MARGINS_PT.top;
  sheet.artifact(() =>
    sheet.rule({ x: sheet.left + 1, y: ruleTop }, { x: sheet.left + 1, y: sheet.y }, { widthPt: 1.6, colour: COPPER }),
  );
  sheet.y += 10;
}
function lowerFirst(text: string): string {
  return text.charAt(0).toLowerCase() + text.slice(1);
}

const ENTRY_INDENT_PT = 78;

/** A finding: its shape and word at the left, the sentence and what supports it at the right. */
export function drawEntry(sheet: Sheet, block: EntryBlock): void {
  const style = { ...STYLES.body, sizePt: 9, leadingPt: 12 };
  const titleStyle = { ...STYLES.body, face: 'strong', sizePt: 10, leadingPt: 13 } as const;
  const widthPt = sheet.width - ENTRY_INDENT_PT;
  const heightPt =
    breakLines(sheet.face, block.title, titleStyle, widthPt).length * titleStyle.leadingPt +
    block.facts.reduce(
      (sum, { value }) =>
        sum + breakLines(sheet.face, value, style, widthPt - ENTRY_LABEL_PT).length * style.leadingPt + 1,
      0,
    );
  sheet.ensure(Math.min(heightPt + 12, sheet.fullRoom));
  sheet.artifact(() => sheet.rule({ x: sheet.left, y: sheet.y }, { x: sheet.left + sheet.width, y: sheet.y }));
  sheet.y += 6;
  const box = sheet.child(sheet.root, 'Div');
  const baselineY = sheet.y + ascent(titleStyle);
  drawMark(sheet, block.mark, { x: sheet.left + 29, y: baselineY - 3.5, radius: 5.5 });
  const lead = sheet.child(box, 'P');
  sheet.tagged(lead, 'P', () => {
    sheet.write(block.number, { x: sheet.left + 14, baselineY, align: 'right' }, { ...titleStyle, face: 'regular' });
    sheet.write(block.word, { x: sheet.left + 40, baselineY }, titleStyle);
  });
  flowText(sheet, box, { text: block.title, style: titleStyle, x: sheet.left + ENTRY_INDENT_PT, widthPt });
  sheet.y += 2;
  const list = sheet.child(box, 'L');
  for (const fact of block.facts) {
    drawFact(sheet, list, fact, { x: sheet.left + ENTRY_INDENT_PT, labelPt: ENTRY_LABEL_PT, widthPt, style });
    sheet.y += 1;
  }
  box.end();
  sheet.y += 6;
}
const ENTRY_LABEL_PT = 56;

export function drawSources(sheet: Sheet, block: SourcesBlock): void {
  const style = { ...STYLES.body, sizePt: 9, leadingPt: 12 };
  const list = sheet.child(sheet.root, 'L');
  for (const { number, text, status } of block.items) {
    const told = text.endsWith(status) ? text : `${text} — ${status}`;
    const lines = breakLines(sheet.face, told, style, sheet.width - SOURCE_INDENT_PT);
    sheet.ensure(lines.length * style.leadingPt);
    const entry = sheet.child(list, 'LI');
    const lead = sheet.child(entry, 'Lbl');
    sheet.tagged(lead, 'Lbl', () =>
      sheet.write(`[${number}]`, { x: sheet.left, baselineY: sheet.y + ascent(style) }, style),
    );
    flowText(sheet, entry, {
      text: told,
      style,
      x: sheet.left + SOURCE_INDENT_PT,
      widthPt: sheet.width - SOURCE_INDENT_PT,
      tag: 'LBody',
    });
    sheet.y += 3;
  }
  list.end();
  sheet.y += 6;
}
const SOURCE_INDENT_PT = 26;
