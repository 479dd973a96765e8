/** Figures as people type them, into the ledger of a cable, a run and a string, and on the start screen. */
import type { Browser, Locator, Page } from 'playwright-core';
import { afterAll, beforeAll, beforeEach, describe, expect, test } from 'vitest';
import { find, ledger, stored, storedPart } from './acts.ts';
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

const box = (name: string, within: Page | Locator = page): Locator =>
  within.getByRole('textbox', { name, exact: true }).first();
/** The line of a form in which a field stands, with all that is said under it. */
const row = (name: string): Locator =>
  ledger(page)
    .locator('div:has(> label)')
    .filter({ has: page.getByRole('textbox', { name, exact: true }) })
    .first();

/** Types over what stands there, and leaves the field by Enter. */
async function type(name: string, text: string): Promise<void> {
  await box(name).fill(text);
  await box(name).press('Enter');
}

/** What the store holds for a field once all is kept. */
async function kept(part: string, field: string): Promise<unknown> {
  await allKept(page);
  return (await storedPart(page, part))[field];
}
const unfold = (): Promise<void> =>
  ledger(page)
    .locator('details')
    .evaluateAll((folds) => {
      for (const fold of folds) (fold as HTMLDetailsElement).open = true;
    });
const head = async (): Promise<number> => (await stored(page)).head;

describe.sequential('on the start screen', () => {
  test('a bare length asks metres or feet, and the answer follows the choice', async () => {
    await type('Main switch to load', '10');
    await page.getByText('10: metres or feet?').waitFor();
    await page.getByRole('button', { name: '10 ft', exact: true }).click();
    await page.waitForFunction(() => document.querySelector('[role=alert]') === null);
    expect(await box('Main switch to load').inputValue()).toBe('3.048 m');
  });

  test('what cannot be read is answered at the field and stays as typed; Escape brings the figure back', async () => {
    await type('One load', 'sixty');
    const load = box('One load');
    expect(await load.getAttribute('aria-invalid')).toBe('true');
    expect(await load.inputValue()).toBe('sixty');
    const said = page.getByRole('alert');
    expect(await said.textContent()).toMatch(/sixty.*\.$/);
    await load.press('Escape');
    expect(await load.inputValue()).toBe('60');
    expect(await said.count()).toBe(0);
  });

  test('a prefix is understood, and a length there and back is halved in sight', async () => {
    await type('One load', '0.15 kW');
    const way = page.getByRole('group', { name: 'Which way the length is measured' }).last();
    await way.getByRole('button', { name: 'There and back' }).click();
    await type('Main switch to load', '24 ft');
    await page.getByText('24 ft there and back = 12 ft one way').waitFor();
    await page.getByText(/^Of 12\.\d+ V at rest, the load gets 1[12]\.\d+ V\.$/).waitFor();
    expect(await axeViolations(page)).toEqual([]);
  });
});

