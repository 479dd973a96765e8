import { mkdtempSync, rmSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join, resolve } from 'node:path';
import { pathToFileURL } from 'node:url';
import { describe, expect, test } from 'vitest';
import { isOurAddress, isOurBlob, isOurPage } from '../../electron/window/address.ts';
import { readWords } from '../../electron/window/startWords.ts';
import { type Bounds, keepPlace, readPlace } from '../../electron/window/windowBounds.ts';

describe('the words of a start', () => {
  const read = (...words: string[]) =>
    readWords({ words: ['ohmwright', ...words], folder: '/folder' }, [resolve('/program')]);

  test.each<[string, string[], string[]]>([
    ['a relative name counts from the folder of the start', ['hut.job.json'], [resolve('/folder/hut.job.json')]],
    ['a whole path stays', ['/jobs/hut.job.json'], [resolve('/jobs/hut.job.json')]],
    ['several files keep their order', ['b', 'a'], [resolve('/folder/b'), resolve('/folder/a')]],
    ['switches are no files, those of Chromium neither', ['--flag', '-x', '--with=value'], []],
    ['the address of a file is its path', [pathToFileURL('/jobs/a b.json').href], [resolve('/jobs/a b.json')]],
    ['any other address is not for us', ['https://elsewhere.example/a.json', 'app://ohmwright/'], []],
    ['the program itself is no job', ['/program', ''], []],
  ])('%s', (_what, words, files) => {
    expect(read(...words).files).toEqual(files);
  });

  test('the store is named either way', () => {
    expect(read('--store', 'mine', 'a')).toEqual({ store: resolve('/folder/mine'), files: [resolve('/folder/a')] });
    expect(read('--store=/mine')).toEqual({ store: resolve('/mine'), files: [] });
    expect(read('a').store).toBeUndefined();
  });
});

describe('addresses', () => {
  test.each<[string, boolean, boolean]>([
    ['app://ohmwright/', true, true],
    ['app://ohmwright/#/wiring', true, true],
    ['app://ohmwright/index.html', true, true],
    ['app://ohmwright/assets/a.js', true, false],
    ['APP://ohmwright/', true, true],
    ['app://ohmwright@elsewhere/', false, false],
    ['app://x@ohmwright/', false, false],
    ['app://ohmwright:81/', false, false],
    ['app://ohmwright.elsewhere/', false, false],
    ['app:ohmwright', false, false],
    ['https://ohmwright/', false, false],
    ['', false, false],
  ])('%s: ours %s, the page %s', (address, ours, page) => {
    expect([isOurAddress(address), isOurPage(address)]).toEqual([ours, page]);
  });

  test('only what our own page made in memory is ours', () => {
    expect(['blob:app://ohmwright/1', 'blob:app://ohmwright.x/1', 'blob:null/1'].map(isOurBlob)).toEqual([
      true,
      false,
      false,
    ]);
  });
});

describe('where the window was', () => {
  const screen: Bounds = { x: 0, y: 0, width: 1920, height: 1080 };

  function kept(text: string, screens = [screen]): ReturnType<typeof readPlace> {
    const folder = mkdtempSync(join(tmpdir(), 'ohmwright-place-'));
    writeFileSync(join(folder, 'place.json'), text);
    const place = readPlace(join(folder, 'place.json'), screens);
    rmSync(folder, { recursive: true });
    return place;
  }

  const bounds = { x: 100, y: 50, width: 1400, height: 900 };

  test('is read back as it was kept', () => {
    expect(kept(JSON.stringify({ bounds, maximized: true }))).toEqual({ bounds, maximized: true });
  });

  test.each([
    'not json',
    '[]',
    '{}',
    '{"bounds":null}',
    '{"bounds":{"x":1,"y":2,"width":"wide","height":4}}',
    '{"bounds":{"x":1e9,"y":2,"width":900,"height":700}}',
  ])('counts as unknown where the file makes no sense: %s', (text) => {
    expect(kept(text)).toEqual({ bounds: undefined, maximized: false });
  });

  test('is forgotten where no screen shows its title', () => {
    const away = [
      { ...bounds, x: 1900 },
      { ...bounds, y: -300 },
      { ...bounds, y: 1070 },
    ];
    expect(away.map((each) => kept(JSON.stringify({ bounds: each })).bounds)).toEqual([
      undefined,
      undefined,
      undefined,
    ]);
  });

  test('never comes back smaller than its content allows', () => {
    const tiny = { x: 0, y: 0, width: 10, height: 10 };
    expect(kept(JSON.stringify({ bounds: tiny })).bounds).toEqual({ x: 0, y: 0, width: 900, height: 600 });
  });

  test('a place that cannot be written is no trouble', () => {
    expect(() => keepPlace('/nowhere/at/all.json', { bounds, maximized: false })).not.toThrow();
  });
});
