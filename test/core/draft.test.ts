/** Reading a job into a draft, writing it as text, and the rules that hold for every edit. */
import { describe, expect, it } from 'vitest';
import { applyEdit, draftOf, draftText, emptyDraft, removeParts, setField, together } from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import { edited, exampleDraft, exampleNames, read, smallBank } from './draftExamples.ts';
import { everyKind } from './jobEveryKind.ts';

describe('a draft', () => {
  it('is the job file as it was written, quantities with their units', () => {
    const { draft, job } = read(smallBank);
    expect(draft).toStrictEqual(JSON.parse(smallBank));
    expect(job.parts.find(({ id }) => id === 'CA')).toMatchObject({ lengthM: 0.9144 });
  });

  it('cannot be changed in place', () => {
    const { draft } = read(smallBank);
    expect(() => {
      (draft['parts'] as { ratingA: number }[])[1]!.ratingA = 1;
    }).toThrow(TypeError);
  });

  it('is refused with every issue where the text is no job', () => {
    const trouble = draftOf(
      '{ "format": "ohmwright-job", "version": 1, "parts": [{ "id": "F1", "kind": "fuse", "from": "a" }] }',
    );
    expect(trouble.ok ? [] : trouble.issues.map(({ path }) => path)).toStrictEqual(['parts[0].to', 'parts[0].ratingA']);
    expect(draftOf('{ "format": 1, "format": 2 }').ok).toBe(false);
  });

  it('may be empty but for a title and a practice', () => {
    const { job } = edited(emptyDraft({ title: 'New', practice: 'us-marine' }), together('nothing', []));
    expect([job.title, job.practice, job.parts.length]).toStrictEqual(['New', 'us-marine', 0]);
  });
});

describe('an edit', () => {
  it('that leaves no readable job is refused whole', () => {
    const { draft } = read(smallBank);
    const refused = applyEdit(draft, setField({ part: 'FA', field: 'ratingA', value: -3 }), tables);
    expect(refused.ok ? [] : refused.issues.map(({ path, code }) => [path, code])).toStrictEqual([
      ['parts[1].ratingA', 'out-of-range'],
    ]);
  });

  it('that leaves a conductor of unknown resistance is refused', () => {
    const { draft } = read(smallBank);
    const refused = applyEdit(draft, setField({ part: 'CA', field: 'size', value: '9 auto' }), tables);
    expect(refused.ok ? [] : refused.issues.map(({ path }) => path)).toStrictEqual(['parts[2].size']);
  });

  it('that changes nothing gives the very same draft back', () => {
    const { draft } = read(smallBank);
    expect(edited(draft, setField({ part: 'FA', field: 'ratingA', value: 60 })).draft).toBe(draft);
    expect(edited(draft, setField({ part: 'FA', field: 'at', value: { y: 0, x: 40 } })).draft).toBe(draft);
    expect(edited(draft, removeParts(['nobody'])).draft).toBe(draft);
  });

  it('shares with the draft before it all that it did not touch', () => {
    const { draft } = exampleDraft('ridge-cabin');
    const after = edited(draft, setField({ part: 'F-A', field: 'ratingA', value: 125 })).draft;
    const [before, now] = [draft['parts'], after['parts']] as [object[], object[]];
    expect(now.filter((part, index) => part !== before[index])).toHaveLength(1);
    expect(after['cases']).toBe(draft['cases']);
  });
});

describe('the text of a draft', () => {
  it.each(exampleNames)('of %s parses back to an equal value, in lines that a person can read', (name) => {
    const { draft } = exampleDraft(name);
    const text = draftText(draft);
    expect(read(text).draft).toStrictEqual(draft);
    const long = text.split('\n').filter((line) => line.length > 150);
    // Only running text may be longer than the page is wide.
    expect(long.filter((line) => !line.startsWith('  "notes"'))).toStrictEqual([]);
    expect(draftText(read(text).draft)).toBe(text);
  });

  it('holds a job of every kind of part and field', () => {
    const { draft } = read(JSON.stringify(everyKind()));
    expect(read(draftText(draft)).draft).toStrictEqual(draft);
  });

  it('breaks a list of settings that is longer than a line', () => {
    const set = Object.fromEntries(
      Array.from({ length: 30 }, (_unused, index) => [`L${index}`, { powerW: index + 0.5 }]),
    );
    const parts = Object.keys(set).map((id) => ({ id, kind: 'load', plus: 'a', minus: 'b', powerW: 1 }));
    const job = { format: 'ohmwright-job', version: 1, parts, cases: [{ id: 'all', set }], 'x-mine': [] };
    const text = draftText(read(JSON.stringify(job)).draft);
    expect(Math.max(...text.split('\n').map(({ length }) => length))).toBeLessThanOrEqual(150);
    expect(JSON.parse(text)).toStrictEqual(job);
  });
});
