/** The wiring drawing under a mouse, in a real browser, against what the host has kept. */
import { execFileSync } from 'node:child_process';
import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, beforeEach, describe, expect, test } from 'vitest';
import { balance, goStage, historyOf, ledger, stored, storedPart } from './acts.ts';
import { allKept, endHost, type Host, launch, type Opened, openApp, shoot, startHost } from './app.ts';
import {
  cabin,
  dotOf,
  drag,
  emptySpot,
  gripOf,
  hut,
  type JobText,
  middleOf,
  nodeOf,
  openDrawing,
  placeOf,
  seeded,
  selected,
  storedIds,
  storedJob,
  untilParts,
  zoomOf,
} from './drawing.ts';

/** Parts of the weekend hut. */
const HUT_PARTS = 14;
let browser: Browser;
let host: Host;
let opened: Opened;
let page: Page;

beforeAll(async () => {
  [browser, host] = await Promise.all([launch(), startHost()]);
  opened = await openApp(browser, host, {
    reducedMotion: 'reduce',
    permissions: ['clipboard-read', 'clipboard-write'],
  });
  page = opened.page;
});
afterAll(async () => {
  await browser.close();
  await endHost(host);
});

const palette = () => page.getByRole('region', { name: /^Palette/ });
const menuItem = (name: string | RegExp) => page.getByRole('menuitem', { name });
const walk = () => page.getByRole('region', { name: 'Volt walk' });
const tool = (name: string) =>
  page.getByRole('toolbar', { name: 'Drawing' }).getByRole('button', { name, exact: true });

