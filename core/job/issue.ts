/** Bad input: where it is, what kind, and a sentence that says what was expected. Issues are returned, all at once. */
export interface Issue {
  /** Path in the job file, as `parts[3].lengthM`; empty for the file as a whole. */
  readonly path: string;
  readonly code: IssueCode;
  readonly message: string;
}

export type IssueCode =
  | 'not-json'
  | 'too-large'
  | 'too-deep'
  | 'too-many'
  | 'wrong-format'
  | 'wrong-version'
  | 'unknown-field'
  | 'forbidden-field'
  | 'missing'
  | 'wrong-type'
  | 'wrong-unit'
  | 'out-of-range'
  | 'not-in-list'
  | 'duplicate-id'
  | 'duplicate-field'
  | 'unknown-reference'
  | 'contradiction';

/** What may fail for the user's reasons returns this. */
export type Result<T, E> = { readonly ok: true; readonly value: T } | { readonly ok: false; readonly issues: E };

/** A broken promise of ours: thrown, never returned. */
export class Defect extends Error {
  constructor(promise: string) {
    super(`broken promise: ${promise}`);
    this.name = 'Defect';
  }
}
