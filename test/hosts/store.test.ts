import { describe, expect, test } from 'vitest';
import type { Store } from '../../electron/store/store.ts';
import { storeFolder } from '../../electron/store/storeFolder.ts';
import { state, tempFolder, tempStore, troubleOf } from './tempStore.ts';

const labels = (line: readonly { readonly label: string }[]): string => line.map(({ label }) => label).join(' ');

/** a — b — c, and after going back to a: a — d. */
async function branched(): Promise<{ store: Store; job: string; numbers: Record<string, number> }> {
  const store = await tempStore();
  const { job, head: a } = store.jobs.create(state('a'));
  const { head: b } = store.jobs.keep(job, a, state('b'));
  const { head: c } = store.jobs.keep(job, b, state('c'));
  store.jobs.go(job, c, a);
  const { head: d } = store.jobs.keep(job, a, state('d'));
  return { store, job, numbers: { a, b, c, d } };
}

describe('a job and its history', () => {
  test('what is kept comes back letter by letter, after the store was closed as well', async () => {
    const folder = tempFolder();
    const text = `{"title":"Hütte ☀ \u0000 \u{1f50b}","x":"${'long '.repeat(50_000)}"}`;
    const first = await tempStore({ folder });
    const { job } = first.jobs.create({
      text,
      title: 'Hütte ☀',
      parts: 7,
      label: 'begun',
      file: '/home/a/hut.job.json',
    });
    first.close();
    const again = await tempStore({ folder });
    expect(again.notices).toEqual([]);
    expect(again.jobs.open(job)).toMatchObject({ text, title: 'Hütte ☀', file: '/home/a/hut.job.json' });
    expect(again.jobs.list()).toMatchObject([{ job, title: 'Hütte ☀', parts: 7, file: '/home/a/hut.job.json' }]);
    again.close();
  });

  test('revisions form a tree: going back and going on loses nothing', async () => {
    const { store, job, numbers } = await branched();
    const history = store.jobs.history(job, 10);
    expect(labels(history)).toBe('d c b a');
    expect(history.map(({ parent }) => parent)).toEqual([numbers['a'], numbers['b'], numbers['a'], null]);
    expect(store.jobs.revision(job, numbers['c']!).text).toBe('c');
  });

  test('undo and redo follow the branch that was visited last', async () => {
    const { store, job, numbers } = await branched();
    expect(labels(store.jobs.line(job, 10))).toBe('a d');
    store.jobs.go(job, numbers['d']!, numbers['a']!);
    expect(labels(store.jobs.line(job, 10))).toBe('a d');
    // Going to c puts its branch in the line again, also after going back up to a.
    store.jobs.go(job, numbers['a']!, numbers['c']!);
    expect(labels(store.jobs.line(job, 10))).toBe('a b c');
    store.jobs.go(job, numbers['c']!, numbers['a']!);
    expect(labels(store.jobs.line(job, 10))).toBe('a b c');
  });

  test('the line shows the nearest states where it is asked for few', async () => {
    const store = await tempStore();
    let { job, head } = store.jobs.create(state('0'));
    for (const name of '123456789') head = store.jobs.keep(job, head, state(name)).head;
    store.jobs.go(job, head, head - 5);
    expect(labels(store.jobs.line(job, 5))).toBe('2 3 4 5 6');
    expect(labels(store.jobs.line(job, 1))).toBe('4');
    expect(labels(store.jobs.line(job, 100))).toBe('0 1 2 3 4 5 6 7 8 9');
    store.jobs.go(job, head - 5, head);
    expect(labels(store.jobs.line(job, 3))).toBe('7 8 9');
  });

  test('the history comes in portions, newest first', async () => {
    const { store, job, numbers } = await branched();
    expect(labels(store.jobs.history(job, 2))).toBe('d c');
    expect(labels(store.jobs.history(job, 2, numbers['c']))).toBe('b a');
  });

  test('a state can be named, renamed and unnamed', async () => {
    const { store, job, numbers } = await branched();
    expect(store.jobs.snapshot(job, numbers['b']!, 'as inspected').snapshot).toBe('as inspected');
    expect(store.jobs.snapshot(job, numbers['b']!, 'as left').snapshot).toBe('as left');
    expect(store.jobs.history(job, 10).map(({ snapshot }) => snapshot)).toEqual([null, null, 'as left', null]);
    expect(store.jobs.snapshot(job, numbers['b']!, '').snapshot).toBeNull();
  });

  test('a job taken off the list can be brought back, and work on it brings it back too', async () => {
    const { store, job } = await branched();
    store.jobs.remove(job);
    expect(store.jobs.list()).toEqual([]);
    expect(store.jobs.restore(job).title).toBe('Title of d');
    store.jobs.remove(job);
    store.jobs.keep(job, store.jobs.head(job), state('e'));
    expect(store.jobs.list().map(({ title }) => title)).toEqual(['Title of e']);
  });

  test('what is not there is said to be not there', async () => {
    const { store, job, numbers } = await branched();
    const other = store.jobs.create(state('other'));
    for (const work of [
      () => store.jobs.open('nobody'),
      () => store.jobs.revision(job, 999),
      () => store.jobs.revision(job, other.head),
      () => store.jobs.go(job, numbers['d']!, other.head),
      () => store.jobs.snapshot(job, other.head, 'x'),
      () => store.jobs.remove('nobody'),
      () => store.person.addReading('nobody', {}),
    ]) {
      expect((await troubleOf(work)).code).toBe('not-found');
    }
    expect(store.jobs.head(job)).toBe(numbers['d']);
  });

  test('half a letter in a title does not make the store doubt itself', async () => {
    const folder = tempFolder();
    const store = await tempStore({ folder });
    store.jobs.create({ text: 't', title: 'half \ud83d and \0 zero', parts: 0, label: '\udc00' });
    store.close();
    const again = await tempStore({ folder });
    expect([again.notices, again.jobs.list()[0]?.title]).toEqual([[], 'half \ufffd and \ufffd zero']);
    again.close();
  });
});

