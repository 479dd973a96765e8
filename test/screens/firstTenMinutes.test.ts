/** A newcomer's first ten minutes, in a real browser against the real host. */
import { readFileSync } from 'node:fs';
import type { Browser, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { parseJob } from '../../core/api.ts';
import { allKept, endHost, type Host, launch, type Opened, openApp, shoot, startHost } from './app.ts';

let browser: Browser;
let host: Host;
let opened: Opened;
let page: Page;

beforeAll(async () => {
  [browser, host] = await Promise.all([launch(), startHost()]);
  opened = await openApp(browser, host);
  page = opened.page;
});
afterAll(async () => {
  await browser.close();
  await endHost(host);
});

/** Fills a field by its name and leaves it, as a person does. */
async function fill(name: string | RegExp, text: string): Promise<void> {
  const field = page.getByRole('textbox', { name }).first();
  await field.fill(text);
  await field.press('Enter');
}

async function find(text: string): Promise<void> {
  await page.keyboard.press('Control+k');
  await page.getByRole('combobox', { name: /Find parts/ }).fill(text);
  await page.keyboard.press('Enter');
}

const goStage = (name: string) =>
  page
    .getByRole('navigation', { name: 'Stages of the job' })
    .getByRole('button', { name: new RegExp(`^${name}`) })
    .click();
const ledger = () => page.getByRole('complementary', { name: /Ledger/ });
const shareFinding = () => page.locator('[data-finding^="share-uneven"]').first();
const balance = () => page.getByRole('contentinfo', { name: 'Balance line' });

describe.sequential('the first ten minutes', () => {
  test('start small: a handful of figures give an answer with all that was taken for granted', async () => {
    await fill('Amp-hours of one block', '120');
    await fill('One load', '150 W');
    await fill('Main switch to load', '12 ft');
    const answer = page.getByText(/^Of 12\.\d+ V at rest, the load gets 1[12]\.\d+ V\.$/);
    await answer.waitFor();
    await page.getByText('What was taken for granted').click();
    expect(await page.getByText('guess').count()).toBeGreaterThan(5);
    await shoot(page, '01-start-small');
  });

  test('the answer opens as a drawing, live and balanced', async () => {
    await page.getByRole('button', { name: 'Open it in Wiring' }).click();
    await balance()
      .getByText(/^in 1\d\d(\.\d+)? W = out 150 W \+ heat/)
      .waitFor();
    await allKept(page);
    await shoot(page, '02-wiring');
  });

  test('a second string is added beside the first, and its lead made longer', async () => {
    await find('B1');
    await ledger().getByRole('button', { name: 'Add a string beside it' }).click();
    await balance()
      .getByText(/= out 150 W/)
      .waitFor();
    await find('C1');
    await fill('Length', '9 m');
    await allKept(page);
    await shoot(page, '03-second-string');
  });

  test('the finding is told, and says what its remedy would change', async () => {
    await goStage('Findings');
    await shareFinding().waitFor();
    await shoot(page, '04-finding');
  });

  test('it is fixed in the drawing, and the finding goes', async () => {
    await find('C1');
    await fill('Length', '1 m');
    await goStage('Findings');
    await shareFinding().waitFor({ state: 'hidden' });
    await page
      .getByRole('main')
      .getByText(/\d+ findings?, worst first|No finding/)
      .first()
      .waitFor();
    await shoot(page, '05-fixed');
  });

  test('undo brings the finding back, redo takes it away', async () => {
    await page.getByRole('button', { name: 'Undo' }).click();
    await shareFinding().waitFor();
    await page.getByRole('button', { name: 'Redo' }).click();
    await shareFinding().waitFor({ state: 'hidden' });
    await allKept(page);
  });

  test('a snapshot is named and stands in the history', async () => {
    await page.getByRole('button', { name: 'History' }).click();
    await page.getByRole('textbox', { name: 'Name this state' }).fill('Both leads alike');
    await page.getByRole('button', { name: 'Keep snapshot' }).click();
    await page.getByText('◆ Both leads alike').waitFor();
    await shoot(page, '06-history');
    await page.getByRole('button', { name: 'Close' }).click();
  });

  test('the job file is exported, whole, and the program itself can read it', async () => {
    const [download] = await Promise.all([
      page.waitForEvent('download'),
      page.getByRole('button', { name: 'Save file' }).click(),
    ]);
    const text = readFileSync(await download.path(), 'utf8');
    const read = parseJob(text);
    expect(read.ok && read.value.parts.filter(({ kind }) => kind === 'string').length).toBe(2);

    await page.getByRole('button', { name: 'Jobs' }).click();
    await page.getByRole('heading', { name: 'Start small' }).waitFor();
    await page.getByLabel('Job file', { exact: true }).setInputFiles({
      name: download.suggestedFilename(),
      mimeType: 'application/json',
      buffer: Buffer.from(text),
    });
    await balance()
      .getByText(/= out 150 W/)
      .waitFor();
    await shoot(page, '07-reopened');
  });

  test('the PDF is made from the app', async () => {
    await goStage('Handover');
    await page.getByRole('button', { name: 'Save the PDF' }).click();
    await page.getByText(/\.pdf/).first().waitFor();
    await shoot(page, '08-handover');
  });

  test('nothing went wrong on the way: no console error, no broken policy, no request to elsewhere', () => {
    expect(opened.wrongs).toEqual([]);
  });
});
