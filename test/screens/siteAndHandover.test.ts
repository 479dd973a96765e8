/** Where it stands and by which book it is judged; and what leaves the program: paper, lists, job file. */
import { existsSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import Papa from 'papaparse';
import type { Browser, Download, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { parseJob } from '../../core/api.ts';
import { tables } from '../../data/index.ts';
import { goStage, stored } from './acts.ts';
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
  await openPattern(page, /^Weekend hut/);
});
afterAll(async () => {
  await browser.close();
  await endHost(host);
});

interface Site {
  readonly latitudeDeg?: number | string;
  readonly albedo?: number | string;
  readonly ambientMinDegC?: number | string;
  readonly irradiationKWhPerM2Day?: readonly (number | string)[];
}

async function storedJob(): Promise<{ readonly site: Site } & Readonly<Record<string, unknown>>> {
  await allKept(page);
  return JSON.parse((await stored(page)).text) as { readonly site: Site };
}

async function type(name: string, text: string): Promise<void> {
  const field = page.getByRole('textbox', { name, exact: true });
  await field.fill(text);
  await field.press('Enter');
}

async function downloaded(button: string): Promise<Download> {
  const [file] = await Promise.all([
    page.waitForEvent('download'),
    page.getByRole('button', { name: button, exact: true }).click(),
  ]);
  return file;
}

describe.sequential('site', () => {
  beforeAll(async () => {
    await goStage(page, 'Site');
    await page.getByRole('heading', { level: 1, name: 'Site' }).waitFor();
  });

  test('titles, names and notes go into the job as typed', async () => {
    await type('Title', 'Hut above the lake');
    await type('Prepared for', 'Anna & sons');
    await page.getByRole('textbox', { name: 'Notes' }).fill('Measured in the rain.\nAgain in the sun.');
    await page.getByRole('textbox', { name: 'Notes' }).press('Control+Enter');
    expect(await storedJob()).toMatchObject({
      title: 'Hut above the lake',
      preparedFor: 'Anna & sons',
      notes: 'Measured in the rain.\nAgain in the sun.',
    });
  });

  test('°F is kept as typed, with °C beside it; a latitude beyond the pole is refused and not kept', async () => {
    await type('Coldest air', '-4 F');
    await page.getByText('-20 °C', { exact: true }).waitFor();
    await type('Latitude', '95');
    const said = page.getByRole('main').getByRole('alert');
    await said.waitFor();
    expect(await said.textContent()).toMatch(/latitude.*90|90.*latitude/i);
    await page.getByRole('textbox', { name: 'Latitude' }).press('Escape');
    await type('Latitude', '-33.9');
    expect((await storedJob()).site).toMatchObject({ ambientMinDegC: '-4 F', latitudeDeg: -33.9 });
  });

  test('twelve months copied from a sheet are pasted into one field, as one change', async () => {
    const { head } = await stored(page);
    const months = ['5.1', '4.7', '3.9', '2.8', '1.9', '1.5', '1.6', '2.2', '3.1', '4.0', '4.8', '5.3'];
    await page.evaluate((text) => {
      const clip = new DataTransfer();
      clip.setData('text', text);
      document
        .querySelector<HTMLInputElement>('fieldset input')
        ?.dispatchEvent(new ClipboardEvent('paste', { clipboardData: clip, bubbles: true, cancelable: true }));
    }, months.join('\t'));
    await page.getByText('Least sun in June: 1.5 kWh/m² a day').waitFor();
    expect((await storedJob()).site.irradiationKWhPerM2Day).toEqual(months.map(Number));
    expect((await stored(page)).head).toBe(head + 1);
  });

  test('one month alone waits for the others where none were given; none is taken as nought', async () => {
    const { head } = await stored(page);
    for (const name of ['January', 'February']) {
      const month = page.getByRole('textbox', { name: new RegExp(`^${name}, `) });
      await month.fill('');
      await month.press('Enter');
    }
    await page.getByText('2 months are still to come; the twelve go into the job together.').waitFor();
    expect((await stored(page)).head).toBe(head);
    for (const name of ['January', 'February']) {
      const month = page.getByRole('textbox', { name: new RegExp(`^${name}, `) });
      await month.fill('6');
      await month.press('Enter');
    }
    expect((await storedJob()).site.irradiationKWhPerM2Day?.slice(0, 3)).toEqual([6, 6, 3.9]);
    expect(await axeViolations(page)).toEqual([]);
  });

  test('another rule book judges at once: in the top bar, and in the thresholds that it brings', async () => {
    const books = page.getByRole('radiogroup', { name: 'Rule book that judges this job' });
    await books.getByRole('radio').nth(1).check();
    expect(await storedJob()).toMatchObject({ practice: 'us-land' });
    await page.getByRole('combobox', { name: 'Rule book' }).getByText('US, on land').waitFor();
    const thresholds = page.getByRole('group').filter({ hasText: 'Thresholds without a published source' });
    await thresholds.getByText('Thresholds without a published source').click();
    await thresholds.getByText(`Default: ${tables.practices['us-land'].name}`).first().waitFor();
    expect(await axeViolations(page)).toEqual([]);
  });
});