describe.sequential('in the ledger of a cable', () => {
  beforeAll(async () => {
    await openPattern(page, /three 24 V strings/);
  });
  beforeEach(async () => {
    await find(page, 'L-C+');
  });

  test.each([
    { typed: '2/0', grey: /67\.4\d* mm²/ },
    { typed: '70mm2', grey: /between 2\/0 AWG and 3\/0 AWG/ },
  ])('the size $typed is kept as typed, and stands in grey in the other system', async ({ typed, grey }) => {
    await type('Size', typed);
    await row('Size').getByText(grey).waitFor();
    expect(await kept('L-C+', 'size')).toBe(typed);
  });

  test('a bare 70 asks which kind of size, and offers only what exists', async () => {
    await type('Size', '70');
    const question = page.getByRole('group', { name: '70: which kind of size?' });
    expect(await question.getByRole('button').allTextContents()).toEqual(['70 mm², of copper']);
    await page.keyboard.press('Enter');
    expect(await kept('L-C+', 'size')).toBe('70 mm2');
  });

  test('6 mm asks too: a size of copper, or a thickness over the insulation', async () => {
    const before = await head();
    await type('Size', '6 mm');
    const question = page.getByRole('group', { name: '6 mm: which kind of size?' });
    expect(await question.getByRole('button').allTextContents()).toEqual([
      '6 mm², of copper',
      '6 mm auto, over the insulation',
    ]);
    expect(await head()).toBe(before);
    await page.keyboard.press('Escape');
    expect(await box('Size').inputValue()).toBe('70 mm2');
  });

  test.each([
    { typed: '10 ft', grey: '3.048 m' },
    { typed: '10\'6"', grey: '3.2 m' },
    { typed: '3.2m', grey: '10 ft 6 in' },
  ])('the length $typed is kept as typed, and stands in grey in the other system', async ({ typed, grey }) => {
    await type('Length', typed);
    await row('Length').getByText(grey, { exact: true }).waitFor();
    expect(await box('Length').inputValue()).toBe(typed);
    expect(await kept('L-C+', 'lengthM')).toBe(typed);
  });

  test('a bare 10 asks metres or feet; until that is answered nothing is kept', async () => {
    const before = await head();
    await type('Length', '10');
    const question = page.getByRole('group', { name: '10: metres or feet?' });
    expect(await question.getByRole('button').allTextContents()).toEqual(['10 m', '10 ft']);
    expect(await head()).toBe(before);
    await question.getByRole('button', { name: '10 ft' }).click();
    expect(await kept('L-C+', 'lengthM')).toBe('10 ft');
  });

  test('a comma is asked about, never guessed', async () => {
    const before = await head();
    await type('Length', '2,5 m');
    await page.getByText('A comma is not read here. Which did you mean?').waitFor();
    expect(await head()).toBe(before);
    await page.getByRole('button', { name: '2.5 m', exact: true }).click();
    expect(await kept('L-C+', 'lengthM')).toBe('2.5 m');
  });

  test('milliohms may be typed with a point and the word; the grey figure says them otherwise', async () => {
    await unfold();
    await type('Resistance', '2.1 mohm');
    await row('Resistance').getByText('0.0021 Ω').waitFor();
    expect(await kept('L-C+', 'resistanceOhm')).toBe('2.1 mohm');
  });

  test('nonsense gets a sentence, stays as typed and is not kept, even when the field is left', async () => {
    const before = await head();
    for (const nonsense of ['about an arm', '-3 m', '3 V', '1e999 m']) {
      await type('Length', nonsense);
      const said = row('Length').getByRole('alert');
      await said.waitFor();
      expect(await said.textContent(), nonsense).toMatch(/^[A-Z0-9“].*\.$/);
      await page.keyboard.press('Tab');
      expect(await box('Length').inputValue()).toBe(nonsense);
      expect(await box('Length').getAttribute('aria-invalid')).toBe('true');
      await box('Length').focus();
      await page.keyboard.press('Escape');
      expect(await box('Length').inputValue()).toBe('2.5 m');
    }
    await allKept(page);
    expect(await head()).toBe(before);
  });

  test('a refused field is named, described and marked for whoever cannot see it', async () => {
    await type('Length', 'about an arm');
    await row('Length').getByRole('alert').waitFor();
    expect(await axeViolations(page, 'aside')).toEqual([]);
    await page.keyboard.press('Escape');
  });

  test('a figure that must be there cannot be emptied', async () => {
    const before = await head();
    await type('Length', '');
    await row('Length').getByText('This cannot be left empty.').waitFor();
    await page.keyboard.press('Escape');
    expect(await head()).toBe(before);
  });

  test('Escape brings back what stood there while it is typed over', async () => {
    const before = await head();
    await box('Length').pressSequentially('99');
    await page.keyboard.press('Escape');
    expect(await box('Length').inputValue()).toBe('2.5 m');
    expect(await head()).toBe(before);
  });

  test('a figure is marked as measured, with its range, from the menu of its origin', async () => {
    const article = page.getByRole('article', { name: /^L-C\+/ });
    await article.getByRole('button', { name: /where Resistance comes from/ }).click();
    const menu = page.getByRole('dialog', { name: 'Where Resistance comes from' });
    await menu.getByRole('radio', { name: /measured/ }).check();
    await menu.getByRole('textbox', { name: 'Surely not below' }).fill('1.8');
    await menu.getByRole('textbox', { name: 'Surely not below' }).press('Enter');
    await menu.getByRole('textbox', { name: 'Surely not above' }).fill('2600 uohm');
    await menu.getByRole('textbox', { name: 'Surely not above' }).press('Enter');
    expect(await axeViolations(page, '[role=dialog]')).toEqual([]);
    await page.keyboard.press('Escape');
    await row('Resistance').getByText('Between 1.8 mΩ and 2.6 mΩ.').waitFor();
    await article.getByRole('button', { name: /^measured: where Resistance comes from/ }).waitFor();
    await allKept(page);
    const part = await storedPart(page, 'L-C+');
    expect(part['origin']).toMatchObject({ resistanceOhm: 'measured' });
    const [low, high] = (part['range'] as { resistanceOhm: [number, number] }).resistanceOhm;
    expect(low).toBeCloseTo(0.0018, 12); // binary figures of 1.8 thousandths
    expect(high).toBeCloseTo(0.0026, 12);
  });

  test('a range that does not hold its figure is refused in words', async () => {
    const before = await head();
    await page.getByRole('button', { name: /where Resistance comes from/ }).click();
    const low = page.getByRole('textbox', { name: 'Surely not below' });
    await low.fill('2.5');
    await low.press('Enter');
    const said = page.getByRole('dialog', { name: 'Where Resistance comes from' }).getByRole('alert');
    await said.waitFor();
    expect(await said.textContent()).toMatch(/\.$/);
    expect(await low.inputValue()).toBe('2.5');
    await low.press('Escape');
    await page.keyboard.press('Escape');
    expect(await head()).toBe(before);
  });
});

