/** What a new job can start from: one example for each usual pattern, each with a bad lug to look at. */
import { describe, expect, it } from 'vitest';
import { runChecks, seedBadLug } from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import { starterPatterns, starters } from '../../data/starters.ts';
import { edited, read } from './draftExamples.ts';

describe('starters', () => {
  it('have an example for every pattern, each example once', () => {
    const names = starterPatterns.map(({ example }) => example.name);
    expect(names).toHaveLength(8);
    expect(new Set(names).size).toBe(names.length);
    for (const { example } of starterPatterns) expect(starters.get(example.name)).toBe(example.text);
  });

  it.each(starterPatterns.map(({ pattern, example }) => [pattern, example.text] as const))(
    '%s: a bad lug shows in a case of its own and nowhere else',
    (_pattern, text) => {
      const honest = read(text);
      const before = runChecks({ job: honest.job, tables }).findings;
      const { job } = edited(honest.draft, seedBadLug(honest, tables));
      const after = runChecks({ job, tables }).findings;
      const bad = after.filter((finding) => finding.case === 'bad-lug');
      expect(bad.length).toBeGreaterThan(0);
      expect(after.filter((finding) => finding.case !== 'bad-lug')).toStrictEqual(before);
    },
  );
});
