/** The rule books in plain words: what each is, and who goes by it. */
import type { Practice } from '../../../core/api.ts';
import { tables } from '../../../data/index.ts';

export interface PracticeWords {
  readonly practice: Practice;
  readonly name: string;
  readonly books: string;
  readonly who: string;
}

const WHO: Readonly<Record<Practice, string>> = {
  'us-land': 'Cabins, sheds and other buildings in the United States, and wherever that code has been adopted.',
  'us-marine':
    'Boats in the United States: the federal rules for petrol boats, and the trade standard where they are silent.',
  'iso-marine': 'Small craft in most other countries. Several of its figures stand here from memory: confirm them.',
  'iec-land': 'Buildings in countries whose wiring rules follow IEC 60364, under their own national edition.',
};

/** In the order in which they are offered. */
export const practiceWords: readonly PracticeWords[] = (
  ['iec-land', 'us-land', 'iso-marine', 'us-marine'] as const satisfies readonly Practice[]
).map((practice) => ({
  practice,
  name: tables.practices[practice].name,
  books: tables.practices[practice].books,
  who: WHO[practice],
}));
