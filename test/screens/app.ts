/** The built app in a real browser: starts the local host on a store of its own, opens its page, and watches for what must not be. */
import { type ChildProcess, spawn } from 'node:child_process';
import { mkdirSync, mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { createInterface } from 'node:readline';
import { fileURLToPath } from 'node:url';
import { AxeBuilder } from '@axe-core/playwright';
import { type Browser, type BrowserContextOptions, chromium, type Page } from 'playwright-core';

const root = fileURLToPath(new URL('../..', import.meta.url));
const chromiumPath = process.env['CHROMIUM'] ?? '/usr/bin/chromium';
/** Another built page than that of the last build, such as one that nobody builds over while a test runs. */
const otherPage = process.env['OHMWRIGHT_TEST_PAGE'];
/** Screenshots are kept here, to be looked at. */
export const shotsFolder = join(root, 'test-results', 'screens');

export interface Host {
  readonly url: string;
  readonly store: string;
  readonly process: ChildProcess;
}

/** Starts the built host; with a store folder, on that store. */
export async function startHost(store = mkdtempSync(join(tmpdir(), 'ohmwright-store-'))): Promise<Host> {
  const save = join(store, 'saved');
  mkdirSync(save, { recursive: true });
  const words = ['--no-browser', '--store', store, '--save-folder', save, '--idle', '600'];
  if (otherPage !== undefined) words.push('--page', otherPage);
  const child = spawn(process.execPath, [join(root, 'dist/local.mjs'), ...words], {
    stdio: ['ignore', 'pipe', 'inherit'],
  });
  for await (const line of createInterface({ input: child.stdout })) {
    const url = /http:\/\/127\.0\.0\.1:\d+\/#\S+/.exec(line)?.[0];
    if (url !== undefined) return { url, store, process: child };
  }
  throw new Error('the host ended without telling its address');
}

export async function endHost({ process: child, store }: Host, keepStore = false): Promise<void> {
  if (child.exitCode === null && child.signalCode === null) {
    const gone = new Promise((resolve) => child.once('exit', resolve));
    child.kill('SIGTERM');
    await gone;
  }
  if (!keepStore) rmSync(store, { recursive: true, force: true });
}

/** Pulls the host away under its page, as a power cut does. */
export async function killHost({ process: child }: Host): Promise<void> {
  const gone = new Promise((resolve) => child.once('exit', resolve));
  child.kill('SIGKILL');
  await gone;
}

export function launch(): Promise<Browser> {
  return chromium.launch({
    executablePath: chromiumPath,
    args: ['--disable-gpu', '--disable-quic', '--no-first-run', '--disable-background-networking', '--disable-sync'],
  });
}

export interface Opened {
  readonly page: Page;
  /** Errors of the console, broken policies, requests to elsewhere: must stay empty. */
  readonly wrongs: readonly string[];
}

/** Opens the app's page in a fresh profile and waits until it can be used. */
export async function openApp(browser: Browser, host: Host, options: BrowserContextOptions = {}): Promise<Opened> {
  const context = await browser.newContext({ viewport: { width: 1280, height: 800 }, ...options });
  const page = await context.newPage();
  // What does not come within this never comes; the usual half minute only delays the news.
  page.setDefaultTimeout(Number(process.env['OHMWRIGHT_TEST_WAIT_MS'] ?? 15_000));
  const wrongs: string[] = [];
  const origin = new URL(host.url).origin;
  page.on('console', (message) => {
    if (message.type() === 'error' || message.type() === 'warning') wrongs.push(`console: ${message.text()}`);
  });
  page.on('pageerror', (error) => wrongs.push(`page error: ${error.message}`));
  page.on('request', (request) => {
    const url = request.url();
    if (!url.startsWith(origin) && !url.startsWith('data:') && !url.startsWith('blob:')) wrongs.push(`request: ${url}`);
  });
  await page.exposeFunction('reportViolation', (text: string) => void wrongs.push(`policy: ${text}`));
  await page.addInitScript(() => {
    document.addEventListener('securitypolicyviolation', (event) => {
      const report = (window as unknown as { reportViolation: (text: string) => void }).reportViolation;
      report(`${event.violatedDirective} ${event.blockedURI}`);
    });
  });
  await page.goto(host.url);
  await page.getByRole('heading', { level: 1 }).first().waitFor();
  return { page, wrongs };
}

/** Keeps a screenshot by name. */
export async function shoot(page: Page, name: string): Promise<void> {
  mkdirSync(shotsFolder, { recursive: true });
  await page.screenshot({ path: join(shotsFolder, `${name}.png`) });
}

/** Violations of the accessibility rules on what is shown now, or in a part of it, each in a line. */
export async function axeViolations(page: Page, within?: string): Promise<readonly string[]> {
  await page.mouse.move(0, 0);
  const builder = new AxeBuilder({ page });
  if (within !== undefined) builder.include(within);
  const { violations } = await builder
    .withTags(['wcag2a', 'wcag2aa', 'wcag21a', 'wcag21aa', 'wcag22aa', 'best-practice'])
    .analyze();
  return violations.map(({ id, nodes }) => `${id}: ${nodes.map(({ target }) => target.join(' ')).join(', ')}`);
}

/** Opens a starter pattern from the start screen. */
export async function openPattern(page: Page, title: RegExp): Promise<void> {
  await page.getByRole('button', { name: title }).first().click();
  await page
    .getByRole('contentinfo', { name: 'Balance line' })
    .getByText(/in .* W = out/)
    .waitFor();
}

/** Waits until the host has kept every change. */
export async function allKept(page: Page): Promise<void> {
  await page.getByText('✓ kept').waitFor();
}
