/** Every stage in some of the looks: nothing clipped, nothing unnamed. Two files share them, so that two browsers work at once. */
import type { Browser, BrowserContextOptions, Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { axeViolations, endHost, type Host, launch, openApp, openPattern, shoot, startHost } from './app.ts';

const stages = ['Site', 'Wiring', 'Strings', 'Findings', 'Handover'] as const;

interface Look {
  readonly name: string;
  readonly options: BrowserContextOptions;
  readonly textPercent?: string;
}

const looks: readonly Look[] = [
  { name: 'day-1280x800', options: {} },
  { name: 'night-1280x800', options: { colorScheme: 'dark' } },
  { name: 'tablet-1024x768', options: { viewport: { width: 1024, height: 768 }, hasTouch: true, isMobile: true } },
  { name: 'large-text', options: {}, textPercent: '200 %' },
];

async function goStage(page: Page, name: string): Promise<void> {
  await page
    .getByRole('navigation', { name: 'Stages of the job' })
    .getByRole('button', { name: new RegExp(`^${name}`) })
    .click();
  await page.getByRole('main').waitFor();
  // Stages are loaded when first gone to, and figures come from the worker.
  await page.waitForTimeout(500);
  await page.getByText('The bank is being solved').waitFor({ state: 'hidden' });
}

/** What sticks out of the page or hides behind its edge: the page itself must never scroll sideways. */
async function overflow(page: Page): Promise<number> {
  return page.evaluate(() => document.documentElement.scrollWidth - document.documentElement.clientWidth);
}

/** The tests of the looks named. */
export function everyStageIn(names: readonly string[]): void {
  let browser: Browser;
  let host: Host;
  beforeAll(async () => {
    [browser, host] = await Promise.all([launch(), startHost()]);
  });
  afterAll(async () => {
    await browser.close();
    await endHost(host);
  });
  describe.each(looks.filter(({ name }) => names.includes(name)))('$name', ({ name, options, textPercent }) => {
    test('the start and every stage have no violation of the accessibility rules and fit the screen', async () => {
      const { page, wrongs } = await openApp(browser, host, { reducedMotion: 'reduce', ...options });
      if (textPercent !== undefined) {
        await page.getByRole('button', { name: 'Looks' }).click();
        await page.getByRole('radio', { name: textPercent }).check();
        await page.getByRole('button', { name: 'Done' }).click();
      }
      const found: string[] = [];
      const look = async (what: string): Promise<void> => {
        await shoot(page, `${name}-${what}`);
        for (const violation of await axeViolations(page)) found.push(`${what}: ${violation}`);
        const beyond = await overflow(page);
        if (beyond > 0) found.push(`${what}: ${String(beyond)} px wider than the screen`);
      };
      await look('start');
      await openPattern(page, /four seeded troubles/);
      for (const stage of stages) {
        await goStage(page, stage);
        await look(stage.toLowerCase());
        if (stage !== 'Findings') continue;
        await page.getByRole('tab', { name: 'Protection' }).click();
        await page.locator('[data-device]').first().click();
        await page.getByRole('img', { name: /at the lowest fault/ }).waitFor();
        await look('protection');
      }
      await page.getByRole('button', { name: 'History' }).click();
      await page.getByRole('heading', { name: 'History' }).waitFor();
      await look('history');
      await page.keyboard.press('Escape');
      if (textPercent !== undefined) {
        await page.getByRole('button', { name: 'Looks' }).click();
        await page.getByRole('radio', { name: '100 %' }).check();
      }
      await page.context().close();
      expect(found).toEqual([]);
      expect(wrongs).toEqual([]);
    });
  });
}
