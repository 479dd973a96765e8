/** What each kind of edit does to a job, one example each. */
import { describe, expect, it } from 'vitest';
import {
  addCase,
  addDemand,
  addPart,
  addTap,
  applyEdit,
  attach,
  changeKind,
  connect,
  copyParts,
  type Draft,
  detach,
  duplicateParts,
  type Edit,
  emptyDraft,
  insertInto,
  joinJunctions,
  kindsAlike,
  labelJunction,
  move,
  parallelString,
  partsAdded,
  pasteParts,
  place,
  rawPart,
  rawParts,
  removeCase,
  removeDemand,
  removeParts,
  removeTap,
  renameCase,
  renameJunction,
  renamePart,
  runChecks,
  seedBadLug,
  setCase,
  setDemand,
  setField,
  setInCase,
  setOrigin,
  setRange,
  setReference,
  setTop,
  terminalsOf,
} from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import { edited, exampleDraft, read, smallBank } from './draftExamples.ts';

const bank = read(smallBank).draft;
const empty24 = emptyDraft({ title: 'Empty', practice: 'iec-land' });

/** A draft after an edit that the job takes. */
function applied(edit: Edit, draft: Draft = bank): Draft {
  return edited(draft, edit).draft;
}
function part(draft: Draft, id: string): Readonly<Record<string, unknown>> | undefined {
  return rawPart(draft, id);
}
function caseOf(draft: Draft, id: string): Readonly<Record<string, unknown>> | undefined {
  return (draft['cases'] as readonly { id: string }[] | undefined)?.find((one) => one.id === id);
}
function readingIds(draft: Draft): readonly string[] {
  return ((draft['readings'] ?? []) as readonly { id: string }[]).map(({ id }) => id);
}

describe('adding a part', () => {
  it('names it by its kind, gives it junctions of its own, and guesses what it must have', () => {
    expect(part(applied(addPart({ part: { kind: 'fuse' } })), 'F1')).toStrictEqual({
      id: 'F1',
      kind: 'fuse',
      from: 'F1 from',
      to: 'F1 to',
      ratingA: 40,
      origin: { ratingA: 'guess' },
    });
  });

  it('takes the volts of the system for a guess', () => {
    const string = part(applied(addPart({ part: { kind: 'string' } }), empty24), 'B1');
    expect(string).toMatchObject({ chemistry: 'agm', blocksInSeries: 1, blockNominalV: 12, capacityAh: 100 });
    // The bank of the example is a 24 V one.
    expect(part(applied(addPart({ part: { kind: 'charger' } })), 'CH1')).toMatchObject({ setpointV: 28.8 });
  });

  it.each([
    'string',
    'cable',
    'pair',
    'busbar',
    'fuse',
    'breaker',
    'switch',
    'shunt',
    'joint',
    'diode',
    'load',
    'inverter',
    'array',
    'controller',
    'charger',
    'converter',
    'bond',
  ] as const)('of kind %s alone leaves a job that can be read', (kind) => {
    for (const practice of ['us-land', 'us-marine', 'iso-marine', 'iec-land'] as const) {
      const draft = emptyDraft({ title: 't', practice });
      const { draft: now, job } = edited(draft, addPart({ part: { kind } }));
      expect(job.parts).toHaveLength(1);
      const added = rawParts(now)[0]!;
      const origin = (added['origin'] ?? {}) as Readonly<Record<string, string>>;
      const touching = new Set(['id', 'kind', 'origin', 'from', 'to', 'plus', 'minus', 'junctions']);
      // Nothing is put in that is not marked as a guess.
      expect(Object.keys(added).filter((field) => !touching.has(field) && origin[field] !== 'guess')).toStrictEqual([]);
    }
  });

  it('keeps what is given: fields, place, junctions', () => {
    const added = addPart({
      part: { kind: 'load', currentA: 3 },
      id: 'Lamp',
      at: { x: 5, y: 6 },
      junctions: { plus: 'P2' },
    });
    expect(part(applied(added), 'Lamp')).toStrictEqual({
      id: 'Lamp',
      kind: 'load',
      currentA: 3,
      plus: 'P2',
      minus: 'Lamp minus',
      at: { x: 5, y: 6 },
    });
  });

  it('never takes an id in use, nor one that a pair stands for', () => {
    expect(partsAdded(bank, applied(addPart({ part: { kind: 'load' }, id: 'L1' })))).toStrictEqual(['L2']);
    expect(partsAdded(bank, applied(addPart({ part: { kind: 'fuse' }, id: 'W1.plus' })))).toStrictEqual(['W1.plus-2']);
  });
});

