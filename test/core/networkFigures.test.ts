import { expect, test } from 'vitest';
import { missingFigures, parseJob } from '../../core/api.ts';
import { tables } from '../../data/index.ts';

function job(size: string, more: object = {}) {
  const parts = [
    { id: 'W', kind: 'cable', from: 'a', to: 'b', lengthM: 2, size },
    { id: 'J', kind: 'joint', from: 'a', to: 'b', resistanceOhm: 0.001 },
  ];
  const file = { format: 'ohmwright-job', version: 1, title: 't', practice: 'us-marine', parts, ...more };
  const parsed = parseJob(JSON.stringify(file));
  if (!parsed.ok) throw new Error(JSON.stringify(parsed.issues));
  return parsed.value;
}

test('a size that no table knows is an issue with its path, not a failure of the solve', () => {
  const issues = missingFigures({ job: job('7 SAE'), tables });
  expect(issues.map(({ path, code }) => [path, code])).toEqual([['parts[0].size', 'not-in-list']]);
  expect(issues[0]!.message).toMatch(/^The resistance of W cannot be found: .+ or give resistanceOhm\.$/);
});

test('so is one that only a case brings in', () => {
  const withCase = job('6 AWG', { cases: [{ id: 'thin', set: { W: { size: '4.5 auto' } } }] });
  expect(missingFigures({ job: withCase, tables }).map(({ path }) => path)).toEqual(['cases[0].set.W.size']);
});

test('a listed size, or a measured resistance, is none', () => {
  expect(missingFigures({ job: job('6 SAE'), tables })).toEqual([]);
  const measured = job('6 AWG', { cases: [{ id: 'm', set: { W: { size: '7 SAE', resistanceOhm: '1.2 mOhm' } } }] });
  expect(missingFigures({ job: measured, tables })).toEqual([]);
});
