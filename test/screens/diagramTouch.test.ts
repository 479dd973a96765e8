/** The wiring drawing under fingers, on a tablet, and in every look: large enough to hit, and no rule of accessibility broken. */
import type { Browser, BrowserContextOptions, CDPSession, Page } from 'playwright-core';
import { afterAll, beforeAll, beforeEach, describe, expect, test } from 'vitest';
import { axeViolations, endHost, type Host, launch, type Opened, openApp, shoot, startHost } from './app.ts';
import {
  emptySpot,
  gripOf,
  hut,
  middleOf,
  openDrawing,
  panOf,
  placeOf,
  type Spot,
  seeded,
  selected,
  untilParts,
  zoomOf,
} from './drawing.ts';

/** Parts of the weekend hut. */
const HUT_PARTS = 14;
/** A finger that stays this long, ms, is no tap. */
const LONG_MS = 750;
const tablet: BrowserContextOptions = {
  viewport: { width: 1024, height: 768 },
  hasTouch: true,
  isMobile: true,
  reducedMotion: 'reduce',
};

let browser: Browser;
let host: Host;
beforeAll(async () => {
  [browser, host] = await Promise.all([launch(), startHost()]);
});
afterAll(async () => {
  await browser.close();
  await endHost(host);
});

describe.sequential('on a tablet', () => {
  let opened: Opened;
  let page: Page;
  let fingers: CDPSession;
  beforeAll(async () => {
    opened = await openApp(browser, host, tablet);
    page = opened.page;
    fingers = await page.context().newCDPSession(page);
  });
  afterAll(() => page.context().close());
  beforeEach(() => openDrawing(page, hut));

  const touch = async (type: 'touchStart' | 'touchMove' | 'touchEnd', points: readonly Spot[]): Promise<void> => {
    const touchPoints = points.map(({ x, y }, id) => ({ x, y, id }));
    await fingers.send('Input.dispatchTouchEvent', { type, touchPoints });
  };
  /** Fingers go from some places to others, all at once. */
  const slide = async (from: readonly Spot[], to: readonly Spot[]): Promise<void> => {
    await touch('touchStart', from);
    for (let step = 1; step <= 8; step++) {
      const between = from.map(({ x, y }, index) => ({
        x: x + (((to[index]?.x ?? x) - x) * step) / 8,
        y: y + (((to[index]?.y ?? y) - y) * step) / 8,
      }));
      await touch('touchMove', between);
    }
    await touch('touchEnd', []);
  };

  test('two fingers that part enlarge the drawing, that meet make it smaller', async () => {
    const { x, y } = await emptySpot(page);
    const fitted = await zoomOf(page);
    await slide(
      [
        { x, y },
        { x: x + 40, y },
      ],
      [
        { x, y },
        { x: x + 120, y: y - 10 },
      ],
    );
    const near = await zoomOf(page);
    expect(near).toBeGreaterThan(fitted * 1.5);
    const spot = await emptySpot(page);
    await slide([spot, { x: spot.x + 120, y: spot.y }], [spot, { x: spot.x + 50, y: spot.y }]);
    expect(await zoomOf(page)).toBeLessThan(near / 1.5);
  });

  test('one finger on empty ground moves the drawing, and no part of it', async () => {
    const spot = await emptySpot(page);
    const before = await panOf(page);
    await slide([spot], [{ x: spot.x + 80, y: spot.y - 60 }]);
    const after = await panOf(page);
    // The first move of a finger is taken to see what it means.
    expect(after.x - before.x).toBeGreaterThan(60);
    expect(before.y - after.y).toBeGreaterThan(40);
    expect(await placeOf(page, 'LIGHTS')).toEqual({ x: 760, y: 160 });
  });

  test('a tap selects', async () => {
    const { x, y } = await middleOf(gripOf(page, 'PUMP'));
    await page.touchscreen.tap(x, y);
    await expect.poll(() => selected(page)).toEqual(['PUMP']);
  });

  test('one finger on a part moves it', async () => {
    const from = await middleOf(gripOf(page, 'LIGHTS'));
    await slide([from], [{ x: from.x + 50, y: from.y }]);
    await expect.poll(async () => (await placeOf(page, 'LIGHTS')).x).toBeGreaterThan(760);
  });

  test('a finger that stays opens the menu of the part, which can be used', async () => {
    const spot = await middleOf(gripOf(page, 'F3'));
    await touch('touchStart', [spot]);
    const menu = page.getByRole('menu', { name: 'Part F3' });
    await page.waitForTimeout(LONG_MS);
    await touch('touchEnd', []);
    await menu.waitFor();
    const item = menu.getByRole('menuitem', { name: /^Duplicate/ });
    expect((await item.boundingBox())?.height).toBeGreaterThanOrEqual(44);
    await item.tap();
    expect(await untilParts(page, HUT_PARTS + 1)).toMatchObject({ kind: 'fuse', ratingA: 10 });
  });

  test('tools and palette are large enough for a finger', async () => {
    const tools = page.getByRole('toolbar', { name: 'Drawing' }).getByRole('button');
    await tools.filter({ hasText: 'Palette' }).tap();
    const palette = page.getByRole('region', { name: /^Palette/ }).getByRole('button');
    await palette.first().waitFor();
    for (const button of [...(await tools.all()), ...(await palette.all())]) {
      const { width, height } = (await button.boundingBox()) ?? { width: 0, height: 0 };
      expect(Math.min(width, height), (await button.textContent()) ?? '').toBeGreaterThanOrEqual(44);
    }
    await palette.first().tap();
    expect(await untilParts(page, HUT_PARTS + 1)).toMatchObject({ kind: 'string' });
  });

  test('nothing went wrong on the way', () => {
    expect(opened.wrongs).toEqual([]);
  });
});

