import { mkdirSync, mkdtempSync, realpathSync, rmSync, symlinkSync, writeFileSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll, beforeAll, describe, expect, test } from 'vitest';
import { type PageFiles, staticFiles } from '../../electron/page/staticFiles.ts';

let folder: string;
let page: PageFiles;

beforeAll(() => {
  folder = realpathSync(mkdtempSync(join(tmpdir(), 'page-')));
  const root = join(folder, 'page');
  mkdirSync(join(root, 'assets'), { recursive: true });
  mkdirSync(join(root, '.hidden'));
  writeFileSync(join(folder, 'secret.txt'), 'outside');
  writeFileSync(
    join(root, 'index.html'),
    '<meta name="csp-nonce" content="__CSP_NONCE__"><script src="./assets/x.js">',
  );
  writeFileSync(join(root, 'assets', 'index-a1B2c3D4.js'), 'export {};');
  writeFileSync(join(root, 'assets', 'face-a1B2c3D4.ttf'), Uint8Array.from([0, 1, 0, 0]));
  writeFileSync(join(root, 'plain.css'), 'p {}');
  writeFileSync(join(root, '.env'), 'hidden');
  writeFileSync(join(root, '.hidden', 'file.txt'), 'hidden');
  symlinkSync(join(folder, 'secret.txt'), join(root, 'link.txt'));
  symlinkSync(folder, join(root, 'assets', 'up'));
  symlinkSync(root, join(folder, 'page-by-link'));
  page = staticFiles(root);
});

afterAll(() => {
  rmSync(folder, { recursive: true, force: true });
});

/** Ways out of the folder, and ways to what is hidden in it. */
const ways = [
  '/../secret.txt',
  '/assets/../../secret.txt',
  '/%2e%2e/secret.txt',
  '/%2E%2E%2Fsecret.txt',
  '/..%2fsecret.txt',
  '/..%5csecret.txt',
  '/..\\secret.txt',
  '/%252e%252e/secret.txt',
  '/....//secret.txt',
  '/..%c0%afsecret.txt',
  '/..;/secret.txt',
  '//secret.txt',
  '/./index.html',
  '/index.html/',
  '/index.html%00.css',
  '/index.html\0',
  '/.env',
  '/.hidden/file.txt',
  '/%2eenv',
  '/link.txt',
  '/assets/up/secret.txt',
  '/assets',
  '/assets/',
  '/C:/secret.txt',
  '/index.html::$DATA',
  'secret.txt',
  '',
  'http://elsewhere.example/',
];

describe('the page as files', () => {
  test.each(ways)('%j leads nowhere', async (path) => {
    const { status, body } = await page(path);
    expect(status).toBe(404);
    expect(new TextDecoder().decode(body)).toBe('There is nothing here.\n');
  });

  test('each load of the page has a nonce of its own, the same in its policy and in its text', async () => {
    const loads = await Promise.all([page('/'), page('/index.html')]);
    const nonces = loads.map(({ headers, body }) => {
      const inPolicy = /'nonce-([^']+)'/.exec(headers['Content-Security-Policy']!)![1];
      const inText = /content="([^"]+)"/.exec(new TextDecoder().decode(body))![1];
      expect(inText).toBe(inPolicy);
      return inText!;
    });
    expect(new Set(nonces).size).toBe(2);
    expect(Buffer.from(nonces[0]!, 'base64').length).toBe(16);
  });

  test('the page is never kept by the browser, a file named after its content for good, any other is asked for again', async () => {
    expect((await page('/')).headers['Cache-Control']).toBe('no-store');
    expect((await page('/assets/index-a1B2c3D4.js')).headers['Cache-Control']).toContain('immutable');
    expect((await page('/plain.css')).headers['Cache-Control']).toBe('no-cache');
  });

  test('every answer keeps other pages out, whatever its status', async () => {
    for (const path of ['/', '/assets/index-a1B2c3D4.js', '/nothing.js']) {
      const { headers } = await page(path);
      const policy = headers['Content-Security-Policy']!;
      expect(policy).toContain("default-src 'none'");
      expect(policy).toContain("frame-ancestors 'none'");
      expect(policy).not.toMatch(/unsafe-|\*|https?:/);
      expect(headers).toMatchObject({
        'X-Content-Type-Options': 'nosniff',
        'Referrer-Policy': 'no-referrer',
        'Cross-Origin-Opener-Policy': 'same-origin',
        'Cross-Origin-Resource-Policy': 'same-origin',
      });
    }
  });

  test('a file is sent as what it is, byte for byte', async () => {
    const face = await page('/assets/face-a1B2c3D4.ttf');
    expect(face.headers['Content-Type']).toBe('font/ttf');
    expect([...face.body]).toEqual([0, 1, 0, 0]);
    expect((await page('/assets/index-a1B2c3D4.js')).headers['Content-Type']).toContain('text/javascript');
    expect((await page('/plain.css')).headers['Content-Type']).toContain('text/css');
  });

  test('a page folder that is itself reached by a link is served', async () => {
    const byLink = staticFiles(join(folder, 'page-by-link'));
    expect((await byLink('/plain.css')).status).toBe(200);
    expect((await byLink('/link.txt')).status).toBe(404);
  });

  test('a page that was never built is nothing, and no error', async () => {
    expect((await staticFiles(join(folder, 'missing'))('/')).status).toBe(404);
  });
});