describe('removing parts', () => {
  it('takes what cases and readings say of them along, and notes that nothing touches', () => {
    const draft = applied(removeParts(['A', 'FA', 'W1', 'L1']));
    expect(draft['cases']).toStrictEqual([{ id: 'day' }, { id: 'start' }]);
    expect(draft['readings']).toStrictEqual([]);
    expect(draft['junctions']).toStrictEqual({ M0: { reference: true } });
  });

  it('leaves what others still touch', () => {
    expect(readingIds(applied(removeParts(['L1'])))).toStrictEqual(['R1', 'R2', 'R3']);
    expect(readingIds(applied(removeParts(['FA'])))).toStrictEqual(['R1', 'R2']);
  });
});

describe('renaming a part', () => {
  it('is followed by cases and readings', () => {
    const draft = edited(
      bank,
      renamePart('FA', 'Post fuse'),
      renamePart('W1', 'Run'),
      renamePart('L1', 'Lamp'),
      renamePart('A', 'S'),
    ).draft;
    expect(caseOf(draft, 'day')).toStrictEqual({
      id: 'day',
      stateOfChargeByString: { S: 0.9 },
      set: { 'Post fuse': { ratingA: 50 }, Lamp: { powerW: 80 } },
    });
    expect(caseOf(draft, 'start')).toStrictEqual({ id: 'start', surge: 'Lamp' });
    expect((draft['readings'] as readonly { part?: string }[]).map((reading) => reading.part)).toStrictEqual([
      undefined,
      'Run.plus',
      'Post fuse',
    ]);
  });

  it('to a name in use, or one that no part may have, is refused', () => {
    for (const name of ['CA', 'W1.minus', '', '__proto__', 'a/b']) {
      expect([name, applyEdit(bank, renamePart('FA', name), tables).ok]).toStrictEqual([name, false]);
    }
  });
});

describe('a field', () => {
  it('set anew is a label figure unless said otherwise', () => {
    const draft = applied(setField({ part: 'CA', field: 'lengthM', value: 1.2 }));
    expect(part(draft, 'CA')).not.toHaveProperty('origin');
    expect(part(draft, 'CA')).toHaveProperty('range', { lengthM: [0.5, 1.5] });
    const measured = applied(setField({ part: 'CA', field: 'lengthM', value: '2 m', origin: 'measured' }));
    expect(part(measured, 'CA')).toMatchObject({ lengthM: '2 m', origin: { lengthM: 'measured' } });
    // The old range leaves 2 m out, so it no longer says anything.
    expect(part(measured, 'CA')).not.toHaveProperty('range');
  });

  it('taken away goes with its origin; a required one becomes a marked guess', () => {
    expect(part(applied(setField({ part: 'CA', field: 'endOhm', value: undefined })), 'CA')).not.toHaveProperty(
      'endOhm',
    );
    expect(part(applied(setField({ part: 'FA', field: 'ratingA', value: undefined })), 'FA')).toMatchObject({
      ratingA: 40,
      origin: { ratingA: 'guess' },
    });
    expect(part(applied(setField({ part: 'L1', field: 'powerW', value: undefined })), 'L1')).toMatchObject({
      powerW: 50,
      origin: { powerW: 'guess' },
    });
  });

  it('that states a load replaces the other ways to state it', () => {
    const load = part(applied(setField({ part: 'L1', field: 'currentA', value: 4 })), 'L1');
    expect(load).toMatchObject({ currentA: 4 });
    expect(load).not.toHaveProperty('powerW');
  });

  it('may be a terminal', () => {
    expect(part(applied(setField({ part: 'W1', field: 'from.plus', value: 'P2' })), 'W1')).toHaveProperty('from', {
      plus: 'P2',
      minus: 'M0',
    });
    expect(part(applied(setField({ part: 'A', field: 'midpoint', value: undefined })), 'A')).not.toHaveProperty(
      'midpoint',
    );
  });

  it('has a range and an origin of its own', () => {
    const draft = edited(
      bank,
      setRange({ part: 'FA', field: 'ratingA', range: [50, 70] }),
      setOrigin({ part: 'FA', field: 'ratingA', origin: 'measured' }),
    ).draft;
    expect(part(draft, 'FA')).toMatchObject({ range: { ratingA: [50, 70] }, origin: { ratingA: 'measured' } });
    expect(applyEdit(bank, setRange({ part: 'FA', field: 'ratingA', range: [70, 50] }), tables).ok).toBe(false);
  });

  it.each(['id', 'kind', '__proto__', 'constructor'])('called %s is left alone', (field) => {
    expect(applied(setField({ part: 'FA', field, value: 'x' }))).toBe(bank);
  });

  it('that no part has is refused', () => {
    expect(applyEdit(bank, setField({ part: 'FA', field: 'colour', value: 'red' }), tables).ok).toBe(false);
  });

  it('says in the history what was done', () => {
    expect(setField({ part: 'F3', field: 'ratingA', value: 60 }).label).toBe('F3: rating 60 A');
    expect(setField({ part: 'B1', field: 'stateOfCharge', value: 0.5 }).label).toBe('B1: state of charge 50 %');
  });
});

