/** The app in a real browser: from an edit to its answer on the screen, panning a large drawing, start, and size of what is loaded. */
import { existsSync, readdirSync, readFileSync } from 'node:fs';
import { join } from 'node:path';
import { gzipSync } from 'node:zlib';
import type { Browser, Page } from 'playwright-core';
import { endHost, type Host, launch, openApp, startHost } from '../screens/app.ts';
import { figure, type Report } from './report.ts';
import { median } from './stopwatch.ts';
import { wiringJob } from './wiringJob.ts';

const pageFolder = 'dist/page/assets';
const EDITS = 60;
const PAUSE_MS = 300;
const FRAME_MS = 1000 / 60;

export async function run(report: Report): Promise<void> {
  if (!existsSync(pageFolder)) {
    report.missing('the page', 'it is not built: npm run build');
    return;
  }
  sizes(report);
  let browser: Browser;
  try {
    browser = await launch();
  } catch (error) {
    report.missing('the page in a browser', String(error).split('\n')[0] ?? '');
    return;
  }
  try {
    await start(report, browser);
    await withHost((host) => edits(report, browser, host));
    await withHost((host) => panning(report, browser, host));
  } finally {
    await browser.close();
  }
}

/** A host that is ended whatever becomes of what is measured on it. */
async function withHost(measure: (host: Host) => Promise<void>): Promise<void> {
  const host = await startHost();
  try {
    await measure(host);
  } finally {
    await endHost(host);
  }
}

/** What the first load asks for: page, styles, scripts and the solver; typefaces apart. */
function sizes(report: Report): void {
  const all = readdirSync(pageFolder).map((name) => {
    const content = readFileSync(join(pageFolder, name));
    return { name, raw: content.length, gzip: gzipSync(content).length };
  });
  const firstHtml = readFileSync(join(pageFolder, '..', 'index.html'), 'utf8');
  const first = (name: string) => firstHtml.includes(name);
  const groups = [
    ['first load: scripts and styles', all.filter(({ name }) => first(name) && !name.endsWith('.ttf'))],
    ['solver, loaded with the first job', all.filter(({ name }) => name.startsWith('solve.worker'))],
    ['typefaces', all.filter(({ name }) => name.endsWith('.ttf'))],
  ] as const;
  const kilo = (bytes: number) => (bytes / 1000).toFixed(0);
  report.table(
    'What the page loads, kB',
    ['what', 'raw', 'gzip'],
    groups.map(([what, files]) => [
      what,
      kilo(files.reduce((sum, { raw }) => sum + raw, 0)),
      kilo(files.reduce((sum, { gzip }) => sum + gzip, 0)),
    ]),
  );
}

/** From going to the address to the first screen that can be used, and to the first answer of a job that is opened. */
async function start(report: Report, browser: Browser): Promise<void> {
  const rounds: { readonly host: number; readonly page: number; readonly job: number }[] = [];
  for (let round = 0; round < Math.min(report.rounds, 5); round++) {
    const began = performance.now();
    const host = await startHost();
    const hostUp = performance.now();
    const { page } = await openApp(browser, host);
    const usable = performance.now();
    await openJob(page, 200);
    const answered = performance.now();
    rounds.push({ host: hostUp - began, page: usable - hostUp, job: answered - usable });
    await page.context().close();
    await endHost(host);
  }
  const ms = (pick: (round: (typeof rounds)[number]) => number) => figure(median(rounds.map(pick)));
  report.table(
    'Start, ms (medians)',
    ['host process up', 'address to first screen', 'opening a 200-part job to its first answer'],
    [[ms((r) => r.host), ms((r) => r.page), ms((r) => r.job)]],
  );
}

async function openJob(page: Page, parts: number): Promise<void> {
  const job = wiringJob(parts) as Record<string, unknown>;
  await page.getByLabel('Job file', { exact: true }).setInputFiles({
    name: `wiring-${String(parts)}.job.json`,
    mimeType: 'application/json',
    buffer: Buffer.from(JSON.stringify(job)),
  });
  await page
    .getByRole('contentinfo', { name: 'Balance line' })
    .getByText(/in .* W = out/)
    .waitFor();
}

