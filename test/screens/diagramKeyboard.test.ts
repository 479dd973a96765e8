/** The wiring drawing without a mouse: every act of the hand has its keys. */
import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, beforeEach, describe, expect, test } from 'vitest';
import { balance, ledger, stored, storedPart } from './acts.ts';
import { allKept, endHost, type Host, launch, type Opened, openApp, startHost } from './app.ts';
import {
  gripOf,
  hut,
  middleOf,
  openDrawing,
  panOf,
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

/** What the keyboard stands on, by its name. */
const standsOn = () => page.evaluate(() => document.activeElement?.getAttribute('aria-label') ?? '');
async function press(...keys: readonly string[]): Promise<void> {
  for (const key of keys) await page.keyboard.press(key);
}
/** Tab from a tool of the drawing until a part is reached. */
async function tabTo(part: string): Promise<void> {
  await page.getByRole('toolbar', { name: 'Drawing' }).getByRole('button', { name: 'Volt walk' }).focus();
  for (let step = 0; step < 60; step++) {
    await press('Tab');
    if (new RegExp(`^[\\w -]+ ${part}, `).test(await standsOn())) return;
  }
  throw new Error(`Tab never comes to ${part}`);
}

describe.sequential('with the keyboard alone', () => {
  beforeEach(() => openDrawing(page, hut));

  test('a part is put on the drawing from the palette', async () => {
    await page.getByRole('toolbar', { name: 'Drawing' }).getByRole('button', { name: 'Volt walk' }).focus();
    while (!(await page.evaluate(() => document.activeElement?.textContent?.includes('Load') ?? false)))
      await press('Tab');
    await press('Enter');
    const load = await untilParts(page, HUT_PARTS + 1);
    expect(load).toMatchObject({ kind: 'load' });
    expect(await selected(page)).toEqual([load['id']]);
  });

  test('Tab walks all parts in reading order, each with its figures', async () => {
    await tabTo('F1');
    const names = [await standsOn()];
    for (let step = 1; step < HUT_PARTS; step++) {
      await press('Tab');
      const name = await standsOn();
      if (name !== '') names.push(name);
    }
    const ids = (await storedIds(page)).filter((id) => names.some((name) => name.includes(` ${id}`)));
    expect(ids.length).toBeGreaterThanOrEqual(HUT_PARTS - 1);
    expect(names[0]).toMatch(/^Fuse F1, Main fuse, on the post, 30\sA, carries 7\.68\sA from post\+ to F1 out$/);
    expect(names.findIndex((name) => name.includes(' F2,'))).toBeLessThan(
      names.findIndex((name) => name.includes(' F4,')),
    );
  });

  test('a part that Tab comes to is brought into view', async () => {
    await openDrawing(page, seeded);
    const drawing = await page.locator('.drawing').boundingBox();
    const tools = page.getByRole('toolbar', { name: 'Drawing' });
    while ((await zoomOf(page)) < 1.2) await tools.getByRole('button', { name: 'Zoom in' }).click();
    const first = await panOf(page);
    await tabTo('H1');
    for (let step = 0; step < 12; step++) {
      await press('Tab');
      // It is brought there in the next frames.
      await expect.poll(async () => isWithin(drawing, await middleOf(page.locator(':focus')))).toBe(true);
    }
    expect(await panOf(page)).not.toEqual(first);
  });

  test('arrows move a part by a step of the grid, with Shift by four', async () => {
    await tabTo('F2');
    await press('ArrowDown');
    await expect.poll(() => placeOf(page, 'F2')).toEqual({ x: 520, y: 130 });
    expect(await standsOn()).toMatch(/^Fuse F2/);
    await press('Shift+ArrowRight');
    await expect.poll(() => placeOf(page, 'F2')).toEqual({ x: 560, y: 130 });
    await press('Control+z', 'Control+z');
    await expect.poll(() => placeOf(page, 'F2')).toEqual({ x: 520, y: 120 });
  });

  test('several parts are chosen with the space bar and moved together', async () => {
    await tabTo('LIGHTS');
    await press(' ');
    await tabTo('PUMP');
    await press(' ');
    expect((await selected(page)).toSorted()).toEqual(['LIGHTS', 'PUMP']);
    await press('ArrowRight');
    await expect.poll(() => placeOf(page, 'LIGHTS')).toEqual({ x: 770, y: 160 });
    expect(await placeOf(page, 'PUMP')).toEqual({ x: 770, y: 320 });
    await press('Escape');
    expect(await selected(page)).toEqual([]);
  });

  test('c connects: the end is found by typing, the length is written, and a cable lies', async () => {
    await tabTo('PUMP');
    await press('c');
    await page.getByRole('menu', { name: 'Connect PUMP from' }).waitFor();
    await press('Enter');
    const chooser = page.getByRole('dialog', { name: 'Connect PUMP+ to' });
    await chooser.getByRole('searchbox').waitFor();
    await expect.poll(standsOn).toMatch(/Find a junction/);
    await page.keyboard.type('RADIO+');
    await press('Enter');
    const box = page.getByRole('dialog', { name: 'Connect PUMP+ to RADIO+' });
    await box.waitFor();
    while (!(await page.evaluate(() => document.activeElement?.textContent === 'Run a cable'))) await press('Tab');
    await press('Enter');
    expect(await untilParts(page, HUT_PARTS + 1)).toMatchObject({ kind: 'cable', from: 'PUMP+', to: 'RADIO+' });
    await balance(page)
      .getByText(/= out 95 W/)
      .waitFor();
  });

  test('j steps through the junctions of a part, and c connects from the one it stands at', async () => {
    await tabTo('PUMP');
    const chosen = () =>
      page.evaluate(() => document.querySelector<HTMLElement>('.react-flow__node-junction.selected')?.dataset['id']);
    await press('j');
    expect(await chosen()).toBe('j:PUMP+');
    await press('j');
    expect(await chosen()).toBe('j:PUMP-');
    await press('c');
    await page.getByRole('dialog', { name: 'Connect PUMP- to' }).waitFor();
    await press('Escape');
    await expect.poll(() => page.getByRole('dialog').count()).toBe(0);
    expect(await standsOn()).toMatch(/PUMP/);
  });

  test('the key for menus opens the menu of a part, and a fuse is put into a run with it', async () => {
    await tabTo('W3');
    await press('ContextMenu');
    const menu = page.getByRole('menu', { name: 'Part W3' });
    await menu.waitFor();
    while (!(await page.evaluate(() => document.activeElement?.textContent === 'Put a fuse into it')))
      await press('ArrowDown');
    await press('Enter');
    await expect.poll(() => storedIds(page)).toHaveLength(HUT_PARTS + 1);
    expect((await storedPart(page, 'W3'))['from']).not.toMatchObject({ plus: 'F3 out' });
    await press('Shift+F10');
    await page.getByRole('menu').waitFor();
    await press('Escape');
  });

  test('copy, paste, duplicate, cut and delete have their usual keys', async () => {
    await tabTo('F3');
    await press(' ', 'Control+c', 'Control+v');
    expect(await untilParts(page, HUT_PARTS + 1)).toMatchObject({ kind: 'fuse', ratingA: 10 });
    await press('Control+d');
    await untilParts(page, HUT_PARTS + 2);
    await press('Control+x');
    await untilParts(page, HUT_PARTS + 1);
    await press('Escape');
    await tabTo('F3');
    await press('Delete');
    await expect.poll(() => storedIds(page)).not.toContain('F3');
    // The keyboard goes on from the part that stood next.
    expect(await standsOn()).not.toBe('');
    const text = (await storedJob(page)).parts.length;
    await press('Control+a');
    expect(await selected(page)).toHaveLength(text);
    await press('Delete');
    await expect.poll(async () => (await storedJob(page)).parts.length).toBe(0);
    await page.getByRole('heading', { name: 'Start small' }).waitFor();
    await press('Control+z');
    await expect.poll(async () => (await storedJob(page)).parts.length).toBe(text);
  });

  test('undo and redo go back to the very same text', async () => {
    const before = (await stored(page)).text;
    await tabTo('F4');
    await press('ArrowUp', 'ArrowUp', 'Delete');
    await allKept(page);
    const after = (await stored(page)).text;
    await press('Control+z', 'Control+z', 'Control+z');
    await expect.poll(async () => (await stored(page)).text).toBe(before);
    await press('Control+y', 'Control+y', 'Control+y');
    await expect.poll(async () => (await stored(page)).text).toBe(after);
  });

  test('Enter goes to the ledger of the part', async () => {
    await tabTo('F2');
    await press('Enter');
    await ledger(page).getByRole('article', { name: /^F2, / }).waitFor();
    const isThere = () => page.evaluate(() => document.activeElement?.closest('aside article') != null);
    await expect.poll(isThere).toBe(true);
  });

  test('plus, minus and nought zoom in, out and fit the whole', async () => {
    await tabTo('F2');
    const fitted = await zoomOf(page);
    await press('+');
    await expect.poll(() => zoomOf(page)).toBeGreaterThan(fitted * 1.1);
    const near = await zoomOf(page);
    await press('-', '-');
    await expect.poll(() => zoomOf(page)).toBeLessThan(near / 1.1);
    await press('0');
    await expect.poll(() => zoomOf(page)).toBeCloseTo(fitted, 2);
  });

  test('the volt walk is one stop of the Tab key, its steps go by the arrows', async () => {
    const steps = page.getByRole('group', { name: 'Steps of the volt walk' });
    expect(await steps.locator('[tabindex="0"]').count()).toBe(1);
    await steps.locator('[tabindex="0"]').focus();
    await press('ArrowRight', 'ArrowRight');
    const name = await standsOn();
    await press('Enter');
    const [chosen] = await selected(page);
    expect(name).toContain(chosen);
    expect(await steps.locator('[tabindex="0"]').getAttribute('aria-pressed')).toBe('true');
  });

  test('after a click on empty ground the keys of the drawing still work', async () => {
    const box = await page.locator('.drawing').boundingBox();
    await page.mouse.click((box?.x ?? 0) + 30, (box?.y ?? 0) + (box?.height ?? 0) - 30);
    await press('Control+a');
    expect(await selected(page)).toHaveLength(HUT_PARTS);
    expect(await gripOf(page, 'F1').getAttribute('aria-pressed')).toBe('true');
  });
});

test('nothing went wrong on the way', () => {
  expect(opened.wrongs).toEqual([]);
});

function isWithin(
  box: { readonly x: number; readonly y: number; readonly width: number; readonly height: number } | null,
  { x, y }: { readonly x: number; readonly y: number },
): boolean {
  return box !== null && x > box.x && x < box.x + box.width && y > box.y && y < box.y + box.height;
}