describe('two at one job', () => {
  test('of two connections the second to keep is told of the conflict and where the head is; nothing is lost', async () => {
    const folder = tempFolder();
    const [one, two] = [await tempStore({ folder }), await tempStore({ folder })];
    const { job, head } = one.jobs.create(state('a'));
    expect(two.jobs.open(job).text).toBe('a');
    const { head: mine } = one.jobs.keep(job, head, state('mine'));
    const trouble = await troubleOf(() => two.jobs.keep(job, head, state('theirs')));
    expect(trouble).toMatchObject({ code: 'conflict', head: mine });
    expect(await troubleOf(() => two.jobs.go(job, head, head))).toMatchObject({ code: 'conflict', head: mine });
    two.jobs.keep(job, mine, state('theirs, after mine'));
    expect(labels(one.jobs.history(job, 9))).toBe('theirs, after mine mine a');
    one.close();
    two.close();
  });

  test('a thousand changes from two connections in turn are all there', async () => {
    const folder = tempFolder();
    const stores = [await tempStore({ folder }), await tempStore({ folder })];
    const { job } = stores[0]!.jobs.create(state('begin'));
    for (let round = 0; round < 1000; round += 1) {
      const store = stores[round % 2]!;
      store.jobs.keep(job, store.jobs.head(job), state(`change ${String(round)}`));
    }
    expect(stores[0]!.jobs.history(job, 2000)).toHaveLength(1001);
    for (const store of stores) store.close();
  });
});

