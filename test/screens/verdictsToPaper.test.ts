/** From the verdicts to the paper, in a real browser against the real host: an invented sloop with four seeded troubles. */
import { readFileSync } from 'node:fs';
import { join } from 'node:path';
import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { parseJob } from '../../core/api.ts';
import { examples } from '../../data/examples/index.ts';
import { allKept, axeViolations, endHost, type Host, launch, type Opened, openApp, shoot, startHost } from './app.ts';

let browser: Browser;
let host: Host;
let opened: Opened;
let page: Page;

beforeAll(async () => {
  [browser, host] = await Promise.all([launch(), startHost()]);
  opened = await openApp(browser, host, { reducedMotion: 'reduce' });
  page = opened.page;
  await pick('sloop.job.json', examples.find(({ name }) => name === 'sloop-with-seeded-trouble')?.text ?? '');
});
afterAll(async () => {
  await browser.close();
  await endHost(host);
});

/** A job file given to the page, as a person picks it. */
async function pick(name: string, text: string): Promise<void> {
  const buffer = Buffer.from(text);
  await page.locator('input[type=file]').first().setInputFiles({ name, mimeType: 'application/json', buffer });
  await page.getByRole('navigation', { name: 'Stages of the job' }).waitFor();
}
const goStage = (name: string) =>
  page
    .getByRole('navigation', { name: 'Stages of the job' })
    .getByRole('button', { name: new RegExp(`^${name}`) })
    .click();
const count = () => page.getByRole('main').getByText(/finding.*not done|findings, worst first/);
const findings = () => page.getByRole('list', { name: 'Findings, worst first' });

describe.sequential('findings', () => {
  test('the worst stands first, each with its figures, its basis and how far that may be trusted', async () => {
    await goStage('Findings');
    await count()
      .getByText(/^15 findings, worst first: 2 stop, 7 fix, 6 look/)
      .waitFor();
    const first = findings().getByRole('listitem').first();
    const told = await first.textContent();
    expect(told).toMatch(/Measured 150 A · limit 120 A/);
    expect(told).toMatch(/33 CFR 183\.455.*published/);
    await shoot(page, 'findings');
    expect(await axeViolations(page)).toEqual([]);
  });

  test('with the keyboard alone one walks down, opens a finding, and sees what its remedy would change', async () => {
    await page.locator('[data-finding]').first().focus();
    await page.keyboard.press('ArrowDown');
    await page.keyboard.press('Enter');
    const panel = page.getByRole('region', { name: 'What the remedy would change' });
    await panel.getByText(/Breaker B-4.*: 50 A instead of 60 A/).waitFor();
    expect(await panel.textContent()).toMatch(/60 A \(limit 52\.5 A\) → within the limit/);
    expect(await axeViolations(page)).toEqual([]);
    await shoot(page, 'finding-open');
  });

  test('the change is one step: the list follows it, and undo brings the finding back', async () => {
    await page.getByRole('button', { name: 'Make this change' }).first().click();
    await count()
      .getByText(/1 stop/)
      .first()
      .waitFor();
    await page.keyboard.press('Control+z');
    await count()
      .getByText(/2 stop/)
      .first()
      .waitFor();
    await allKept(page);
  });

  test('a finding leads to its part in the wiring, and the way back finds it still open', async () => {
    await page.getByRole('button', { name: /^Show in the wiring\s+B-4/ }).click();
    await page
      .getByRole('complementary', { name: /Ledger/ })
      .getByText(/B-4/)
      .first()
      .waitFor();
    await goStage('Findings');
    await page.locator('[data-finding][aria-expanded=true]').waitFor();
  });
});

describe.sequential('site', () => {
  test('a figure may be typed in °F; one that contradicts another is answered with a sentence and changes nothing', async () => {
    await goStage('Site');
    const coldest = page.getByLabel('Coldest air');
    await coldest.fill('140 F');
    await coldest.press('Enter');
    await page.getByText(/is below lowest air temperature/).waitFor();
    await coldest.fill('14 F');
    await coldest.press('Enter');
    await page.getByText(/^-10\u00a0?\s?°C$/).waitFor();
    expect(await axeViolations(page)).toEqual([]);
    await shoot(page, 'site');
  });
});

describe.sequential('handover', () => {
  test('what is still open is told before printing, and every section can be turned up', async () => {
    await goStage('Handover');
    await page.getByText('2 open: do not energise until this is put right').waitFor();
    const contents = page.getByRole('navigation', { name: 'Sections of the paper' });
    await contents.getByRole('button', { name: /^One-line diagram/ }).click();
    await page
      .getByRole('region', { name: /^One-line diagram/ })
      .locator('svg')
      .first()
      .waitFor();
    expect(await axeViolations(page)).toEqual([]);
    await shoot(page, 'handover');
  });

  test('the PDF is made, its pages are told, and it is saved where the page says', async () => {
    await page.getByRole('button', { name: 'Make the PDF' }).click();
    await page.getByText(/^Made: .*\d+ pages/).waitFor();
    await page
      .getByRole('navigation', { name: 'Sections of the paper' })
      .getByRole('button', { name: /Summary page 2/ })
      .waitFor();
    await page.getByRole('button', { name: 'Save the PDF' }).click();
    const said = (await page.getByText(/^Saved as /).textContent()) ?? '';
    const written = readFileSync(said.replace('Saved as ', ''));
    expect(written.subarray(0, 5).toString()).toBe('%PDF-');
    expect(said).toContain(join(host.store, 'saved'));
  });

  test('the job file comes down as it stands, and the lists as tables', async () => {
    const [file] = await Promise.all([
      page.waitForEvent('download'),
      page.getByRole('button', { name: 'Download the job file' }).click(),
    ]);
    const read = parseJob(readFileSync(await file.path(), 'utf8'));
    expect(read.ok && read.value.site.ambientMinDegC).toBeCloseTo(-10, 9); // 14 °F in binary figures
    const [list] = await Promise.all([
      page.waitForEvent('download'),
      page.getByRole('button', { name: 'Cables, to cut' }).click(),
    ]);
    expect(readFileSync(await list.path(), 'utf8')).toContain('W-INV');
  });
});

test('large text on a small screen keeps all three stages within their width', async () => {
  await page.setViewportSize({ width: 1024, height: 768 });
  await page.evaluate(() => {
    document.documentElement.style.fontSize = '200%';
  });
  for (const stage of ['Site', 'Findings', 'Handover']) {
    await goStage(stage);
    await page.getByRole('heading', { level: 1, name: stage }).waitFor();
    const over = await page.locator('main > div').evaluate((element) => element.scrollWidth - element.clientWidth);
    expect(over, stage).toBeLessThanOrEqual(0);
  }
});

test('nothing went wrong unseen: no error, no broken policy, no request elsewhere', () => {
  expect(opened.wrongs).toEqual([]);
});
