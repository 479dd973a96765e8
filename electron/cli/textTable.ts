/** Plain text for a terminal: tables of aligned columns, and sentences wrapped to a width. */

export interface TextColumn {
  readonly head: string;
  readonly align: 'left' | 'right';
}

const gap = '  ';

/** A table with a line under its heads. Every row has one cell for each column. */
export function textTable(columns: readonly TextColumn[], rows: readonly (readonly string[])[]): string {
  const heads = columns.map((column) => column.head);
  const widths = columns.map((column, index) => {
    return Math.max(widthOf(column.head), ...rows.map((row) => widthOf(row[index] ?? '')));
  });
  const line = (cells: readonly string[]): string => {
    const padded = columns.map((column, index) => pad(cells[index] ?? '', widths[index] ?? 0, column.align));
    return padded.join(gap).trimEnd();
  };
  const rule = widths.map((width) => '-'.repeat(width)).join(gap);
  return [line(heads), rule, ...rows.map(line)].map((text) => `${text}\n`).join('');
}

/** A text in lines of at most `width` signs, each after the first indented. */
export function wrapped(text: string, { indent = '', width = 100 }: { indent?: string; width?: number } = {}): string {
  const lines: string[] = [];
  let line = indent;
  for (const word of text.split(/\s+/)) {
    if (line.trim() !== '' && widthOf(line) + 1 + widthOf(word) > width) {
      lines.push(line);
      line = indent;
    }
    line = line.trim() === '' ? indent + word : `${line} ${word}`;
  }
  return [...lines, line].map((each) => `${each}\n`).join('');
}

/** An item of a list, its further lines under the first. */
export function listItem(text: string): string {
  return `- ${wrapped(text, { indent: '  ' }).slice('  '.length)}`;
}

function pad(text: string, width: number, align: TextColumn['align']): string {
  const space = ' '.repeat(Math.max(0, width - widthOf(text)));
  return align === 'left' ? text + space : space + text;
}

function widthOf(text: string): number {
  return Array.from(text).length;
}
