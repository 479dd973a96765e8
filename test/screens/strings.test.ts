/** The stage Strings: the answer first, what can be changed from it, and studies that can be stopped. */
import type { Browser, Locator, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { examples } from '../../data/examples/index.ts';
import { hireBoat, ridgeCabin } from '../outside/scenarioBanks.ts';
import { goStage, openText } from './acts.ts';
import { axeViolations, endHost, type Host, launch, type Opened, openApp, shoot, startHost } from './app.ts';

let browser: Browser;
let host: Host;
let opened: Opened;
let page: Page;

beforeAll(async () => {
  [browser, host] = await Promise.all([launch(), startHost()]);
  opened = await openApp(browser, host, { reducedMotion: 'reduce' });
  page = opened.page;
  await page.getByRole('heading', { name: 'Start small' }).waitFor();
});
afterAll(async () => {
  await browser.close();
  await endHost(host);
});

const main = (): Locator => page.getByRole('main');
const title = (): Locator => main().getByRole('heading', { level: 1 });
const titled = (words: RegExp): Promise<void> => title().filter({ hasText: words }).waitFor();
const fold = (name: string): Locator => main().locator(`[data-fold="${name}"]`);
const turn = (name: string): Promise<void> => fold(name).locator('summary').first().click();
const chooseCase = (words: RegExp): Promise<void> => main().getByRole('radio', { name: words }).check();
const row = (name: string): Locator => main().getByRole('row', { name: new RegExp(`^${name} `) });

/** A scenario of the acceptance book as a job file. */
function jobOf(title: string, parts: object): string {
  return JSON.stringify({ format: 'ohmwright-job', version: 1, title, practice: 'iec-land', ...parts });
}

async function openStrings(text: string): Promise<void> {
  await openText(page, text);
  await goStage(page, 'Strings');
  await title().waitFor();
}

describe.sequential('three strings, one of them new', () => {
  beforeAll(async () => {
    await openStrings(jobOf('Three strings', ridgeCabin));
    await chooseCase(/^load C/);
    await titled(/String C/);
  });

  test('the title says which string carries too much, and what would be fair', async () => {
    expect(await title().textContent()).toBe('String C carries 58\u00a0A of 80\u00a0A; fair would be 32\u00a0A');
    expect(await row('C').first().textContent()).toMatch(/57\.5.A.*\+80.%/);
  });

  test('what flows with everything off is told before the fold is opened, and pair by pair in it', async () => {
    expect(await fold('rest').locator('summary').textContent()).toMatch(/20\sA flows with everything off/);
    await turn('rest');
    const pairs = await fold('rest').getByRole('listitem').allTextContents();
    expect(pairs.map((pair) => pair.replaceAll('\u00a0', ' '))).toEqual(['CfeedsA10 A', 'CfeedsB10 A']);
  });

  test('the same case in the first second, by keys alone', async () => {
    await main().getByRole('radio', { name: 'Over minutes' }).focus();
    await page.keyboard.press('ArrowRight');
    expect(await main().getByRole('radio', { name: 'First second' }).isChecked()).toBe(true);
    await page.keyboard.press('ArrowLeft');
    await fold('one-out').locator('summary').first().focus();
    await page.keyboard.press('Enter');
    await fold('one-out')
      .getByRole('row', { name: /^string C/ })
      .waitFor();
  });

  test('two voltmeter readings give the amps of the first instant, with the caution beside them', async () => {
    await turn('joining');
    const join = fold('joining');
    await join.getByLabel('Judged by').selectOption({ label: 'two voltmeter readings' });
    await join.getByLabel('Volts, first').fill('25.4');
    await join.getByLabel('Volts, second').fill('24.6');
    await join.getByLabel('Limit', { exact: true }).fill('20');
    await page.keyboard.press('Enter');
    await join
      .getByText(/Not as they stand: 800.mV apart drives \d+.A at the first instant, against 20.A/)
      .first()
      .waitFor();
    expect(await join.getByRole('note').textContent()).toMatch(/Eye protection.*away from the battery/);
    expect(await join.getByRole('img', { name: /Current after joining/ }).count()).toBe(1);
  });

  test('layouts are drawn from the strings themselves, the best named', async () => {
    await turn('layouts');
    await fold('layouts')
      .getByRole('img', { name: /equal leads/i })
      .waitFor();
    expect(await fold('layouts').getByText('· best').count()).toBe(1);
  });

  test('with all of it open no rule of accessibility is broken', async () => {
    await turn('changes');
    await fold('changes')
      .getByRole('button', { name: /^Make it/ })
      .first()
      .waitFor();
    await turn('band');
    await fold('band').getByRole('table').first().waitFor();
    await shoot(page, 'strings-all-open');
    expect(await axeViolations(page)).toEqual([]);
  });
});

test('a change that evens the bank out is made in the job and taken back by undo', async () => {
  await openStrings(examples.find(({ name }) => name === 'ridge-cabin')?.text ?? '');
  await chooseCase(/^Kettle/);
  await titled(/String C carries/);
  const layouts = fold('layouts').locator('summary').first();
  await turn('layouts');
  await layouts.filter({ hasText: /as drawn.*23.%/ }).waitFor();
  await main().getByRole('button', { name: 'Make this change' }).click();
  await titled(/works as one/);
  // What was worked out for the job before the change is never shown as that of the job after it.
  await layouts
    .filter({ hasText: /best|as drawn/ })
    .filter({ hasNotText: /23.%/ })
    .waitFor();
  await page.getByRole('button', { name: /^Undo/ }).click();
  await titled(/String C carries/);
});

test('a year of cycles shows how far it is, and stops when told to', async () => {
  await turn('drift');
  const drift = fold('drift');
  await drift.getByLabel('How many cycles').fill('366');
  await page.keyboard.press('Enter');
  await drift.getByRole('button', { name: 'Run 366 cycles' }).click();
  await drift.getByRole('progressbar', { name: 'Running 366 cycles' }).waitFor();
  await drift.getByRole('button', { name: 'Stop' }).click();
  await drift.getByText('Stopped.').waitFor();
  await drift.getByLabel('How many cycles').fill('2');
  await page.keyboard.press('Enter');
  await drift.getByRole('button', { name: 'Run 2 cycles' }).click();
  await drift.getByText(/^The books add up/).waitFor();
  expect(await drift.getByRole('img', { name: /Charge of each string/ }).count()).toBe(1);
});

test('a string with a dead cell is charged by the others with nothing on, and the spine says stop', async () => {
  await openStrings(jobOf('Dead cell', hireBoat));
  await fold('rest').waitFor();
  expect(await fold('rest').locator('summary').textContent()).toMatch(/17\d\sA flows with everything off/);
  const stage = page.getByRole('navigation', { name: 'Stages of the job' }).getByRole('button', { name: /^Strings/ });
  expect(await stage.textContent()).toMatch(/\d stop/);
});

test('one string alone, none at all, and a case without an answer each say what to do next', async () => {
  const hut = JSON.parse(examples.find(({ name }) => name === 'weekend-hut')?.text ?? '') as {
    parts: Record<string, unknown>[];
  };
  await openStrings(JSON.stringify(hut));
  await titled(/^One string alone/);
  await main()
    .getByText(/With a second one beside it/)
    .waitFor();

  const greedy = hut.parts.map((part) =>
    part['kind'] === 'load' ? { ...part, powerW: 9000, minimumV: undefined } : part,
  );
  await openStrings(JSON.stringify({ ...hut, parts: greedy }));
  await titled(/no operating point/);
  await main().getByRole('button', { name: 'Read it in the findings' }).waitFor();

  await openStrings(jobOf('Nothing yet', { parts: [] }));
  await titled(/No battery string yet/);
  await main().getByRole('button', { name: 'Go to the wiring' }).click();
  expect(opened.wrongs).toEqual([]);
});