describe('changing the kind of a part', () => {
  it('keeps its place and what both kinds have', () => {
    const draft = applied(changeKind('FA', 'breaker'));
    expect(part(draft, 'FA')).toMatchObject({
      kind: 'breaker',
      from: 'A+',
      to: 'FA out',
      ratingA: 60,
      at: { x: 40, y: 0 },
    });
    expect(readingIds(draft)).toContain('R3');
  });

  it('guesses what the new kind needs and drops what it cannot have', () => {
    const draft = applied(changeKind('FA', 'joint'));
    expect(part(draft, 'FA')).toMatchObject({
      kind: 'joint',
      resistanceOhm: 0.0001,
      origin: { resistanceOhm: 'guess' },
    });
    expect(part(draft, 'FA')).not.toHaveProperty('ratingA');
    expect(caseOf(draft, 'day')).toHaveProperty('set', { L1: { powerW: 80 } });
  });

  it('drops the start of a load that is none any more', () => {
    expect(caseOf(applied(changeKind('L1', 'charger')), 'start')).toStrictEqual({ id: 'start' });
    expect(caseOf(applied(changeKind('A', 'load')), 'day')).not.toHaveProperty('stateOfChargeByString');
  });

  it('to one that touches otherwise changes nothing', () => {
    expect(applied(changeKind('FA', 'load'))).toBe(bank);
    expect(kindsAlike('fuse')).toContain('switch');
    expect(kindsAlike('busbar')).toStrictEqual(['busbar']);
  });
});

describe('copies', () => {
  it('meet other parts where the first ones do, and each other at junctions of their own', () => {
    const draft = applied(duplicateParts(['FA', 'CA'], { x: 0, y: 100 }));
    const [fuse, cable] = partsAdded(bank, draft).map((id) => part(draft, id)!);
    expect([fuse!['from'], cable!['to']]).toStrictEqual(['A+', 'P1']);
    expect(fuse!['to']).toBe(cable!['from']);
    expect(fuse!['to']).not.toBe('FA out');
    expect(fuse!['at']).toStrictEqual({ x: 40, y: 100 });
  });

  it('pasted into another job stay joined among themselves', () => {
    const clip = copyParts(bank, ['A', 'FA', 'CA']);
    const paste = pasteParts(clip, { at: { x: 500, y: 500 } });
    if (!('apply' in paste)) throw new Error('the copied parts are parts');
    const draft = applied(paste, empty24);
    expect(part(draft, 'FA')).toMatchObject({ from: part(draft, 'A')!['plus'], at: { x: 540, y: 500 } });
    expect(draft['junctions']).toStrictEqual({ 'A+': { label: 'post', at: { x: 510, y: 520 } } });
  });

  it.each([
    '',
    'a word',
    '{}',
    '{"format":"ohmwright-parts","version":9}',
    '{"format":"ohmwright-parts","version":1,"jobVersion":1,"parts":[{"id":"F1","kind":"fuse"}]}',
  ])('are not made of %j', (text) => {
    const issues = pasteParts(text);
    expect('apply' in issues ? [] : issues).not.toHaveLength(0);
  });
});

