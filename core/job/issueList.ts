/** Collects issues while a job is checked; the first few hundred are kept, the rest are counted. */
import type { Issue, IssueCode } from './issue.ts';

/** More issues than this are not listed: by then the file is another kind of file. */
const mostIssues = 200;

export class IssueList {
  private readonly kept: Issue[] = [];
  private count = 0;

  /** The message is a function, so that the words of issues beyond the first few hundred are never made. */
  add(path: string, code: IssueCode, message: () => string): void {
    this.count += 1;
    if (this.kept.length < mostIssues) this.kept.push({ path, code, message: message() });
  }

  get size(): number {
    return this.count;
  }

  /** The issues found, and in place of those beyond the limit one that says how many they are. */
  all(): readonly Issue[] {
    const more = this.count - this.kept.length;
    if (more === 0) return this.kept;
    return [
      ...this.kept,
      { path: '', code: 'too-many', message: `And ${String(more)} more issues that are not listed.` },
    ];
  }
}
