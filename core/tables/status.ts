/** How far a figure may be trusted; carried from the table's row to the screen and the page. */
export type Status = 'published' | 'common-practice' | 'from-memory';

/** A figure's source: what is printed beside it. */
export interface Basis {
  /** Source id in data/SOURCES.md, e.g. `SRC-CFR33-183`. */
  readonly source: string;
  /** What is printed: title, clause and edition in one phrase. */
  readonly text: string;
  readonly status: Status;
}

/** The weaker of several statuses: an answer is no better than the worst figure in it. */
export function weakest(...statuses: readonly Status[]): Status {
  if (statuses.includes('from-memory')) return 'from-memory';
  return statuses.includes('common-practice') ? 'common-practice' : 'published';
}