describe('junctions', () => {
  it('renamed are followed by parts, cases, readings and notes', () => {
    const draft = edited(
      bank,
      renameJunction('L+', 'Lamp plus'),
      renameJunction('A+', 'Post'),
      renameJunction('P1', 'Tap'),
    ).draft;
    expect(part(draft, 'W1')).toHaveProperty('to', { plus: 'Lamp plus', minus: 'L-' });
    expect(part(draft, 'BAR+')).toHaveProperty('junctions', ['P0', 'Tap', 'P2']);
    expect(draft['junctions']).toHaveProperty('Post', { label: 'post', at: { x: 10, y: 20 } });
    expect(draft['readings']).toHaveProperty('[0].plus', 'Lamp plus');
  });

  it('joined are one, under the first name', () => {
    const draft = applied(joinJunctions('P0', 'P1'));
    expect(part(draft, 'BAR+')).toHaveProperty('junctions', ['P0', 'P2']);
    expect(part(draft, 'CA')).toHaveProperty('to', 'P0');
  });

  it('that are the two ends of one part cannot be joined', () => {
    expect(applyEdit(bank, joinJunctions('L+', 'L-'), tables).ok).toBe(false);
  });

  it('are left by a terminal that is taken off, and come back when it is put on again', () => {
    const apart = applied(detach({ part: 'CA', terminal: 'to' }));
    expect(part(apart, 'CA')).toHaveProperty('to', 'CA to');
    expect(applied(attach({ part: 'CA', terminal: 'to', junction: 'P1' }), apart)).toStrictEqual(bank);
    expect(applied(detach({ part: 'BAR+', terminal: 'junctions[2]' }))).toBe(bank);
  });

  it('have one reference, and labels', () => {
    const draft = edited(bank, setReference('M1'), labelJunction('M1', 'ground')).draft;
    expect(draft['junctions']).toMatchObject({ M1: { reference: true, label: 'ground' } });
    expect(draft['junctions']).not.toHaveProperty('M0.reference');
  });

  it('along a bar are taps that come and go', () => {
    const draft = edited(
      bank,
      addTap({ busbar: 'BAR+', index: 0 }),
      removeTap({ busbar: 'BAR+', junction: 'P2' }),
    ).draft;
    expect(part(draft, 'BAR+')).toHaveProperty('junctions', ['BAR+ tap 4', 'P0', 'P1']);
  });
});

describe('connecting', () => {
  it('puts a part between two junctions, or a run between two pairs of poles', () => {
    const draft = edited(
      bank,
      connect({ from: 'P2', to: 'here', with: { kind: 'fuse', ratingA: 10 } }),
      connect({
        from: { plus: 'here', minus: 'M2' },
        to: { plus: 'x+', minus: 'x-' },
        with: { kind: 'pair', lengthM: 3 },
      }),
    ).draft;
    expect(part(draft, 'F1')).toMatchObject({ from: 'P2', to: 'here' });
    expect(part(draft, 'W2')).toMatchObject({
      from: { plus: 'here', minus: 'M2' },
      size: '16 mm2',
      origin: { size: 'guess' },
    });
  });

  it('puts a part in line at one end of a cable', () => {
    const draft = applied(insertInto({ cable: 'CA', end: 'to', part: { kind: 'switch' } }));
    expect(part(draft, 'S1')).toMatchObject({ from: part(draft, 'CA')!['to'], to: 'P1' });
  });

  it('puts a part into the return of a run, along its current', () => {
    const draft = applied(insertInto({ cable: 'W1.minus', end: 'from', part: { kind: 'joint' } }));
    expect(part(draft, 'J1')).toMatchObject({ from: 'L-', to: (part(draft, 'W1')!['to'] as { minus: string }).minus });
  });

  it('adds a string like another, with leads of its own to the same bars', () => {
    const draft = applied(parallelString('A'));
    expect(partsAdded(bank, draft)).toStrictEqual(['A-2', 'FA-2', 'CA-2', 'RA-2']);
    expect(part(draft, 'CA-2')).toMatchObject({ from: part(draft, 'FA-2')!['to'], to: 'P1', lengthM: '3 ft' });
    expect(part(draft, 'RA-2')).toMatchObject({ from: 'M1', to: part(draft, 'A-2')!['minus'] });
    expect(terminalsOf(rawPart(draft, 'A-2')!).map(({ junction }) => junction)).toStrictEqual([
      'A-2 plus',
      'A-2 minus',
      'A-2 midpoint',
    ]);
  });

  it('puts a guessed lead where the first string has none', () => {
    const { draft } = exampleDraft('weekend-hut');
    const now = applied(parallelString('BLOCK'), draft);
    expect(partsAdded(draft, now)).toStrictEqual(['BLOCK-2', 'F5', 'C1', 'C2']);
    expect(part(now, 'C2')).toMatchObject({ from: 'post-', origin: { lengthM: 'guess', size: 'guess' } });
  });
});