describe.sequential('with the weekend hut open', () => {
  beforeEach(() => openDrawing(page, hut));

  test('a click in the palette puts a part on the drawing, and the balance stays', async () => {
    await palette().getByRole('button', { name: 'load', exact: true }).click();
    const load = await untilParts(page, HUT_PARTS + 1);
    expect(load).toMatchObject({ kind: 'load', at: { x: expect.any(Number) as number } });
    await balance(page)
      .getByText(/in .* W = out .* W \+ heat/)
      .waitFor();
    expect(await selected(page)).toEqual([load['id']]);
  });

  test('a part dragged out of the palette lies where it was dropped', async () => {
    const spot = await emptySpot(page);
    const { x, y } = await middleOf(palette().getByRole('button', { name: 'fuse', exact: true }));
    await page.mouse.move(x, y);
    await page.mouse.down();
    await page.mouse.move(spot.x + 60, spot.y - 40, { steps: 6 });
    await page.mouse.up();
    const fuse = await untilParts(page, HUT_PARTS + 1);
    expect(fuse).toMatchObject({ kind: 'fuse' });
    const { x: left, y: top } = await middleOf(nodeOf(page, String(fuse['id'])));
    // On the grid and clear of others, so not to the pixel.
    expect(Math.abs(left - spot.x - 60)).toBeLessThan(45);
    expect(Math.abs(top - spot.y + 40)).toBeLessThan(45);
  });

  test('a part of the library is found by its words', async () => {
    await palette()
      .getByRole('button', { name: /More parts/ })
      .click();
    const all = page.getByRole('dialog', { name: 'All parts' });
    await all.getByRole('searchbox').fill('fridge');
    await all.getByRole('button').first().click();
    const part = await untilParts(page, HUT_PARTS + 1);
    expect(part).toMatchObject({ kind: 'load' });
    expect(String(part['label'])).toMatch(/fridge/i);
  });

  test('dragging a part is one change that undo takes back', async () => {
    const before = await stored(page);
    const from = await middleOf(gripOf(page, 'LIGHTS'));
    await drag(page, from, { x: from.x + 60, y: from.y - 30 });
    await expect.poll(() => placeOf(page, 'LIGHTS')).not.toEqual({ x: 760, y: 160 });
    const after = await placeOf(page, 'LIGHTS');
    expect(after.x).toBeGreaterThan(760);
    expect(after.y).toBeLessThan(160);
    const [last, one] = await historyOf(page);
    expect(last?.label).toBe('Moved LIGHTS');
    expect(one?.revision).toBe(before.head);
    await page.keyboard.press('Control+z');
    await expect.poll(async () => (await stored(page)).text).toBe(before.text);
  });

  test('what the box takes in is moved together, by the same steps', async () => {
    await page.mouse.click(...spotOf(await emptySpot(page)));
    const [a, b] = [await middleOf(gripOf(page, 'LIGHTS')), await middleOf(gripOf(page, 'RADIO'))];
    await page.keyboard.down('Shift');
    await drag(page, { x: a.x + 60, y: a.y - 45 }, { x: b.x - 5, y: b.y + 30 });
    await page.keyboard.up('Shift');
    expect((await selected(page)).toSorted()).toEqual(['LIGHTS', 'PUMP', 'RADIO']);
    await drag(page, a, { x: a.x + 40, y: a.y });
    await expect.poll(() => placeOf(page, 'LIGHTS')).not.toEqual({ x: 760, y: 160 });
    const xs = await Promise.all(['LIGHTS', 'PUMP', 'RADIO'].map(async (id) => (await placeOf(page, id)).x));
    expect(new Set(xs).size).toBe(1);
    expect(await placeOf(page, 'F2')).toEqual({ x: 520, y: 120 });
  });

  test('a line drawn from dot to dot asks for a cable, and which way its length was measured', async () => {
    await drag(page, await middleOf(dotOf(page, 'PUMP+')), await middleOf(dotOf(page, 'RADIO+')));
    const box = page.getByRole('dialog', { name: 'Connect PUMP+ to RADIO+' });
    await box.getByRole('button', { name: /There and back/ }).click();
    const length = box.getByRole('textbox', { name: /^Length/ });
    await length.fill('8 m');
    await length.press('Enter');
    await box.getByRole('button', { name: 'Run a cable' }).click();
    const cable = await untilParts(page, HUT_PARTS + 1);
    expect(cable).toMatchObject({ kind: 'cable', from: 'PUMP+', to: 'RADIO+' });
    const { lengthM } = cable;
    // There and back over 8 m is a run of 4 m.
    expect(typeof lengthM === 'number' ? `${String(lengthM)} m` : lengthM).toBe('4 m');
    await balance(page)
      .getByText(/in .* W = out 95 W \+ heat/)
      .waitFor();
  });

  test('a line dropped on empty ground offers parts, of which the first terminal is that junction', async () => {
    const from = await middleOf(dotOf(page, 'F4 out'));
    await drag(page, from, { x: from.x - 70, y: from.y + 60 });
    await page
      .getByRole('dialog', { name: 'A new part at F4 out' })
      .getByRole('button', { name: 'Load', exact: true })
      .click();
    expect(await untilParts(page, HUT_PARTS + 1)).toMatchObject({ kind: 'load', plus: 'F4 out' });
  });

  test('two junctions are made one', async () => {
    await drag(page, await middleOf(dotOf(page, 'PUMP+')), await middleOf(dotOf(page, 'LIGHTS+')));
    await page.getByRole('button', { name: /Make them one junction/ }).click();
    await expect.poll(async () => (await storedPart(page, 'PUMP'))['plus']).toBe('LIGHTS+');
    await balance(page)
      .getByText(/= out 95 W/)
      .waitFor();
  });

  test('a fuse is put into a run by its menu', async () => {
    await nodeOf(page, 'W3').click({ button: 'right' });
    await menuItem('Put a fuse into it').click();
    await expect.poll(() => storedIds(page)).toHaveLength(HUT_PARTS + 1);
    const fuse = (await storedJob(page)).parts.find(({ kind, id }) => kind === 'fuse' && !/^F[1-4]$/.test(String(id)));
    expect(fuse).toMatchObject({ from: 'F3 out' });
    expect((await storedPart(page, 'W3'))['from']).toMatchObject({ plus: fuse?.['to'] });
  });

  test('parts are copied, pasted, duplicated, cut and deleted', async () => {
    await gripOf(page, 'F3').click();
    await page.keyboard.press('Control+c');
    await page.keyboard.press('Control+v');
    expect(await untilParts(page, HUT_PARTS + 1)).toMatchObject({ kind: 'fuse', ratingA: 10 });
    await page.keyboard.press('Control+d');
    const third = await untilParts(page, HUT_PARTS + 2);
    expect(await selected(page)).toEqual([third['id']]);
    await page.keyboard.press('Control+x');
    await untilParts(page, HUT_PARTS + 1);
    await gripOf(page, 'F3').click();
    await page.keyboard.press('Delete');
    await expect.poll(() => storedIds(page)).not.toContain('F3');
    await page.mouse.click(...spotOf(await emptySpot(page)));
    await page.keyboard.press('Control+v');
    expect(await untilParts(page, HUT_PARTS + 1)).toMatchObject({ kind: 'fuse', ratingA: 10 });
    // The junctions that it was taken from still stand: it is connected as before.
    await balance(page)
      .getByText(/= out 95 W/)
      .waitFor();
  });

  test('what was copied in one job is pasted into another', async () => {
    await nodeOf(page, 'W2').click();
    await page.keyboard.press('Control+c');
    await openDrawing(page, cabin);
    const { length } = await storedIds(page);
    await page.mouse.click(...spotOf(await emptySpot(page)));
    await page.keyboard.press('Control+v');
    expect(await untilParts(page, length + 1)).toMatchObject({ kind: 'pair', lengthM: 6, size: '2.5 mm2' });
  });

  test('thirty changes are undone to the very same text, and done again', async () => {
    const first = (await stored(page)).text;
    await gripOf(page, 'F2').click();
    for (let step = 0; step < 30; step++) await page.keyboard.press(step % 2 === 0 ? 'ArrowUp' : 'ArrowRight');
    await allKept(page);
    const last = (await stored(page)).text;
    expect(await placeOf(page, 'F2')).not.toEqual({ x: 520, y: 120 });
    for (let step = 0; step < 30; step++) await page.keyboard.press('Control+z');
    await expect.poll(async () => (await stored(page)).text).toBe(first);
    for (let step = 0; step < 30; step++) await page.keyboard.press('Control+Shift+z');
    await expect.poll(async () => (await stored(page)).text).toBe(last);
  });

  test('tidying lays the drawing out anew, moves nothing else, and can be undone', async () => {
    const before = await stored(page);
    await tool('Tidy').click();
    await expect.poll(async () => (await stored(page)).head).not.toBe(before.head);
    await allKept(page);
    const bare = (text: string) => (JSON.parse(text) as JobText).parts.map((part) => ({ ...part, at: 'anywhere' }));
    expect(bare((await stored(page)).text)).toEqual(bare(before.text));
    await page.keyboard.press('Control+z');
    await expect.poll(async () => (await stored(page)).text).toBe(before.text);
  });

  test('volts, amps and labels are shown or not, as asked', async () => {
    await page.locator('.volts').first().waitFor();
    for (const [name, what] of [
      ['Volts', '.drawing .volts'],
      ['Amps', '.drawing .wires .amps text'],
      ['Labels', '.drawing .words .label'],
    ] as const) {
      const count = () => page.locator(`${what}:visible`).count();
      // Labels are shown once the drawing stands large enough.
      while ((await zoomOf(page)) < 0.8) await tool('Zoom in').click();
      expect(await count(), name).toBeGreaterThan(0);
      await tool(name).click();
      expect(await tool(name).getAttribute('aria-pressed')).toBe('false');
      expect(await count(), name).toBe(0);
      await tool(name).click();
      expect(await count(), name).toBeGreaterThan(0);
    }
    await tool('Volt walk').click();
    expect(await walk().count()).toBe(0);
    await tool('Volt walk').click();
    await walk().waitFor();
  });

  test('the volt walk says its answer in its title, walks to another load, and its steps select', async () => {
    await walk()
      .getByRole('heading', { name: /^Of 12\.\d V at BLOCK, PUMP, Water pump gets 12\.\d V; / })
      .waitFor();
    await walk().getByRole('combobox', { name: 'Walk to' }).click();
    await page.getByRole('option', { name: /to LIGHTS/ }).click();
    await walk()
      .getByRole('heading', { name: /LIGHTS, Four lamps gets 12\.\d V/ })
      .waitFor();
    await walk()
      .getByRole('button', { name: /^F1, post\+ to F1 out/ })
      .click();
    expect(await selected(page)).toEqual(['F1']);
    await ledger(page).getByRole('article', { name: /^F1, / }).waitFor();
    const rows = walk().getByRole('table', { name: 'Volt walk, step by step' }).getByRole('row');
    const steps = walk().getByRole('group', { name: 'Steps of the volt walk' }).getByRole('button');
    expect(await rows.count()).toBe((await steps.count()) + 1);
  });

  test('figures on the drawing are those of the command line for the saved file', async () => {
    const [download] = await Promise.all([
      page.waitForEvent('download'),
      page.getByRole('button', { name: 'Save file' }).click(),
    ]);
    const cli = new URL('../../dist/cli.mjs', import.meta.url).pathname;
    const out = execFileSync(process.execPath, [
      cli,
      'solve',
      '--json',
      '--quiet',
      '--case',
      'evening',
      await download.path(),
    ]);
    const [solved] = (JSON.parse(out.toString()) as Solved).cases;
    for (const id of ['BLOCK', 'LIGHTS', 'PUMP', 'RADIO', 'F1', 'SW']) {
      const words = (await gripOf(page, id).getAttribute('aria-label')) ?? '';
      const shown = Number(/(?:gives|takes|carries) ([\d.]+) A/.exec(words)?.[1]);
      const told = Math.abs(solved?.parts[id]?.currentA ?? Number.NaN);
      // The drawing shows three digits.
      expect(Math.abs(shown - told), `${id}: ${words}`).toBeLessThanOrEqual(0.005 * told);
    }
    await page.locator('.react-flow__node[data-id="j:LIGHTS+"]').hover();
    const told = solved?.junctions['LIGHTS+'] ?? Number.NaN;
    const title = (await page.locator('.react-flow__node[data-id="j:LIGHTS+"] .junction').getAttribute('title')) ?? '';
    expect(Math.abs(Number(/: ([\d.]+) V/.exec(title)?.[1]) - told), title).toBeLessThanOrEqual(0.005);
  });

  test('a case that collapses says so, on the drawing and in the balance line', async () => {
    await openDrawing(
      page,
      hut.replace(/"surgeW": 120, "surgeS": 1,\s+"minimumV": 10\.5/, '"surgeW": 60000, "surgeS": 1'),
    );
    await ledger(page)
      .getByRole('radio', { name: /The pump starts/ })
      .check();
    await balance(page)
      .getByText(/^No balance in this case: /)
      .waitFor();
    await walk().getByText('This case has no operating point to walk through.').waitFor();
    expect(await page.locator('.drawing .wires .arrow').count()).toBe(0);
    // Nothing is told of what does not exist: no amps and no volts, and the load that asks too much says so.
    expect(await gripOf(page, 'PUMP').getAttribute('aria-label')).toMatch(/, asks for more than can be delivered/);
    expect(await gripOf(page, 'LIGHTS').getAttribute('aria-label')).not.toMatch(/takes|unfed/);
    await page.locator('.react-flow__node').getByText('asks too much').waitFor();
    expect(await page.locator('.drawing .volts').count()).toBe(0);
    await shoot(page, 'wiring-collapse');
  });

  test('every word on the drawing is at least 10 px tall, fitted and enlarged', async () => {
    for (const text of [hut, cabin, seeded]) {
      await openDrawing(page, text);
      expect(await smallestWords(), 'fitted').toBeGreaterThanOrEqual(10);
      await tool('Zoom in').click();
      expect(await smallestWords(), 'one step nearer').toBeGreaterThanOrEqual(10);
    }
  });
});

