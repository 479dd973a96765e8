/** The tab Protection of the Findings: windows, faults, pictures, two rule books, and proposals that are made and undone as one. */
import type { Browser, Locator, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { examples } from '../../data/examples/index.ts';
import { goStage, openText, storedPart } from './acts.ts';
import { allKept, axeViolations, endHost, type Host, launch, type Opened, openApp, shoot, startHost } from './app.ts';

let browser: Browser;
let host: Host;
let opened: Opened;
let page: Page;

const sloop = examples.find(({ name }) => name === 'sloop-with-seeded-trouble')?.text ?? '';

beforeAll(async () => {
  [browser, host] = await Promise.all([launch(), startHost()]);
  opened = await openApp(browser, host, { reducedMotion: 'reduce' });
  page = opened.page;
  await page.getByRole('heading', { name: 'Start small' }).waitFor();
  await openText(page, sloop);
  await goStage(page, 'Findings');
});
afterAll(async () => {
  await browser.close();
  await endHost(host);
});

const tab = (name: string): Locator => page.getByRole('tab', { name });
const device = (id: string): Locator => page.locator(`[data-device="${id}"]`);
const row = (id: string): Locator => page.getByRole('listitem').filter({ has: device(id) });
const spaced = (text: string | null): string => (text ?? '').replaceAll('\u00a0', ' ');
const wide = (): Promise<number> =>
  page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth);

describe.sequential('a sloop with seeded troubles', () => {
  test('arrow keys go from tab to tab', async () => {
    await tab('Verdicts').focus();
    await page.keyboard.press('ArrowRight');
    expect(await tab('Protection').getAttribute('aria-selected')).toBe('true');
    await device('B-4').waitFor();
  });

  test('the breaker that is too large stands outside its window, before those without a finding', async () => {
    const said = spaced(await row('B-4').textContent());
    expect(said).toContain('load 3 A (3.75 A with margin) ≤ fuse 60 A > wire 52.5 A');
    expect(said).toContain('60 A does not protect a cable of 35 A');
    const order = await page.locator('[data-device]').evaluateAll((all) => all.map((one) => one.dataset['device']));
    expect(order.indexOf('B-4')).toBeLessThan(order.indexOf('F-START'));
  });

  test('each row says what it must interrupt, and from which ends it is fed', async () => {
    expect(spaced(await row('F-H1').textContent())).toMatch(
      /fault \d.*kA, interrupts 20 kA: enough.*fed from both ends/,
    );
    expect(await row('F-INV').textContent()).toMatch(/fed from one end/);
  });

  test('by keyboard a row is reached and opens the time–current picture, whose title is its answer', async () => {
    await page.locator('[data-device]').first().focus();
    await page.keyboard.press('ArrowDown');
    await page.keyboard.press('ArrowUp');
    await page.keyboard.press('Enter');
    const id = await page.locator('[data-device]').first().getAttribute('data-device');
    const picture = page.getByRole('img', { name: new RegExp(`^${id ?? ''} opens within .* at the lowest fault`) });
    await picture.waitFor();
    expect(await row(id ?? '').textContent()).toMatch(/generic band of .*, from memory: get the maker's curve/);
    await shoot(page, 'protection-picture');
  });

  test('the other method of fault currents gives other figures, both by name', async () => {
    const before = await row('F-H1').textContent();
    await page.getByRole('radio', { name: 'IEC 61660-1' }).check();
    await page.waitForFunction(
      ([id, text]) => document.querySelector(`[data-device="${id}"]`)?.closest('li')?.textContent !== text,
      ['F-H1', before] as const,
    );
    await page.getByText('Fault level at every junction').click();
    await page.getByRole('columnheader', { name: 'settled' }).first().waitFor();
    await page.getByRole('radio', { name: 'Plain' }).check();
    await page.getByRole('columnheader', { name: 'settled' }).first().waitFor({ state: 'detached' });
  });

  test('what is ticked is judged anew, made as one edit, and undone as one', async () => {
    await page.getByText('Propose fuses and cables').click();
    await page.getByRole('list', { name: 'Proposals, cheapest first' }).waitFor();
    await page.getByText(/Nothing is changed before you take it/).waitFor();
    expect(await page.getByRole('button', { name: 'Make the ticked changes' }).count()).toBe(0);
    await page.getByRole('checkbox', { name: /Load CABIN.*breaker B-4 instead of 60/ }).check();
    await page.getByText('1 of 3 ticked').waitFor();
    await page.getByRole('button', { name: 'Tick all' }).click();
    const make = page.getByRole('button', { name: 'Make the ticked changes' });
    await make.waitFor();
    await page.getByText('No new finding comes by it.').waitFor();
    await shoot(page, 'protection-proposals');
    await make.click();
    await page
      .getByText('Nothing to propose')
      .or(page.getByText(/nothing listed solves/))
      .first()
      .waitFor();
    await allKept(page);
    expect((await storedPart(page, 'B-4'))['ratingA']).not.toBe(60);
    await page.keyboard.press('Control+z');
    await page.getByRole('checkbox', { name: /Load CABIN/ }).waitFor();
    await allKept(page);
    expect((await storedPart(page, 'B-4'))['ratingA']).toBe(60);
    expect((await storedPart(page, 'W-INV'))['minusSize']).toBe('8 AWG');
  });

  test('nothing of it breaks the accessibility rules or is wider than the screen', async () => {
    expect(await axeViolations(page)).toEqual([]);
    expect(await wide()).toBe(0);
  });

  test('a finding of a device is one step away', async () => {
    await row('B-4')
      .getByRole('button', { name: /about B-4/ })
      .click();
    expect(await tab('Verdicts').getAttribute('aria-selected')).toBe('true');
    await page.getByRole('button', { name: /shown: show all/ }).waitFor();
  });

  test('two rule books side by side mark only what differs', async () => {
    await tab('Two rule books').click();
    await page.getByRole('radio', { name: 'Land, IEC countries' }).check();
    await page.getByRole('heading', { name: /findings? differs? between the two books/ }).waitFor();
    const differing = page.getByRole('list', { name: 'Findings that differ' }).getByRole('listitem');
    for (const pair of await differing.all()) expect(await pair.locator('[data-differs]').count()).toBeGreaterThan(0);
    await page.getByText('The same under both').click();
    expect(await page.getByRole('list', { name: 'Findings that are the same' }).locator('[data-differs]').count()).toBe(
      0,
    );
    await shoot(page, 'protection-books');
    expect(await axeViolations(page)).toEqual([]);
    expect(opened.wrongs).toEqual([]);
  });

  test('a junction of the fault table is shown in the wiring', async () => {
    await tab('Protection').click();
    const table = page.getByText('Fault level at every junction');
    await table.click();
    await page
      .getByRole('button', { name: /^HP out ?: show in the wiring/ })
      .first()
      .click();
    await page.getByRole('article', { name: 'Junction HP out' }).waitFor();
  });
});

test('a job without a fuse says so', async () => {
  await openText(
    page,
    JSON.stringify({ format: 'ohmwright-job', version: 1, title: 'Bare', practice: 'iec-land', parts: [] }),
  );
  await goStage(page, 'Findings');
  await tab('Protection').click();
  await page.getByRole('heading', { name: 'No fuse or breaker is drawn yet' }).waitFor();
  expect(opened.wrongs).toEqual([]);
});
