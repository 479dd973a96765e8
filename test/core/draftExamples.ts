/** Drafts to edit in tests: the example jobs, and one of every kind. */
import { applyEdit, type Draft, draftOf, type Edit, type Edited } from '../../core/api.ts';
import { examples } from '../../data/examples/index.ts';
import { tables } from '../../data/index.ts';

export const exampleNames: readonly string[] = examples.map(({ name }) => name);

/** The example of that name as a draft with its job. */
export function exampleDraft(name: string): Edited {
  return read(examples.find((example) => example.name === name)!.text);
}

/** The job text as a draft; a text that is no job fails the test. */
export function read(text: string): Edited {
  const edited = draftOf(text);
  if (!edited.ok) throw new Error(edited.issues.map(({ path, message }) => `${path}: ${message}`).join('\n'));
  return edited.value;
}

/** The draft after the edits, each of which must leave a job that can be read. */
export function edited(draft: Draft, ...edits: readonly Edit[]): Edited {
  let now: Edited | undefined;
  for (const edit of edits) {
    const after = applyEdit(now?.draft ?? draft, edit, tables);
    if (!after.ok)
      throw new Error(`${edit.label}: ${after.issues.map(({ path, message }) => `${path} ${message}`).join('; ')}`);
    now = after.value;
  }
  return now!;
}

/** A small bank: two strings on two bars, a fuse and a load. Ids and junctions as short as they can be. */
export const smallBank = JSON.stringify({
  format: 'ohmwright-job',
  version: 1,
  title: 'Small bank',
  practice: 'iec-land',
  junctions: { M0: { reference: true }, 'A+': { label: 'post', at: { x: 10, y: 20 } } },
  parts: [
    {
      id: 'A',
      kind: 'string',
      plus: 'A+',
      minus: 'A-',
      midpoint: 'A mid',
      chemistry: 'agm',
      blocksInSeries: 2,
      blockNominalV: 12,
      capacityAh: 100,
      at: { x: 0, y: 0 },
    },
    { id: 'FA', kind: 'fuse', from: 'A+', to: 'FA out', ratingA: 60, at: { x: 40, y: 0 } },
    {
      id: 'CA',
      kind: 'cable',
      from: 'FA out',
      to: 'P1',
      lengthM: '3 ft',
      size: '16 mm2',
      endOhm: 0.0001,
      origin: { lengthM: 'guess' },
      range: { lengthM: [0.5, 1.5] },
    },
    { id: 'RA', kind: 'cable', from: 'M1', to: 'A-', lengthM: 1, size: '16 mm2' },
    { id: 'BAR+', kind: 'busbar', junctions: ['P0', 'P1', 'P2'] },
    { id: 'BAR-', kind: 'busbar', junctions: ['M0', 'M1', 'M2'] },
    {
      id: 'W1',
      kind: 'pair',
      from: { plus: 'P0', minus: 'M0' },
      to: { plus: 'L+', minus: 'L-' },
      lengthM: 4,
      size: '10 mm2',
    },
    { id: 'L1', kind: 'load', plus: 'L+', minus: 'L-', powerW: 120, surgeW: 300, 'x-mine': { colour: 'red' } },
  ],
  cases: [
    { id: 'day', stateOfChargeByString: { A: 0.9 }, set: { FA: { ratingA: 50 }, L1: { powerW: 80 } } },
    { id: 'start', surge: 'L1' },
  ],
  readings: [
    { id: 'R1', case: 'day', quantity: 'voltage', plus: 'L+', minus: 'L-', valueV: 24.5 },
    { id: 'R2', case: 'day', quantity: 'current', part: 'W1.plus', valueA: 3.3 },
    { id: 'R3', quantity: 'current', part: 'FA', valueA: 3.3 },
  ],
});
