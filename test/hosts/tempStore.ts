/** Real stores in folders of their own, and small jobs to keep in them. */
import { mkdtempSync, rmSync } from 'node:fs';
import { tmpdir } from 'node:os';
import { join } from 'node:path';
import { afterAll } from 'vitest';
import type { Trouble } from '../../core/host.ts';
import type { KeepRequest } from '../../electron/store/jobShelf.ts';
import { Refused } from '../../electron/store/refused.ts';
import { openStore, type Store, type StoreRequest } from '../../electron/store/store.ts';

const folders: string[] = [];

/** Removed when the test file has run. */
export function tempFolder(): string {
  const folder = mkdtempSync(join(tmpdir(), 'ohmwright-store-'));
  folders.push(folder);
  return folder;
}

afterAll(() => {
  for (const folder of folders) rmSync(folder, { recursive: true, force: true });
});

export async function tempStore(request: Partial<StoreRequest> = {}): Promise<Store> {
  return await openStore({ folder: request.folder ?? tempFolder(), now: () => new Date(), ...request });
}

/** A state to be kept; the store itself does not read its text. */
export function state(text: string, label = text): KeepRequest {
  return { text, title: `Title of ${text}`, parts: text.length, label };
}

/** The trouble that some work ends in. */
export async function troubleOf(work: () => unknown): Promise<Trouble> {
  try {
    await work();
  } catch (error) {
    if (error instanceof Refused) return error.trouble;
    throw error;
  }
  throw new Error('the work was expected to end in trouble');
}
