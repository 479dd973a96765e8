/** The invented example jobs, by name, as text: what a new job can start from. */
import { examples } from './examples/index.ts';

/** `weekend-hut` to the text of `examples/weekend-hut.job.json`. */
export const starters: ReadonlyMap<string, string> = new Map(examples.map(({ name, text }) => [name, text]));