describe.sequential('handover', () => {
  beforeAll(async () => {
    await goStage(page, 'Handover');
    await page.getByRole('heading', { level: 1, name: 'Handover' }).waitFor();
  });

  test('the PDF is made, and saved where the page says', async () => {
    await page.getByRole('button', { name: 'Make the PDF' }).click();
    await page.getByText(/^Made: .*\d+ pages?, \d+ kB/).waitFor();
    const made = await downloaded('Download the PDF');
    await page.getByRole('button', { name: 'Save the PDF' }).click();
    const said = (await page.getByText(/^Saved as /).textContent()) ?? '';
    const path = said.replace('Saved as ', '');
    expect(path.startsWith(join(host.store, 'saved'))).toBe(true);
    expect(existsSync(path)).toBe(true);
    const written = readFileSync(path);
    expect(written.subarray(0, 5).toString()).toBe('%PDF-');
    expect(written.subarray(-6).toString()).toContain('%%EOF');
    expect(written.equals(readFileSync(await made.path()))).toBe(true);
  });

  test('a PDF of other paper or of an older state says that it is out of date', async () => {
    await page.getByRole('combobox', { name: 'Paper' }).selectOption('Letter');
    await page.getByText('The job or the paper has changed since the PDF was made.').waitFor();
  });

  test.each([
    { button: 'Cables, to cut', name: 'Hut above the lake - cut list.csv', holds: ['LEAD', 'W2', 'W3', 'W4'] },
    { button: 'Fuses and breakers', name: 'Hut above the lake - fuse list.csv', holds: ['F1', 'F2', 'F3', 'F4'] },
    { button: 'All parts', name: 'Hut above the lake - parts list.csv', holds: ['BLOCK', 'SW', 'F1', 'PUMP'] },
  ])('the list "$button" comes down as a table that any sheet can read', async ({ button, name, holds }) => {
    const file = await downloaded(button);
    expect(file.suggestedFilename()).toBe(name);
    const { data, errors } = Papa.parse<string[]>(readFileSync(await file.path(), 'utf8'), { skipEmptyLines: true });
    expect(errors).toEqual([]);
    const [head = [], ...rows] = data;
    expect(rows.map((row) => row.length)).toEqual(rows.map(() => head.length));
    for (const id of holds) expect(rows.flat().join(' ')).toMatch(new RegExp(`\\b${id}\\b`));
    await page.getByText(`Downloaded ${name}.`).waitFor();
  });

  test('the job file is saved whole: what the host writes and what comes down are the job as the store holds it', async () => {
    await allKept(page);
    const { text } = await stored(page);
    const file = await downloaded('Download the job file');
    expect(file.suggestedFilename()).toBe('hut-above-the-lake.job.json');
    expect(readFileSync(await file.path(), 'utf8')).toBe(text);
    await page.getByRole('button', { name: 'Save the job file' }).click();
    const said = page.getByText(/^File: /);
    await said.waitFor();
    const path = ((await said.textContent()) ?? '').replace('File: ', '');
    const written = readFileSync(path, 'utf8');
    expect(written).toBe(text);
    expect(parseJob(written)).toMatchObject({ ok: true, value: { title: 'Hut above the lake' } });
    expect(await axeViolations(page)).toEqual([]);
  });
});

test('nothing went wrong unseen: no error, no broken policy, no request elsewhere', () => {
  expect(opened.wrongs).toEqual([]);
});
