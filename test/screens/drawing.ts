/** Hands on the wiring drawing: where things stand, dragging, what is selected, what the store holds because of it. */
import { readFileSync } from 'node:fs';
import type { Locator, Page } from 'playwright-core';
import { expect } from 'vitest';
import { openText, stored, storedPart } from './acts.ts';
import { allKept } from './app.ts';

const example = (name: string): string =>
  readFileSync(new URL(`../../data/examples/${name}.job.json`, import.meta.url), 'utf8');
export const hut = example('weekend-hut');
export const cabin = example('ridge-cabin');
export const seeded = example('sloop-with-seeded-trouble');

export interface Spot {
  readonly x: number;
  readonly y: number;
}

/** Leaves the job that is open, if one is, and opens a new copy of another in the wiring. */
export async function openDrawing(page: Page, text: string): Promise<void> {
  const start = page.getByRole('heading', { name: 'Start small' });
  await start
    .or(page.getByRole('button', { name: 'Jobs', exact: true }))
    .first()
    .waitFor();
  await openText(page, text);
  await page.locator('.react-flow__node').first().waitFor();
  await allKept(page);
}

export const nodeOf = (page: Page, part: string): Locator => page.locator(`.react-flow__node[data-id="p:${part}"]`);
export const gripOf = (page: Page, part: string): Locator => nodeOf(page, part).locator('.grip');
export const dotOf = (page: Page, junction: string): Locator =>
  page.locator(`.react-flow__node[data-id="j:${junction}"] .dot`);

export async function middleOf(what: Locator): Promise<Spot> {
  const box = await what.boundingBox();
  if (box === null) throw new Error('it is not shown');
  return { x: box.x + box.width / 2, y: box.y + box.height / 2 };
}

/** Drags as a hand does, by way of places between. */
export async function drag(page: Page, from: Spot, to: Spot): Promise<void> {
  await page.mouse.move(from.x, from.y);
  await page.mouse.down();
  for (let step = 1; step <= 8; step++) {
    await page.mouse.move(from.x + ((to.x - from.x) * step) / 8, from.y + ((to.y - from.y) * step) / 8);
  }
  await page.mouse.up();
}

/** A place of the drawing where nothing stands, near its lower left corner. */
export async function emptySpot(page: Page): Promise<Spot> {
  const box = await page.locator('.drawing').boundingBox();
  if (box === null) throw new Error('there is no drawing');
  return { x: box.x + 30, y: box.y + box.height - 30 };
}

/** Parts that are selected, as the drawing shows them. */
export const selected = (page: Page): Promise<string[]> =>
  page.evaluate(() =>
    [...document.querySelectorAll<HTMLElement>('.react-flow__node.selected')].flatMap(({ dataset }) => {
      const id = dataset['id'] ?? '';
      return id.startsWith('p:') ? [id.slice(2)] : [];
    }),
  );

export const zoomOf = (page: Page): Promise<number> =>
  page.evaluate(() => {
    const viewport = document.querySelector<HTMLElement>('.react-flow__viewport');
    return viewport === null ? 0 : new DOMMatrix(getComputedStyle(viewport).transform).a;
  });
export const panOf = (page: Page): Promise<Spot> =>
  page.evaluate(() => {
    const viewport = document.querySelector<HTMLElement>('.react-flow__viewport');
    const { e, f } = new DOMMatrix(viewport === null ? '' : getComputedStyle(viewport).transform);
    return { x: e, y: f };
  });

export interface JobText {
  readonly junctions: Readonly<Record<string, { readonly at?: Spot }>>;
  readonly parts: readonly Readonly<Record<string, unknown>>[];
}

/** The job as the store holds it, once every change is kept. */
export async function storedJob(page: Page): Promise<JobText> {
  await allKept(page);
  return JSON.parse((await stored(page)).text) as JobText;
}
export const storedIds = async (page: Page): Promise<string[]> =>
  (await storedJob(page)).parts.map(({ id }) => String(id));

/** Waits until the store holds so many parts; returns the last. */
export async function untilParts(page: Page, count: number): Promise<Readonly<Record<string, unknown>>> {
  await expect.poll(async () => (await storedJob(page)).parts.length).toBe(count);
  return (await storedJob(page)).parts.at(-1) ?? {};
}

export async function placeOf(page: Page, part: string): Promise<Spot> {
  await allKept(page);
  return (await storedPart(page, part))['at'] as Spot;
}