describe.sequential('in the ledger of an out-and-back run', () => {
  test('24 ft there and back is halved in sight, and what is kept is the length one way', async () => {
    await find(page, 'W-INV');
    await ledger(page).getByRole('button', { name: 'There and back' }).click();
    await type('Length', '24 ft');
    await row('Length').getByText('24 ft there and back = 12 ft one way').waitFor();
    expect(await box('Length').inputValue()).toBe('12 ft');
    expect(await kept('W-INV', 'lengthM')).toBe('12 ft');
    expect(await ledger(page).getByRole('button', { name: 'One way' }).getAttribute('aria-pressed')).toBe('true');
  });
});

describe.sequential('in the ledger of a string', () => {
  beforeEach(async () => {
    await find(page, 'C');
    await unfold();
  });

  test('a temperature may be typed in °F', async () => {
    await type('Temperature', '95F');
    await row('Temperature').getByText('35 °C').waitFor();
    expect(await kept('C', 'temperatureDegC')).toBe('95F');
  });

  test('rest volts may be typed as a figure with thousandths', async () => {
    await type('Rest volts', '25210 mV');
    await row('Rest volts').getByText('25.21 V').waitFor();
    expect(await kept('C', 'emfV')).toBe('25210 mV');
  });

  test('a share of 1 or less asks whether per cent were meant', async () => {
    await type('State of charge', '0.8');
    await page.getByRole('group', { name: '0.8: a share, or per cent?' }).getByRole('button', { name: '80 %' }).click();
    expect(await kept('C', 'stateOfCharge')).toBe('80 %');
  });
});

test('other units first: fields show other figures, and not a letter of the job changes', async () => {
  await find(page, 'A');
  await allKept(page);
  const before = await stored(page);
  const units = page.getByRole('combobox', { name: /Units first/ });
  await find(page, 'L-A+');
  expect(await box('Length').inputValue()).toBe('1.2 m');
  await units.click();
  await page.getByRole('option', { name: 'ft, AWG, °F' }).click();
  await expect.poll(() => box('Length').inputValue()).toMatch(/^3 ft 11/);
  // Walking through the fields without typing is no change either.
  await box('Length').focus();
  for (let stop = 0; stop < 12; stop += 1) await page.keyboard.press('Tab');
  await allKept(page);
  const after = await stored(page);
  expect(after.head).toBe(before.head);
  expect(after.text).toBe(before.text);
});

test('nothing went wrong unseen: no error, no broken policy, no request elsewhere', () => {
  expect(opened.wrongs).toEqual([]);
});
