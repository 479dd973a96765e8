/** What a person does at the screens, and what the store holds because of it. */
import type { Locator, Page } from 'playwright-core';
import type { HostAnswer, HostAsk, HostMethod, HostValue, KeptJob, RevisionSummary } from '../../core/host.ts';

export const ledger = (page: Page): Locator => page.getByRole('complementary', { name: /Ledger/ });
export const balance = (page: Page): Locator => page.getByRole('contentinfo', { name: 'Balance line' });

export async function goStage(
  page: Page,
  name: 'Site' | 'Wiring' | 'Strings' | 'Findings' | 'Handover',
): Promise<void> {
  const stages = page.getByRole('navigation', { name: 'Stages of the job' });
  await stages.getByRole('button', { name: new RegExp(`^${name}`) }).click();
}

/** Goes to a part or junction by the box that finds anything, and waits until its ledger is shown. */
export async function find(page: Page, id: string): Promise<void> {
  await page.keyboard.press('Control+k');
  await page.getByRole('combobox', { name: /Find parts/ }).fill(id);
  await page.keyboard.press('Enter');
  await page.getByRole('article', { name: new RegExp(`^${id.replaceAll('+', '\\+')}, `) }).waitFor();
}

/** Gives the page a job file, as a person picks one. */
export async function pick(page: Page, name: string, text: string): Promise<void> {
  const buffer = Buffer.from(text);
  await page.getByLabel('Job file', { exact: true }).setInputFiles({ name, mimeType: 'application/json', buffer });
}

/** Leaves the open job for the list of jobs. */
export async function leave(page: Page): Promise<void> {
  await page.getByRole('button', { name: 'Jobs', exact: true }).click();
  await page.getByRole('heading', { name: 'Start small' }).waitFor();
}

/** Picks a job file at the start screen and waits until the job is open. */
export async function openText(page: Page, text: string): Promise<void> {
  if ((await page.getByRole('heading', { name: 'Start small' }).count()) === 0) await leave(page);
  await pick(page, 'picked.job.json', text);
  await page.getByRole('navigation', { name: 'Stages of the job' }).waitFor();
}

/** Asks the host behind the page, with the page's own key. */
export async function askHost<M extends HostMethod>(page: Page, method: M, ask: HostAsk<M>): Promise<HostValue<M>> {
  const answer = (await page.evaluate(
    async ([path, body]) => {
      const response = await fetch(`/call/${path}`, {
        method: 'POST',
        headers: {
          Authorization: `Bearer ${sessionStorage.getItem('ohmwright-key') ?? ''}`,
          'Content-Type': 'application/json',
          'X-Ohmwright-Window': 'onlooker',
        },
        body,
      });
      return response.json() as Promise<unknown>;
    },
    [method, JSON.stringify(ask)] as const,
  )) as HostAnswer<HostValue<M>>;
  if (!answer.ok) throw new Error(`${method}: ${answer.trouble.message}`);
  return answer.value;
}

/** The open job of a page as the store holds it. */
export async function stored(page: Page): Promise<KeptJob> {
  const job = await page.evaluate(() => sessionStorage.getItem('ohmwright.open-job'));
  return askHost(page, 'jobs.open', { job: job ?? '' });
}

/** A part of the open job as the store holds it. */
export async function storedPart(page: Page, id: string): Promise<Readonly<Record<string, unknown>>> {
  return partIn((await stored(page)).text, id);
}

export function partIn(text: string, id: string): Readonly<Record<string, unknown>> {
  const { parts } = JSON.parse(text) as { parts: readonly Readonly<Record<string, unknown>>[] };
  const part = parts.find((one) => one['id'] === id);
  if (part === undefined) throw new Error(`there is no ${id} in the store`);
  return part;
}

/** Every revision of the open job, newest first. */
export async function historyOf(page: Page): Promise<readonly RevisionSummary[]> {
  const { job } = await stored(page);
  return (await askHost(page, 'jobs.history', { job, most: 1000 })).revisions;
}