describe.sequential('with another job open', () => {
  test('another case turns the arrows: by day the strings take, by night they give', async () => {
    await openDrawing(page, cabin);
    const arrow = () => page.locator('[data-part="L-A-"] .arrow').first();
    await expect.poll(() => gripOf(page, 'A').getAttribute('aria-label')).toMatch(/takes 4\.\d+ A/);
    const byDay = await arrow().getAttribute('transform');
    await ledger(page)
      .getByRole('radio', { name: /Winter night/ })
      .check();
    await expect.poll(() => gripOf(page, 'A').getAttribute('aria-label')).toMatch(/gives \d/);
    const turnOf = (transform: string | null) => Number(/rotate\((-?\d+)\)/.exec(transform ?? '')?.[1]);
    expect(Math.abs(turnOf(byDay) - turnOf(await arrow().getAttribute('transform')))).toBe(180);
  });

  test('"Show in the wiring" lights the parts of the finding and brings them into view', async () => {
    await openDrawing(page, seeded);
    await goStage(page, 'Findings');
    await page
      .getByRole('button', { name: /^Show in the wiring/ })
      .first()
      .click();
    const lit = page.locator('.react-flow__node:has(.lit)').first();
    await lit.waitFor();
    const [at, drawing] = [await middleOf(lit), await page.locator('.drawing').boundingBox()];
    expect(at.x > (drawing?.x ?? 0) && at.x < (drawing?.x ?? 0) + (drawing?.width ?? 0)).toBe(true);
    expect(at.y > (drawing?.y ?? 0) && at.y < (drawing?.y ?? 0) + (drawing?.height ?? 0)).toBe(true);
    await shoot(page, 'wiring-lit');
    await page.mouse.click(...spotOf(await emptySpot(page)));
    await expect.poll(() => page.locator('.react-flow__node .lit').count()).toBe(0);
  });

  test('back from another stage the drawing fits its room as before', async () => {
    await openDrawing(page, seeded);
    const before = await zoomOf(page);
    await goStage(page, 'Findings');
    await page.getByRole('heading', { level: 1 }).waitFor();
    await goStage(page, 'Wiring');
    await expect.poll(() => zoomOf(page)).toBeCloseTo(before, 2);
  });

  test('nothing went wrong on the way', () => {
    expect(opened.wrongs).toEqual([]);
  });
});

