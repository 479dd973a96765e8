/** What holds for any sequence of edits, on the example jobs and on edits drawn by chance from a fixed seed. */
import { type Arbitrary, array, assert, constantFrom, nat, oneof, property, record, string } from 'fast-check';
import { describe, expect, it } from 'vitest';
import {
  addCase,
  addPart,
  applyEdit,
  attach,
  type CheckedJob,
  changeKind,
  checkJob,
  connect,
  copyParts,
  type Draft,
  detach,
  draftOf,
  draftText,
  duplicateParts,
  type Edit,
  insertInto,
  joinJunctions,
  junctionsOf,
  kindsAlike,
  move,
  type OperatingCase,
  type OperatingPoint,
  operatingPoint,
  type PartId,
  type PartKind,
  parallelString,
  partFields,
  partsAdded,
  pasteParts,
  type RawPart,
  rawParts,
  removeCase,
  removeParts,
  renameCase,
  renameJunction,
  renamePart,
  setField,
  setInCase,
  setReference,
  terminalsOf,
} from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import { edited, exampleDraft, exampleNames } from './draftExamples.ts';

/** Fixed, so that a failure today is the same failure tomorrow. */
const runs = { numRuns: 12, seed: 20_231 };
const kinds = [...partFields.keys()] as PartKind[];

interface Draw {
  readonly which: number;
  readonly a: number;
  readonly b: number;
  readonly name: string;
}
const draw: Arbitrary<Draw> = record({
  which: nat(18),
  a: nat(10_000),
  b: nat(10_000),
  name: oneof(
    constantFrom('F1', 'x', 'a b', '__proto__', 'constructor', 'earth', '', 'W1.plus'),
    string({ maxLength: 12 }),
  ),
});

function pick<T>(items: readonly T[], number: number): T {
  return items[number % items.length]!;
}

/** Enough of a long list to find what is wrong, in a third of the time. */
function everyThird<T>(items: readonly T[]): readonly T[] {
  return items.filter((_item, index) => index % 3 === 0);
}

/** An edit of the draft that a person might make, or try to make. */
function editOf(draft: Draft, { which, a, b, name }: Draw): Edit {
  const parts = rawParts(draft);
  if (parts.length === 0) return addPart({ part: { kind: pick(kinds, a) } });
  const [one, other] = [pick(parts, a), pick(parts, b)];
  const terminal = (part: RawPart, number: number) => pick(terminalsOf(part), number);
  const junction = terminal(other, a).junction;
  const cases = (draft['cases'] ?? [{ id: 'as-drawn' }]) as readonly { id: string }[];
  const caseId = pick(cases, b).id;
  const field = pick(Object.keys(partFields.get(one.kind)!), b);
  const value = pick(
    [0, 1, 12.5, '3 ft', '2 kW', '35 mm2', 'closed', true, null, undefined, -1, Number.NaN, junction],
    a + b,
  );
  const edits: readonly (() => Edit)[] = [
    () => addPart({ part: { kind: pick(kinds, a) }, id: name }),
    () => removeParts([one.id, other.id]),
    () => duplicateParts([one.id, other.id]),
    () => renamePart(one.id, name),
    () => setField({ part: one.id, field, value }),
    () => changeKind(one.id, pick(kindsAlike(one.kind), b)),
    () => insertInto({ cable: one.id, end: a % 2 === 0 ? 'from' : 'to', part: { kind: 'joint' } }),
    () => parallelString(one.id),
    () => renameJunction(junction, name),
    () => joinJunctions(junction, terminal(one, b).junction),
    () => detach({ part: one.id, terminal: terminal(one, b).path }),
    () => attach({ part: one.id, terminal: terminal(one, b).path, junction }),
    () => setReference(junction),
    () => connect({ from: junction, to: terminal(one, b).junction, with: { kind: 'cable' } }),
    () => move({ parts: { [one.id]: { x: a, y: b } }, junctions: { [junction]: { x: b, y: a } } }),
    () => addCase({ id: name, like: caseId }),
    () => removeCase(caseId),
    () => renameCase(caseId, name),
    () => setInCase({ case: caseId, part: one.id, field, value }),
  ];
  return pick(edits, which)();
}