/** One field is changed again and again, as a person types; the page's own marks say how long each took. */
async function edits(report: Report, browser: Browser, host: Host): Promise<void> {
  const { page } = await openApp(browser, host);
  await openJob(page, 200);
  await page.keyboard.press('Control+k');
  await page.getByRole('combobox', { name: /Find parts/ }).fill('PP0');
  await page.keyboard.press('Enter');
  const field = page.getByRole('textbox', { name: 'Length' }).first();
  for (let edit = 0; edit < EDITS; edit++) {
    await field.fill(`${String(5 + edit / 10)} m`);
    await field.press('Enter');
    // As a person pauses; asking the page again and again whether it is ready would be work of its own.
    await page.waitForTimeout(PAUSE_MS);
  }
  const measured = await page.evaluate(() =>
    performance.getEntriesByName('ohmwright edit to answer').map((entry) => ({
      allMs: entry.duration,
      engine: (entry as PerformanceMeasure).detail as { read: number; solve: number; check: number },
    })),
  );
  const warm = measured.slice(Math.floor(EDITS / 2));
  const of = (pick: (one: (typeof measured)[number]) => number) => median(warm.map(pick));
  const engineMs = of(({ engine }) => engine.read + engine.solve + engine.check);
  const allMs = of(({ allMs: all }) => all);
  report.table(
    'An edit of a 200-part job in the browser, four cases and rest (ms, medians of the later half of the edits)',
    ['read', 'solve', 'check', 'engine together', 'of one frame', 'to the screen', 'of 100 ms'],
    [
      [
        figure(of(({ engine }) => engine.read)),
        figure(of(({ engine }) => engine.solve)),
        figure(of(({ engine }) => engine.check)),
        figure(engineMs),
        `${figure(engineMs / FRAME_MS)} ×`,
        figure(allMs),
        `${figure(allMs / 100)} ×`,
      ],
    ],
  );
  await page.context().close();
}

/** The ground is dragged to and fro; frames are counted by the browser's own callback. */
async function panning(report: Report, browser: Browser, host: Host): Promise<void> {
  const { page } = await openApp(browser, host);
  await openJob(page, 500);
  await page.getByRole('button', { name: 'Fit' }).click();
  await page.waitForTimeout(1000);
  const box = await page.locator('.react-flow__pane').boundingBox();
  if (box === null) throw new Error('the drawing has a ground');
  const rate = async (): Promise<number> => {
    await page.evaluate(() => {
      const frames: number[] = [];
      const count = (at: number): void => {
        frames.push(at);
        (window as unknown as { counting: number }).counting = requestAnimationFrame(count);
      };
      (window as unknown as { frames: number[] }).frames = frames;
      requestAnimationFrame(count);
    });
    await page.mouse.move(box.x + 20, box.y + 20);
    await page.mouse.down({ button: 'middle' });
    for (let step = 0; step < 120; step++) {
      await page.mouse.move(box.x + 20 + 3 * (step % 60), box.y + 20 + 2 * (step % 40));
    }
    await page.mouse.up({ button: 'middle' });
    return page.evaluate(() => {
      cancelAnimationFrame((window as unknown as { counting: number }).counting);
      const { frames } = window as unknown as { frames: number[] };
      return ((frames.length - 1) * 1000) / (frames.at(-1)! - frames[0]!);
    });
  };
  const rates: number[] = [];
  for (let round = 0; round < Math.min(report.rounds, 5); round++) rates.push(await rate());
  report.table(
    'Panning a 500-part drawing, headless without a graphics processor',
    ['frames a second, median', 'least'],
    [[figure(median(rates)), figure(Math.min(...rates))]],
  );
  await page.context().close();
}
