/** What the page and a worker of studies say to each other: one question at a time, each about the open job as it stands. */
import type { Draft } from '../../core/api.ts';

/** Of a table of studies, by name: what goes with a question (`asks`), and what it is answered (`answers`). */
export type StudyNameOf<Table> = keyof Table & string;
type Asked<Entry> = Entry extends { readonly asks: infer Asks } ? Asks : never;
type Answered<Entry> = Entry extends { readonly answers: infer Answers } ? Answers : never;
export type AsksOf<Table, Name extends StudyNameOf<Table>> = Asked<Table[Name]>;
export type AnswersOf<Table, Name extends StudyNameOf<Table>> = Answered<Table[Name]>;

/** A question of one name, told apart by it. */
export type QuestionOf<Table> = {
  readonly [Name in StudyNameOf<Table>]: { readonly name: Name; readonly asks: AsksOf<Table, Name> };
}[StudyNameOf<Table>];
export type AnswerOf<Table> = { readonly [Name in StudyNameOf<Table>]: AnswersOf<Table, Name> }[StudyNameOf<Table>];

export interface StudyAsk {
  readonly ask: number;
  readonly draft: Draft;
  /** A question of the worker's table. */
  readonly question: { readonly name: string; readonly asks: unknown };
}

/** A reply without the number of its question. */
export type StudySaid =
  | { readonly kind: 'progress'; readonly done: number; readonly of: number }
  | { readonly kind: 'answer'; readonly answer: unknown }
  | { readonly kind: 'failed'; readonly message: string };
export type StudyReply = StudySaid & { readonly ask: number };
