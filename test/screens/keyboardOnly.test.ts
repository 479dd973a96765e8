/** A whole sitting without a mouse or a finger: nothing here but keys. */
import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { stored, storedPart } from './acts.ts';
import { allKept, endHost, type Host, launch, type Opened, openApp, startHost } from './app.ts';

let browser: Browser;
let host: Host;
let opened: Opened;
let page: Page;

beforeAll(async () => {
  [browser, host] = await Promise.all([launch(), startHost()]);
  opened = await openApp(browser, host, { reducedMotion: 'reduce' });
  page = opened.page;
});
afterAll(async () => {
  await browser.close();
  await endHost(host);
});

/** Stops at which one could not see where one is; must stay empty. */
const unseen = new Set<string>();
/** More than any stage has. */
const MOST_STOPS = 150;

interface Stop {
  /** Name and kind, as `textbox Length`. */
  readonly name: string;
  readonly isBody: boolean;
  readonly isSeen: boolean;
  /** Why it is not seen. */
  readonly why: string;
  /** The part of the page that it stands in. */
  readonly part: string;
}

/** Where the focus is, and whether that can be seen. */
function here(): Promise<Stop> {
  return page.evaluate(() => {
    const at = document.activeElement ?? document.body;
    const ring = (element: Element | null): boolean => {
      if (element === null) return false;
      const { outlineStyle, outlineWidth } = getComputedStyle(element);
      return outlineStyle !== 'none' && Number.parseFloat(outlineWidth) > 0;
    };
    const frame = at.closest('.MuiInputBase-root')?.querySelector('fieldset') ?? null;
    const line = frame === null ? at.closest('.Mui-focused') : null;
    const underlined = line !== null && Number.parseFloat(getComputedStyle(line, '::after').borderBottomWidth) >= 2;
    const shape = at instanceof SVGElement ? at.querySelector('rect') : null;
    const drawn = shape !== null && getComputedStyle(shape).stroke !== 'none';
    const framed = frame !== null && Number.parseFloat(getComputedStyle(frame).borderTopWidth) >= 2;
    const box = at.getBoundingClientRect();
    const label = at instanceof HTMLInputElement ? at.labels?.[0]?.textContent : undefined;
    const name = at.getAttribute('aria-label') ?? label ?? at.textContent;
    const inView = box.bottom > 0 && box.right > 0 && box.top < innerHeight && box.left < innerWidth;
    return {
      name: `${at.getAttribute('role') ?? at.tagName.toLowerCase()} ${name.trim().slice(0, 60)}`,
      isBody: at === document.body,
      why: inView ? 'no ring' : 'out of sight',
      isSeen:
        inView && (ring(at) || ring(at.parentElement) || ring(at.closest('label')) || framed || underlined || drawn),
      part: (at.closest('main') ?? at.closest('header, nav, aside, footer, [role=presentation]'))?.tagName ?? 'none',
    };
  });
}

async function step(key: 'Tab' | 'Shift+Tab' = 'Tab'): Promise<Stop> {
  await page.keyboard.press(key);
  const stop = await here();
  if (!stop.isBody && !stop.isSeen) unseen.add(`${stop.part}: ${stop.name} (${stop.why})`);
  return stop;
}

/** Goes on from stop to stop until one is reached by its name; returns how many steps it took. */
async function walkTo(name: RegExp, key: 'Tab' | 'Shift+Tab' = 'Tab'): Promise<number> {
  const passed: string[] = [];
  for (let steps = 1; steps <= MOST_STOPS; steps += 1) {
    const stop = await step(key);
    if (name.test(stop.name)) return steps;
    passed.push(stop.name);
  }
  throw new Error(`no stop is called ${String(name)}; there are: ${[...new Set(passed)].join(' | ')}`);
}

/** Once round the page, from its first stop until that comes again: from a stop that is a trap it never does. */
async function round(): Promise<readonly Stop[]> {
  await walkTo(/^button Jobs$/);
  const stops: Stop[] = [await here()];
  for (let steps = 0; steps < MOST_STOPS; steps += 1) {
    const stop = await step();
    if (stop.name === 'button Jobs') return stops;
    if (!stop.isBody) stops.push(stop);
  }
  throw new Error(
    `no end after ${String(MOST_STOPS)} stops: ${stops
      .map(({ name }) => name)
      .slice(-8)
      .join(' | ')}`,
  );
}

/** Types over what stands in the field. */
async function type(text: string): Promise<void> {
  await page.keyboard.press('Control+a');
  await page.keyboard.type(text);
  await page.keyboard.press('Enter');
}