interface Solved {
  readonly cases: readonly {
    readonly junctions: Readonly<Record<string, number>>;
    readonly parts: Readonly<Record<string, { readonly currentA: number }>>;
  }[];
}
const spotOf = ({ x, y }: { readonly x: number; readonly y: number }): [number, number] => [x, y];

/** Size on the screen of the smallest words that are shown in the stage, px. */
function smallestWords(): Promise<number> {
  return page.getByRole('main').evaluate((main) => {
    const texts = document.createTreeWalker(main, NodeFilter.SHOW_TEXT);
    const sizes: number[] = [];
    for (let text = texts.nextNode(); text !== null; text = texts.nextNode()) {
      const parent = text.parentElement;
      const isShown = parent !== null && (text.textContent ?? '').trim() !== '' && parent.checkVisibility();
      if (!isShown || parent.closest('title, .only-read') !== null) continue;
      const scale = parent.closest('.react-flow__viewport') === null ? 1 : viewportZoom();
      sizes.push(Number.parseFloat(getComputedStyle(parent).fontSize) * scale);
    }
    function viewportZoom(): number {
      const viewport = document.querySelector<HTMLElement>('.react-flow__viewport');
      return viewport === null ? 1 : new DOMMatrix(getComputedStyle(viewport).transform).a;
    }
    return Math.min(...sizes);
  });
}
