/** The built page as answers to paths, the same for every host that shows it. */
import { randomBytes } from 'node:crypto';
import { readFile, realpath } from 'node:fs/promises';
import { extname, join, resolve, sep } from 'node:path';
import { noncePlace, securityHeaders } from './contentPolicy.ts';

export interface PageAnswer {
  readonly status: 200 | 404;
  readonly headers: Readonly<Record<string, string>>;
  readonly body: Uint8Array;
}

/** `path` is the path of an address as it was sent: undecoded, without query and fragment. Never throws. */
export type PageFiles = (path: string) => Promise<PageAnswer>;

const kinds: Readonly<Record<string, string>> = {
  '.html': 'text/html; charset=utf-8',
  '.js': 'text/javascript; charset=utf-8',
  '.mjs': 'text/javascript; charset=utf-8',
  '.css': 'text/css; charset=utf-8',
  '.json': 'application/json; charset=utf-8',
  '.csv': 'text/csv; charset=utf-8',
  '.txt': 'text/plain; charset=utf-8',
  '.svg': 'image/svg+xml',
  '.png': 'image/png',
  '.ico': 'image/vnd.microsoft.icon',
  '.ttf': 'font/ttf',
  '.woff2': 'font/woff2',
};

/**
 * Segments as the build names its files. Whatever else a path may hold (`..`, `%`, `\`, a name with a leading dot, an empty
 * segment, a colon) matches nothing, so no spelling of a way out needs to be understood.
 */
const plainPath = /^(?:\/[A-Za-z0-9_-][A-Za-z0-9_.-]*)+$/;
/** Files whose name changes with their content. */
const hashedName = /^\/assets\/.*-[A-Za-z0-9_-]{8,}\.[a-z0-9]+$/;

/** Serves the regular files under `root`, and nothing that leads out of it. */
export function staticFiles(root: string): PageFiles {
  return async (path) => {
    const asked = path === '/' ? '/index.html' : path;
    const body = plainPath.test(asked) ? await ownFile(root, asked) : undefined;
    if (body === undefined) return notFound();
    const type = kinds[extname(asked).toLowerCase()] ?? 'application/octet-stream';
    if (extname(asked) === '.html') return pageAnswer(body, type);
    const keep = hashedName.test(asked) ? 'public, max-age=31536000, immutable' : 'no-cache';
    return { status: 200, headers: { ...securityHeaders(), 'Content-Type': type, 'Cache-Control': keep }, body };
  };
}

/** The bytes of a file that really lies where its name says; a link to anywhere is not followed. */
async function ownFile(root: string, path: string): Promise<Uint8Array | undefined> {
  try {
    const realRoot = await realpath(resolve(root));
    const file = join(realRoot, ...path.split('/'));
    if (!file.startsWith(realRoot + sep) || (await realpath(file)) !== file) return undefined;
    return await readFile(file);
  } catch {
    return undefined; // missing, a folder, or not ours to read: to the asker all the same
  }
}

/** Each load has a nonce of its own, so a page that was seen once says nothing about the next. */
function pageAnswer(bytes: Uint8Array, type: string): PageAnswer {
  const nonce = randomBytes(16).toString('base64');
  const html = new TextDecoder().decode(bytes).replaceAll(noncePlace, nonce);
  const headers = { ...securityHeaders(nonce), 'Content-Type': type, 'Cache-Control': 'no-store' };
  return { status: 200, headers, body: new TextEncoder().encode(html) };
}

function notFound(): PageAnswer {
  return {
    status: 404,
    headers: { ...securityHeaders(), 'Content-Type': 'text/plain; charset=utf-8', 'Cache-Control': 'no-store' },
    body: new TextEncoder().encode('There is nothing here.\n'),
  };
}