describe('the drawing', () => {
  it('is moved and tidied', () => {
    const moved = applied(
      move({ parts: { FA: { x: 1, y: 2 } }, junctions: { P0: { x: 3, y: 4 }, nowhere: { x: 0, y: 0 } } }),
    );
    expect(part(moved, 'FA')).toHaveProperty('at', { x: 1, y: 2 });
    expect(moved['junctions']).toHaveProperty('P0', { at: { x: 3, y: 4 } });
    expect(moved['junctions']).not.toHaveProperty('nowhere');
    expect(place({}).label).toBe('Tidied the drawing');
  });
});

describe('cases', () => {
  it('come, go and get other names, readings with them', () => {
    const draft = applied(renameCase('day', 'noon'));
    expect((draft['readings'] as readonly { case?: string }[])[0]!.case).toBe('noon');
    expect(readingIds(applied(removeCase('day')))).toStrictEqual(['R3']);
    expect(caseOf(applied(addCase({ id: 'night', label: 'Night', like: 'day' })), 'night')).toMatchObject({
      label: 'Night',
      set: { FA: { ratingA: 50 } },
    });
  });

  it('put first into a job keep the drawing as a case', () => {
    const draft = applied(addCase({ id: 'night' }), empty24);
    expect((draft['cases'] as readonly { id: string }[]).map(({ id }) => id)).toStrictEqual(['as-drawn', 'night']);
  });

  it('set fields of the case and of its parts', () => {
    const draft = edited(
      bank,
      setCase({ case: 'day', field: 'stateOfCharge', value: 0.4 }),
      setInCase({ case: 'day', part: 'FA', field: 'state', value: 'open' }),
      setInCase({ case: 'day', part: 'FA', field: 'ratingA', value: undefined }),
      setInCase({ case: 'day', part: 'L1', field: 'powerW', value: undefined }),
    ).draft;
    expect(caseOf(draft, 'day')).toStrictEqual({
      id: 'day',
      stateOfChargeByString: { A: 0.9 },
      stateOfCharge: 0.4,
      set: { FA: { state: 'open' } },
    });
  });

  it('can show a bad lug, and leave the honest job alone', () => {
    const honest = exampleDraft('weekend-hut');
    const { draft, job } = edited(honest.draft, seedBadLug(honest, tables));
    const bad = runChecks({ job, tables }).findings.filter(({ severity }) => severity !== 'note');
    expect(bad.length).toBeGreaterThan(0);
    expect(new Set(bad.map((finding) => finding.case))).toStrictEqual(new Set(['bad-lug']));
    expect(applied(removeCase('bad-lug'), draft)).toStrictEqual(honest.draft);
    const nothing = read(JSON.stringify(empty24));
    expect(applied(seedBadLug(nothing, tables), nothing.draft)).toBe(nothing.draft);
  });
});

describe('the head of a job', () => {
  it('is set by path, and groups that become empty go', () => {
    const draft = edited(
      bank,
      setTop({ path: 'title', value: 'New' }),
      setTop({ path: 'site.latitudeDeg', value: 60 }),
    ).draft;
    expect([draft['title'], draft['site']]).toStrictEqual(['New', { latitudeDeg: 60 }]);
    expect(applied(setTop({ path: 'site.latitudeDeg', value: undefined }), draft)).not.toHaveProperty('site');
  });

  it.each(['parts', 'format', 'site.a.b', '__proto__', 'site.__proto__', 'nonsense'])(
    'does not take the path %s',
    (path) => {
      expect(applied(setTop({ path, value: 'x' }))).toBe(bank);
    },
  );

  it('has rows of demand', () => {
    const draft = edited(
      bank,
      addDemand({ label: 'Lamp', powerW: 5 }),
      setDemand({ row: 0, field: 'hoursPerDay', value: 3 }),
    ).draft;
    expect(draft['demand']).toStrictEqual([{ label: 'Lamp', powerW: 5, hoursPerDay: 3 }]);
    expect(applied(removeDemand(0), draft)).toStrictEqual(bank);
  });
});