async function find(text: string): Promise<void> {
  await page.keyboard.press('Control+k');
  await page.getByRole('combobox', { name: /Find parts/ }).waitFor();
  await page.keyboard.type(text);
  await page.keyboard.press('Enter');
}

const heading = (name: string) => page.getByRole('heading', { level: 1, name }).waitFor();
const found = () => page.getByRole('main').getByText(/findings?, worst first|^No finding in/);

describe.sequential('a sitting with the keyboard alone', () => {
  test('from the start screen, a small job is described and opened', async () => {
    await walkTo(/^input One load$/);
    await type('150 W');
    await walkTo(/^button Open it in Wiring$/);
    await page.keyboard.press('Enter');
    await page
      .getByRole('contentinfo', { name: 'Balance line' })
      .getByText(/= out 150 W/)
      .waitFor();
  });

  test('a part is found by name, its figure changed, and the focus is in its ledger at once', async () => {
    await find('W2');
    await page.getByRole('article', { name: /^W2, / }).waitFor();
    expect(await walkTo(/^input Length$/)).toBeLessThan(20);
    await type('30 m');
    await allKept(page);
    expect((await storedPart(page, 'W2'))['lengthM']).toBe('30 m');
  });

  test('Ctrl Z takes it back, Ctrl Shift Z makes it again', async () => {
    await walkTo(/^button/);
    await page.keyboard.press('Control+z');
    await expect.poll(async () => (await storedPart(page, 'W2'))['lengthM']).not.toBe('30 m');
    await page.keyboard.press('Control+Shift+z');
    await expect.poll(async () => (await storedPart(page, 'W2'))['lengthM']).toBe('30 m');
  });

  test('in Findings one is opened, and its change made', async () => {
    await walkTo(/^button Findings/);
    await page.keyboard.press('Enter');
    await heading('Findings');
    await found().waitFor();
    const before = await found().textContent();
    await walkTo(/^button (?:Stop|Fix|Look)/i);
    while (!(await page.evaluate(() => document.activeElement?.hasAttribute('data-finding') === true))) await step();
    await page.keyboard.press('Enter');
    await page.getByRole('button', { name: 'Make this change' }).first().waitFor();
    await walkTo(/^button Make this change$/);
    await page.keyboard.press('Enter');
    await expect.poll(() => found().textContent()).not.toBe(before);
    await allKept(page);
    expect((await here()).isBody).toBe(false);
  });

  test('in Site a figure is given', async () => {
    await find('Go to Site');
    await heading('Site');
    await walkTo(/^input Coldest air$/);
    await type('14 F');
    await allKept(page);
    expect(JSON.parse((await stored(page)).text)).toMatchObject({ site: { ambientMinDegC: '14 F' } });
  });

  test('in Handover the paper is saved', async () => {
    await find('Go to Handover');
    await heading('Handover');
    await walkTo(/^button Save the PDF$/);
    await page.keyboard.press('Enter');
    await page.getByText(/^Saved as /).waitFor();
  });

  test('the history opens, a snapshot is named, and Escape leads back to where one was', async () => {
    await walkTo(/^button History$/);
    await page.keyboard.press('Enter');
    await page.getByRole('heading', { name: 'History' }).waitFor();
    await walkTo(/^input Name this state/);
    await type('By keys alone');
    await page.getByText('◆ By keys alone').waitFor();
    await page.keyboard.press('Escape');
    await page.getByRole('heading', { name: 'History' }).waitFor({ state: 'detached' });
    expect((await here()).name).toBe('button History');
  });

  test.each(['Site', 'Strings', 'Findings', 'Handover', 'Wiring'])(
    'in %s the stops go from the top bar over the stages and the stage to the ledger, and come to an end',
    async (stage) => {
      await find(`Go to ${stage}`);
      if (stage !== 'Wiring') await heading(stage);
      const parts = (await round()).map(({ part }) => part);
      const order = parts.filter((part, index) => part !== parts[index - 1]);
      expect(order).toEqual(['HEADER', 'NAV', 'MAIN', 'ASIDE', 'FOOTER'].filter((part) => parts.includes(part)));
      expect(parts).toContain('MAIN');
    },
  );

  test('and back to the list of jobs, where the job stands', async () => {
    await find('Back to the list of jobs');
    await page.getByRole('heading', { name: 'Start small' }).waitFor();
    await walkTo(/^button My system/);
  });

  test('at every stop on the way one could see where one was', () => {
    expect([...unseen]).toEqual([]);
  });
});

test('nothing went wrong unseen: no error, no broken policy, no request elsewhere', () => {
  expect(opened.wrongs).toEqual([]);
});
