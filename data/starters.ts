/** The invented example jobs, by name, as text: what a new job can start from. */

const files = import.meta.glob<string>('./examples/*.job.json', { query: '?raw', import: 'default', eager: true });

/** `weekend-hut` to the text of `examples/weekend-hut.job.json`. */
export const starters: ReadonlyMap<string, string> = new Map(
  Object.entries(files).map(([path, text]) => [path.slice('./examples/'.length, -'.job.json'.length), text]),
);
