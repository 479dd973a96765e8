/** From a verdict to the change that answers it: on the sloop with its four seeded troubles, and on jobs that lack something. */
import type { Browser, Locator, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { examples } from '../../data/examples/index.ts';
import { goStage, historyOf, ledger, openText, storedPart } from './acts.ts';
import {
  allKept,
  axeViolations,
  endHost,
  type Host,
  launch,
  type Opened,
  openApp,
  openPattern,
  startHost,
} from './app.ts';

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

const list = (): Locator => page.getByRole('list', { name: 'Findings, worst first' });
const shown = (): Locator => list().locator('[data-finding]');
const severities = (): Promise<readonly string[]> =>
  shown().evaluateAll((heads) => heads.map((head) => /stop|fix|look|note/i.exec(head.textContent)?.[0] ?? ''));
const count = (): Locator => page.getByRole('main').getByText(/findings?, worst first|^No finding in/);
const focused = (): Promise<string | null> =>
  page.evaluate(() => document.activeElement?.getAttribute('data-finding') ?? null);

const WAITING = /(\d+) not done for want of a figure/;

/** The small hut, changed. */
function hut(change: (job: { parts: Record<string, unknown>[] } & Record<string, unknown>) => void): string {
  const text = examples.find(({ name }) => name === 'weekend-hut')?.text ?? '';
  const job = JSON.parse(text) as { parts: Record<string, unknown>[] } & Record<string, unknown>;
  change(job);
  return JSON.stringify(job);
}

describe.sequential('four seeded troubles', () => {
  beforeAll(async () => {
    await openPattern(page, /four seeded troubles/);
    await goStage(page, 'Findings');
    await count().waitFor();
  });

  test('all four are found, ranked: stop before fix before look', async () => {
    const ranks = (await severities()).map((one) => ['stop', 'fix', 'look', 'note'].indexOf(one.toLowerCase()));
    expect(ranks).toEqual(ranks.toSorted((a, b) => a - b));
    expect(ranks.slice(0, 3)).toEqual([0, 0, 1]);
    const told = (await list().textContent()) ?? '';
    for (const trouble of ['W-INV', 'B-4', 'SHORE', 'BILGE']) expect(told).toContain(trouble);
  });

  test('filters by severity, part, words and family narrow the list and say how much is left out', async () => {
    const filters = page.getByRole('search', { name: 'Findings to show' });
    const total = await shown().count();
    await filters.getByRole('button', { name: /2.*stop|stop.*2/i }).click();
    expect(await shown().count()).toBe(2);
    await filters.getByRole('textbox').or(filters.getByRole('searchbox')).fill('cabin');
    await filters.getByRole('button', { name: `1 of ${String(total)} shown: show all` }).click();
    expect(await shown().count()).toBe(total);
    await filters.getByRole('combobox', { name: 'Part' }).selectOption('SHORE');
    for (const told of await shown().allTextContents()) expect(told).toContain('SHORE');
    expect(await shown().count()).toBe(2);
    await filters.getByRole('combobox', { name: 'Part' }).selectOption('');
    await filters.getByRole('combobox', { name: 'Case' }).selectOption('bilge');
    expect(await shown().first().textContent()).toContain('Bilge pump');
    expect(await shown().count()).toBeLessThan(total);
    await filters.getByRole('combobox', { name: 'Case' }).selectOption('');
    await filters.getByRole('combobox', { name: 'About' }).selectOption('fuse');
    const ofFuses = await shown().count();
    expect(await list().textContent()).toContain('B-4');
    await filters.getByRole('button', { name: `${String(ofFuses)} of ${String(total)} shown: show all` }).click();
  });

  test('arrow keys walk, Home and End go to the ends, Enter opens and closes', async () => {
    const keys = await shown().evaluateAll((heads) => heads.map((head) => head.getAttribute('data-finding')));
    await shown().first().focus();
    await page.keyboard.press('ArrowUp');
    expect(await focused()).toBe(keys[0]);
    await page.keyboard.press('ArrowDown');
    expect(await focused()).toBe(keys[1]);
    await page.keyboard.press('End');
    expect(await focused()).toBe(keys.at(-1));
    await page.keyboard.press('Home');
    await page.keyboard.press('Enter');
    expect(await shown().first().getAttribute('aria-expanded')).toBe('true');
    await page.keyboard.press('Enter');
    expect(await shown().first().getAttribute('aria-expanded')).toBe('false');
  });

  test('"Show in the wiring" goes there, with the part selected and the case chosen in which it was found', async () => {
    const charger = list().getByRole('listitem').filter({ hasText: 'Shore charger' }).first();
    await charger.locator('[data-finding]').click();
    await charger.getByRole('button', { name: /^Show in the wiring/ }).click();
    await page.getByRole('article', { name: /^SHORE, / }).waitFor();
    await ledger(page).getByRole('heading', { name: 'In “On shore power”' }).waitFor();
    await goStage(page, 'Findings');
  });

  test('the remedy is tried on a copy: before → after, what goes and what comes; the job is as it was', async () => {
    const before = await historyOf(page);
    await shown().nth(1).click();
    const panel = page.getByRole('region', { name: 'What the remedy would change' });
    await panel.getByText('60 A (limit 52.5 A) → within the limit of 52.5 A').first().waitFor();
    await panel.getByText('this finding').first().waitFor();
    await panel.getByText('No new finding comes by it.').first().waitFor();
    expect(await historyOf(page)).toEqual(before);
    expect(await axeViolations(page)).toEqual([]);
  });

  test('"Make this change" is one edit: the finding goes, the history has one line more, undo takes it all back', async () => {
    const before = await historyOf(page);
    const total = await shown().count();
    await page.getByRole('button', { name: 'Make this change' }).first().click();
    await count()
      .getByText(/worst first: 1 stop/)
      .waitFor();
    expect(await shown().count()).toBeLessThan(total);
    await allKept(page);
    expect((await storedPart(page, 'B-4'))['ratingA']).toBe(50);
    const after = await historyOf(page);
    expect(after.slice(1)).toEqual(before);
    expect(after[0]?.label).toMatch(/B-4.*50 A/);
    await page.keyboard.press('Control+z');
    await count()
      .getByText(/worst first: 2 stop/)
      .waitFor();
    expect(await shown().count()).toBe(total);
    await allKept(page);
    expect((await storedPart(page, 'B-4'))['ratingA']).toBe(60);
  });
});

describe.sequential('a figure is missing', () => {
  test('the check that waits for it is told with its field; filled in there, the check is done', async () => {
    await openText(
      page,
      hut(({ parts }) => {
        for (const part of parts) if (part['id'] === 'F1') delete part['ratingV'];
      }),
    );
    await goStage(page, 'Findings');
    await count().getByText(WAITING).waitFor();
    const before = Number(WAITING.exec((await count().textContent()) ?? '')?.[1]);
    const rated = page.getByRole('textbox', { name: 'Rated volts' });
    await rated.fill('lots');
    await rated.press('Enter');
    await page.getByRole('main').getByRole('alert').waitFor();
    await rated.fill('58 V');
    await rated.press('Enter');
    await rated.waitFor({ state: 'detached' });
    const after = Number(WAITING.exec((await count().textContent()) ?? '')?.[1] ?? 0);
    expect(after).toBeLessThan(before);
    await allKept(page);
    expect((await storedPart(page, 'F1'))['ratingV']).toBe('58 V');
  });
});

describe.sequential('no rule book is named', () => {
  test('that comes first, and is chosen right there', async () => {
    await openText(
      page,
      hut((job) => {
        delete job['practice'];
        delete job['practiceEdition'];
      }),
    );
    await goStage(page, 'Findings');
    await page.getByRole('heading', { name: 'No rule book is applied yet' }).waitFor();
    await count()
      .getByText(/[1-9]\d* not done for want of a figure/)
      .waitFor();
    expect(await axeViolations(page)).toEqual([]);
    await page.getByRole('radio', { name: /IEC 60364/ }).click();
    await page.getByRole('heading', { name: 'No rule book is applied yet' }).waitFor({ state: 'detached' });
    // The choice goes away, and with it the place where the person was: they go on at the head of the list.
    await expect.poll(() => page.evaluate(() => document.activeElement?.tagName)).toBe('OUTPUT');
    await count()
      .getByText(/every check had its figures/)
      .waitFor();
  });
});

describe.sequential('a case has no operating point', () => {
  test('that is told before all else, in plain words, with the load and the most that it could get', async () => {
    await openText(
      page,
      hut(({ parts }) => {
        for (const part of parts) {
          if (part['id'] !== 'PUMP') continue;
          part['powerW'] = 20_000;
          // A load that lets go at a few volts drops out; one that never does pulls the volts down.
          delete part['minimumV'];
        }
      }),
    );
    await goStage(page, 'Findings');
    const trouble = page.getByRole('region', { name: 'Cases without an operating point' });
    await trouble.waitFor();
    const told = (await trouble.textContent()) ?? '';
    expect(told).toMatch(/Water pump/);
    expect(told).toMatch(/20 kW/);
    expect(told).not.toMatch(/Newton|singular|converge|NaN|undefined/i);
    const [above, below] = await Promise.all([trouble.boundingBox(), list().boundingBox()]);
    expect(above?.y ?? 0).toBeLessThan(below?.y ?? 0);
    expect(await axeViolations(page)).toEqual([]);
    await trouble
      .getByRole('button', { name: /^Show in the wiring/ })
      .first()
      .click();
    await page.getByRole('article', { name: /^PUMP, / }).waitFor();
  });
});

test('nothing went wrong unseen: no error, no broken policy, no request elsewhere', () => {
  expect(opened.wrongs).toEqual([]);
});
