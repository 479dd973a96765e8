/** The built page in a real browser, served by the built host. */
import { dirname, join } from 'node:path';
import { type Browser, chromium, type Page } from 'playwright-core';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { buildMode } from './buildMode.ts';
import { buildLocal, localFile, type RunningLocal, startBuiltLocal, testFolder } from './builtLocal.ts';

const { folder, remove } = testFolder();
let host: RunningLocal;
let browser: Browser;

beforeAll(async () => {
  await buildLocal();
  await buildMode('page', join(dirname(localFile), 'page', 'index.html'));
  host = await startBuiltLocal(folder);
  browser = await chromium.launch({
    executablePath: process.env['CHROMIUM'] ?? '/usr/bin/chromium',
    args: ['--disable-quic'],
  });
});

afterAll(async () => {
  await browser.close();
  host.process.kill('SIGTERM');
  await host.ended;
  remove();
});

/** Opens an address and gathers all that a page of ours must not do. */
async function opened(url: string): Promise<{ readonly page: Page; readonly wrongs: string[] }> {
  const page = await browser.newPage();
  const wrongs: string[] = [];
  page.on('console', (said) => {
    if (said.type() === 'error') wrongs.push(`console: ${said.text()}`);
  });
  page.on('pageerror', (error) => wrongs.push(`error: ${error.message}`));
  page.on('request', (request) => {
    if (!/^(data:|blob:)/.test(request.url()) && !request.url().startsWith(`${host.origin}/`)) {
      wrongs.push(`asked outside: ${request.url()}`);
    }
  });
  await page.addInitScript(() => {
    document.addEventListener('securitypolicyviolation', (event) => {
      // oxlint-disable-next-line no-console -- the way out of the page to the listener above
      console.error(`policy: ${event.violatedDirective} ${event.blockedURI}`);
    });
  });
  await page.goto(url);
  return { page, wrongs };
}

describe('the page of the local browser host', () => {
  test('has no script or style inside its text, and names nothing outside', async () => {
    const response = await fetch(`${host.origin}/`);
    const html = await response.text();
    expect(html).not.toMatch(/<style|\sstyle=|\son[a-z]+=|javascript:/i);
    for (const script of html.match(/<script[^>]*>[^<]*/gi)!)
      expect(script).toMatch(/^<script [^>]*src="\.\/[^"]+"[^>]*>$/);
    expect(html).not.toMatch(/(?:src|href)="(?!\.\/|data:,)/);
    expect(html).not.toContain('__CSP_NONCE__');
  });

  test('takes the key out of the address, and still has it after a reload', async () => {
    const { page, wrongs } = await opened(host.url);
    await page.getByRole('heading', { level: 1 }).first().waitFor();
    expect(page.url()).toBe(`${host.origin}/`);
    expect(await page.evaluate(() => history.length)).toBeLessThanOrEqual(2);
    const listed = page.waitForResponse((response) => response.url().endsWith('/call/jobs.list'));
    await page.reload();
    expect((await listed).status()).toBe(200);
    expect(wrongs).toEqual([]);
    await page.close();
  });

  test('without a key says that it has none', async () => {
    const { page } = await opened(`${host.origin}/`);
    await page.getByText('no key', { exact: false }).first().waitFor();
    await page.close();
  });

  test('cannot be shown inside of another page', async () => {
    const response = await fetch(`${host.origin}/`);
    expect(response.headers.get('content-security-policy')).toContain("frame-ancestors 'none'");
    const page = await browser.newPage();
    await page.setContent(`<iframe src="${host.url}"></iframe>`);
    const inside = page.frames()[1]!;
    await inside.waitForLoadState();
    expect(await inside.locator('#page').count()).toBe(0);
    await page.close();
  });
});
