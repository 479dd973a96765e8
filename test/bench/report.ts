/** What a benchmark file writes to: tables, remarks, and what could not be measured. */
export interface Report {
  /** Seconds for one measurement of one thing in one round. */
  readonly seconds: number;
  /** Rounds; in each, everything that is compared runs once, in turn. */
  readonly rounds: number;
  /** A folder for files passed to reference programs. */
  readonly folder: string;
  table(title: string, head: readonly string[], rows: readonly (readonly string[])[]): void;
  remark(text: string): void;
  missing(what: string, why: string): void;
}

/** Three significant figures. */
export function figure(x: number): string {
  if (x === 0) return '0';
  if (!Number.isFinite(x)) return String(x);
  const digits = Math.max(0, 2 - Math.floor(Math.log10(Math.abs(x))));
  return Math.abs(x) < 1e-3 ? x.toExponential(1) : x.toFixed(Math.min(4, digits));
}
