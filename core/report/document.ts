/**
 * What a report is, before anyone decides how it is drawn: a flat list of blocks in reading order, plain data only (it can be
 * written as JSON and read back). It knows no page and no screen; the hosts turn it into paper.
 */
import type { Severity } from '../checks/finding.ts';
import type { Shape } from '../diagram/shape.ts';

export type Paper = 'A4' | 'Letter';

export interface ReportDocument {
  readonly format: 'ohmwright-report';
  readonly version: 1;
  readonly title: string;
  readonly subject: string;
  readonly author: string;
  readonly language: 'en-GB';
  readonly paper: Paper;
  /** As the host gave it; `null` where the host gave none: core has no clock. */
  readonly preparedOn: string | null;
  /** Name and version of the program that wrote it. */
  readonly program: string;
  /** One sentence for the foot of every page. */
  readonly footer: string;
  readonly blocks: readonly Block[];
}

export type Block =
  | CoverBlock
  | HeadingBlock
  | ParagraphBlock
  | ListBlock
  | CautionBlock
  | FactsBlock
  | EntryBlock
  | TableBlock
  | FigureBlock
  | SourcesBlock
  | PageBreakBlock;

/** A label and what stands beside it. */
export interface Fact {
  readonly label: string;
  readonly value: string;
}

export interface CoverBlock {
  readonly kind: 'cover';
  readonly title: string;
  readonly subtitle: string;
  readonly facts: readonly Fact[];
  /** The limits of what the paper says, one paragraph each. */
  readonly statement: readonly string[];
  /** Labels of places left empty for a pen. */
  readonly blanks: readonly string[];
}

export interface HeadingBlock {
  readonly kind: 'heading';
  readonly level: 1 | 2 | 3;
  readonly text: string;
}

export interface ParagraphBlock {
  readonly kind: 'paragraph';
  /** `lead`: the answer of a section; `body`; `small`: a remark under a table. */
  readonly tone: 'lead' | 'body' | 'small';
  readonly text: string;
}

export interface ListBlock {
  readonly kind: 'list';
  readonly ordered: boolean;
  readonly items: readonly string[];
}

/** A warning that stands where the hand is. */
export interface CautionBlock {
  readonly kind: 'caution';
  readonly title: string;
  readonly points: readonly string[];
}

export interface FactsBlock {
  readonly kind: 'facts';
  readonly facts: readonly Fact[];
}

/** One finding: a shape, a word, a sentence, and what supports it. Kept together on a page. */
export interface EntryBlock {
  readonly kind: 'entry';
  readonly number: string;
  readonly mark: Severity;
  readonly word: string;
  readonly title: string;
  readonly facts: readonly Fact[];
}

/** `id`: names, kept in one line where possible; `number`: aligned at the decimal point; `text`; `blank`: left empty for a pen. */
type ColumnKind = 'id' | 'text' | 'number' | 'blank';

export interface Column {
  readonly head: string;
  /** Printed under the head, lighter. */
  readonly unit?: string;
  readonly kind: ColumnKind;
  readonly align: 'left' | 'right' | 'decimal';
}

/** A cell: a text, or a text with a second, quieter line, or a text led by a severity shape. */
export type Cell = string | { readonly text: string; readonly under?: string; readonly mark?: Severity };

/** The header repeats on every page that the table reaches. */
export interface TableBlock {
  readonly kind: 'table';
  readonly caption: string;
  readonly columns: readonly Column[];
  readonly rows: readonly (readonly Cell[])[];
  /** Set closer: for long lists of figures. */
  readonly dense?: true;
  /** Remarks that belong to the table, one line each. */
  readonly notes: readonly string[];
}

export interface FigureBlock {
  readonly kind: 'figure';
  readonly title: string;
  /** What the figure shows, for those who cannot see it. */
  readonly alt: string;
  readonly width: number;
  readonly height: number;
  readonly shapes: readonly Shape[];
}

export interface SourceItem {
  /** The number by which the text cites it. */
  readonly number: number;
  readonly text: string;
  /** The status in the words that are printed. */
  readonly status: string;
}
export interface SourcesBlock {
  readonly kind: 'sources';
  readonly items: readonly SourceItem[];
}

interface PageBreakBlock {
  readonly kind: 'pageBreak';
  /** Of the pages that follow, until the next break. */
  readonly orientation: 'portrait' | 'landscape';
}

/** The plain words of a cell. */
export function cellText(cell: Cell): string {
  if (typeof cell === 'string') return cell;
  return cell.under === undefined || cell.under === '' ? cell.text : `${cell.text} ${cell.under}`;
}
