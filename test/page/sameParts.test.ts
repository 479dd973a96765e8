import { describe, expect, test } from 'vitest';
import { checkJob, type Draft } from '../../core/api.ts';
import { examples } from '../../data/examples/index.ts';
import { SameParts } from '../../renderer/workers/sameParts.ts';

const text = examples[0]!.text;
const copy = () => JSON.parse(text) as Draft & { parts: { id: string; label?: string }[] };

describe('parts that cross to a worker', () => {
  test('are the same objects as last time where they say the same, and so are the parts read from them', () => {
    const same = new SameParts();
    const first = checkJob(same.in(copy()));
    const edited = copy();
    edited.parts[1]!.label = 'another label';
    const second = checkJob(same.in(edited));
    if (!first.ok || !second.ok) throw new Error('the example is a job');
    const kept = second.value.parts.map((part, index) => part === first.value.parts[index]);
    expect(kept).toEqual(second.value.parts.map((_part, index) => index !== 1));
    expect(second.value.parts[1]).toMatchObject({ label: 'another label' });
  });

  test('a job that can still change is read anew each time', () => {
    const open = copy();
    const [first, second] = [checkJob(open), checkJob(open)];
    if (!first.ok || !second.ok) throw new Error('the example is a job');
    expect(second.value.parts[0]).not.toBe(first.value.parts[0]);
    expect(second.value.parts).toEqual(first.value.parts);
  });

  test('an issue keeps its own path wherever the part has moved to', () => {
    const same = new SameParts();
    const wrong = { ...copy() } as { parts: object[] };
    wrong.parts = [...wrong.parts, { id: 'X', kind: 'fuse', from: 'a', to: 'b' }];
    const at = (draft: object) => {
      const read = checkJob(same.in(draft as Draft));
      return read.ok ? [] : read.issues.map(({ path }) => path);
    };
    expect(at(wrong)).toEqual([`parts[${String(wrong.parts.length - 1)}].ratingA`]);
    expect(at({ ...wrong, parts: wrong.parts.toReversed() })).toEqual(['parts[0].ratingA']);
  });
});
