/** Lists as comma-separated text (RFC 4180), fit for spreadsheets. */

/** With the mark by which spreadsheets know UTF-8, and lines that end as the standard says. */
export function csvText(rows: readonly (readonly string[])[]): string {
  return `\ufeff${rows.map((row) => `${row.map(cellText).join(',')}\r\n`).join('')}`;
}

const number = /^[+-]?\d+(?:\.\d+)?(?:e[+-]?\d+)?$/i;

/** A text that a spreadsheet would take for a formula gets an apostrophe before it; a number stays one. */
function cellText(cell: string): string {
  const harmless = /^[=+\-@\t\r]/.test(cell) && !number.test(cell) ? `'${cell}` : cell;
  return /[",\r\n]|^\s|\s$/.test(harmless) ? `"${harmless.replaceAll('"', '""')}"` : harmless;
}
