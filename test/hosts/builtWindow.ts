/** The window's programs as they ship: its own process and what it hands to its page. */
import { join } from 'node:path';
import { fileURLToPath } from 'node:url';
import { buildMode } from './buildMode.ts';

const dist = fileURLToPath(new URL('../../dist', import.meta.url));
export const mainFile = join(dist, 'main.mjs');
export const preloadFile = join(dist, 'preload.cjs');
export const pageFile = join(dist, 'page', 'index.html');

export async function buildMain(): Promise<void> {
  await buildMode('main', mainFile);
}

export async function buildPreload(): Promise<void> {
  await buildMode('preload', preloadFile);
}

export async function buildPage(): Promise<void> {
  await buildMode('page', pageFile);
}