describe('the clock', () => {
  test('order is the order of doing, whatever the clock says, and a clock that runs behind is told once', async () => {
    const folder = tempFolder();
    let now = new Date('2031-05-05T12:00:00Z');
    const store = await tempStore({ folder, now: () => now });
    const { job, head } = store.jobs.create(state('a'));
    now = new Date('2019-01-01T00:00:00Z');
    const other = store.jobs.create(state('other'));
    const { head: b } = store.jobs.keep(job, head, state('b'));
    expect(store.notices.map(({ kind }) => kind)).toEqual(['clock-behind']);
    expect(store.notices[0]?.message).toContain('2019-01-01T00:00:00.000Z');
    expect(labels(store.jobs.history(job, 9))).toBe('b a');
    expect(store.jobs.list().map((each) => each.job)).toEqual([job, other.job]);
    expect(store.jobs.history(job, 1)[0]).toMatchObject({ revision: b, at: '2019-01-01T00:00:00.000Z' });
    store.close();
  });

  test('a store of the future is told of at the start; a second of difference is not', async () => {
    const folder = tempFolder();
    const ahead = await tempStore({ folder, now: () => new Date('2030-01-01T00:00:00Z') });
    ahead.jobs.create(state('a'));
    ahead.close();
    const noticesAt = async (at: string): Promise<readonly string[]> => {
      const store = await tempStore({ folder, now: () => new Date(at) });
      store.close();
      return store.notices.map(({ kind }) => kind);
    };
    expect(await noticesAt('2029-12-31T23:00:00Z')).toEqual(['clock-behind']);
    expect(await noticesAt('2029-12-31T23:59:59Z')).toEqual([]);
  });
});

describe('what the person keeps beside jobs', () => {
  test('readings are logged in order and only added', async () => {
    const store = await tempStore();
    const { job } = store.jobs.create(state('a'));
    const reading = { id: 'R1', quantity: 'voltage', plus: 'B+', minus: 'B-', valueV: 12.61 };
    const first = store.person.addReading(job, reading);
    const second = store.person.addReading(job, { ...reading, valueV: 12.4 });
    expect(store.person.readings(job)).toEqual([first, second]);
    expect([first.reading, second.entry > first.entry]).toEqual([reading, true]);
  });

  test('own parts are kept, replaced and removed', async () => {
    const store = await tempStore();
    store.person.keepPart({ id: 'p1', label: 'My fuse', part: { kind: 'fuse', ratingA: 60 } });
    store.person.keepPart({ id: 'p2', label: 'My lamp', part: { kind: 'load', powerW: 8 } });
    store.person.keepPart({ id: 'p1', label: 'My fuse', part: { kind: 'fuse', ratingA: 80 } });
    expect(store.person.ownParts().map(({ id, part }) => [id, part['ratingA']])).toEqual([
      ['p1', 80],
      ['p2', undefined],
    ]);
    store.person.removePart('p1');
    expect((await troubleOf(() => store.person.removePart('p1'))).code).toBe('not-found');
    expect(store.person.ownParts().map(({ id }) => id)).toEqual(['p2']);
  });
});

test.each([
  [{ argument: '/a', env: { OHMWRIGHT_STORE: '/b' }, platform: 'linux' }, '/a'],
  [{ env: { OHMWRIGHT_STORE: '/b' }, platform: 'linux' }, '/b'],
  [{ env: { OHMWRIGHT_STORE: '', XDG_DATA_HOME: '/x' }, platform: 'linux' }, '/x/ohmwright'],
  [{ env: { XDG_DATA_HOME: 'relative' }, platform: 'linux' }, '/home/a/.local/share/ohmwright'],
  [{ env: {}, platform: 'darwin' }, '/home/a/Library/Application Support/Ohmwright'],
  [
    { env: { APPDATA: 'C:\\Users\\a\\AppData\\Roaming' }, platform: 'win32' },
    'C:\\Users\\a\\AppData\\Roaming\\Ohmwright',
  ],
] as const)('the store of %j lies in %s', (place, folder) => {
  expect(storeFolder({ home: '/home/a', ...place })).toBe(folder);
});