/** The job as drawn, apart from its cases. */
const asDrawn: OperatingCase = {
  id: 'as-drawn',
  label: undefined,
  ambientDegC: undefined,
  irradianceWPerM2: 500,
  surge: undefined,
  changed: new Map(),
};

function solved(job: CheckedJob) {
  return operatingPoint({ job, operatingCase: asDrawn, tables, model: 'slow' });
}

describe.each(exampleNames)('%s under edits', (name) => {
  const start = exampleDraft(name);

  it('stays a job that can be read, or is not changed at all', () => {
    let taken = 0;
    assert(
      property(array(draw, { maxLength: 12 }), (draws) => {
        let { draft } = start;
        for (const one of draws) {
          const before = JSON.stringify(draft);
          const after = applyEdit(draft, editOf(draft, one), tables);
          expect(JSON.stringify(draft)).toBe(before);
          expect(after.ok ? 1 : after.issues.length).toBeGreaterThan(0);
          if (after.ok) {
            if (after.value.draft !== draft) taken += 1;
            draft = after.value.draft;
          }
          expect(checkJob(draft).ok).toBe(true);
        }
        const text = draftText(draft);
        const again = draftOf(text);
        expect(again.ok && again.value.draft).toStrictEqual(draft);
      }),
      runs,
    );
    // Edits drawn by chance are no test unless many of them are taken.
    expect(taken).toBeGreaterThan(runs.numRuns);
  });

  it('is refused only for the reason that a person typed something no job can hold, when parts go or are copied', () => {
    assert(
      property(nat(10_000), nat(10_000), (a, b) => {
        const parts = rawParts(start.draft);
        const ids = [pick(parts, a).id, pick(parts, b).id];
        for (const edit of [removeParts(ids), duplicateParts(ids), parallelString(ids[0]!)]) {
          const after = applyEdit(start.draft, edit, tables);
          expect([edit.label, after.ok ? [] : after.issues]).toStrictEqual([edit.label, []]);
        }
      }),
      runs,
    );
  });

  it('renamed part by part and back again is equal to what it was', () => {
    for (const { id } of everyThird(rawParts(start.draft))) {
      const away = edited(start.draft, renamePart(id, 'Q 1'));
      expect(edited(away.draft, renamePart('Q 1', id)).draft).toStrictEqual(start.draft);
    }
  });

  it('renamed junction by junction and back again is equal to what it was', () => {
    const names = new Set(start.job.parts.flatMap((part) => junctionsOf(part)));
    names.delete('earth' as never);
    for (const junction of everyThird([...names])) {
      const away = edited(start.draft, renameJunction(junction, 'Q 1'));
      expect(edited(away.draft, renameJunction('Q 1', junction)).draft).toStrictEqual(start.draft);
    }
  });

  it('gives the same currents as a copy that is pasted beside it', () => {
    const ids = rawParts(start.draft).map(({ id }) => id);
    const paste = pasteParts(copyParts(start.draft, ids));
    if (!('apply' in paste)) throw new Error('the copied parts are parts');
    const both = edited(start.draft, paste);
    const added = partsAdded(start.draft, both.draft);
    expect(added).toHaveLength(ids.length);
    const [first, second] = [solved(start.job), solved(both.job)];
    // To a microampere: two solves of one network in another order of unknowns differ by rounding, and a bond carries none.
    const microamps = (id: string, point: OperatingPoint) => {
      const currentA = point.parts.get(id as PartId)?.currentA;
      return typeof currentA === 'number' ? Math.round(currentA * 1e6) + 0 : 'not determined';
    };
    const currents = (point: OperatingPoint, of: readonly string[]) => of.map((id) => microamps(id, point));
    expect(currents(second, added)).toStrictEqual(currents(first, ids));
  });

  it('has each terminal taken off and put on again as it was', () => {
    for (const part of everyThird(rawParts(start.draft))) {
      for (const { path, junction } of terminalsOf(part)) {
        const apart = applyEdit(start.draft, detach({ part: part.id, terminal: path }), tables);
        if (!apart.ok) throw new Error(`${part.id} ${path}: ${apart.issues[0]!.message}`);
        const back = edited(apart.value.draft, attach({ part: part.id, terminal: path, junction }));
        expect(back.draft['parts']).toStrictEqual(start.draft['parts']);
      }
    }
  });
});