const looks: readonly { readonly name: string; readonly options: BrowserContextOptions; readonly text?: string }[] = [
  // By day and by night every stage is scanned elsewhere, and the ledger of a part as well.
  { name: 'tablet', options: tablet },
  { name: 'large-text', options: {}, text: '200 %' },
];

describe.each(looks)('the wiring by $name', ({ name, options, text }) => {
  test('breaks no rule of accessibility with a part selected', async () => {
    const { page, wrongs } = await openApp(browser, host, { reducedMotion: 'reduce', ...options });
    if (text !== undefined) await chooseText(page, text);
    await openDrawing(page, seeded);
    await page.getByRole('contentinfo', { name: 'Balance line' }).getByText(/= out/).waitFor();
    await gripOf(page, 'H1').focus();
    await page.keyboard.press(' ');
    await expect.poll(() => selected(page)).toEqual(['H1']);
    await shoot(page, `wiring-${name}`);
    expect(await axeViolations(page)).toEqual([]);
    if (text !== undefined) {
      await expectRoomForTheDrawing(page);
      await chooseText(page, '100 %');
    }
    await page.context().close();
    expect(wrongs).toEqual([]);
  });
});

async function chooseText(page: Page, text: string): Promise<void> {
  await page.getByRole('button', { name: 'Looks' }).click();
  await page.getByRole('radio', { name: text }).check();
  await page.getByRole('button', { name: 'Done' }).click();
}

/** With large text, palette and volt walk begin folded; the words of the walk are as large as the rest. */
async function expectRoomForTheDrawing(page: Page): Promise<void> {
  const tools = page.getByRole('toolbar', { name: 'Drawing' });
  for (const name of ['Palette', 'Volt walk']) {
    expect(await tools.getByRole('button', { name }).getAttribute('aria-pressed')).toBe('false');
  }
  const stage = await page.getByRole('main').boundingBox();
  const drawing = await page.locator('.drawing').boundingBox();
  expect(drawing?.width).toBe(stage?.width);
  expect((drawing?.height ?? 0) / (stage?.height ?? 1)).toBeGreaterThan(0.75);
  await tools.getByRole('button', { name: 'Volt walk' }).click();
  const words = page.locator('.volt-walk .step text').first();
  // A line of the usual size is about 15 px tall.
  expect((await words.boundingBox())?.height).toBeGreaterThan(24);
}
