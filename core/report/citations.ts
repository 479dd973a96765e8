import type { Basis, Status } from '../tables/status.ts';
import type { SourceItem } from './document.ts';
import { plainFields, STATUS_WORDS, withoutStatus } from './wording.ts';

/** Numbers the sources in the order in which the report first leans on them. */
export class Citations {
  private readonly numbers = new Map<string, number>();
  private readonly list: SourceItem[] = [];

  /** `[3] published`: the mark that stands beside a figure. */
  mark(basis: Basis): string {
    return `[${this.numberOf(basis.text, basis.status)}] ${STATUS_WORDS[basis.status]}`;
  }

  /** `[3]`, for places that print the status in words themselves. */
  short(basis: { readonly text: string; readonly status: Status }): string {
    return `[${this.numberOf(basis.text, basis.status)}]`;
  }

  items(): readonly SourceItem[] {
    return this.list;
  }

  private numberOf(text: string, status: Status): number {
    const key = `${status} ${text}`;
    const known = this.numbers.get(key);
    if (known !== undefined) return known;
    const number = this.list.length + 1;
    this.numbers.set(key, number);
    this.list.push({ number, text: plainFields(withoutStatus(text)), status: STATUS_WORDS[status] });
    return number;
  }
}
