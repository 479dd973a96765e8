/** Jobs from files and into files. */
import { closeSync, fstatSync, mkdirSync, openSync, readSync, statSync } from 'node:fs';
import { isAbsolute, join, resolve } from 'node:path';
import type { KeptJob, WrittenFile } from '../../core/host.ts';
import { jobText, largestBytes } from '../files/jobText.ts';
import { writeNumbered, writeWhole } from '../files/wholeFile.ts';
import { Refused } from '../store/refused.ts';
import { type Bench, issuesRefusal, onFile } from './bench.ts';
import type { FileKind } from './fileDoor.ts';
import { bareName, fileStem } from './fileName.ts';
import { keepable } from './jobServices.ts';
import type { Doing } from './services.ts';

type FileMethods = 'files.open' | 'files.saveJob' | 'files.show';

/** Where a host's files go and come from. */
export class FileDesk {
  private readonly bench: Bench;
  /** Written by this host since it began; no other file is shown. */
  private readonly written = new Set<string>();

  constructor(bench: Bench) {
    this.bench = bench;
  }

  /**
   * The job of a file: the one that is known to lie there, with the file's text as a new revision where it never had it, else a
   * new job. The file is not touched.
   */
  jobOf(path: string, by: string): KeptJob {
    const { store, tell } = this.bench;
    const file = resolve(path);
    const text = readJobFile(file);
    const name = bareName(file);
    const known = store.jobs.ofFile(file);
    if (known === undefined) return store.jobs.create({ ...keepable(text, `Read from ${name}`), file });
    store.jobs.restore(known);
    if (store.jobs.hasText(known, text)) return store.jobs.open(known);
    const { head } = store.jobs.keep(known, store.jobs.head(known), keepable(text, `Read again from ${name}`));
    tell({ event: 'job-changed', job: known, head, by });
    return store.jobs.open(known);
  }

  async saveJob(job: KeptJob, where: 'known' | 'ask'): Promise<WrittenFile | null> {
    const { store } = this.bench;
    const { file } = job;
    const isPlace = file !== null && isAbsolute(file);
    if (where === 'known' && isPlace) {
      this.expectOwn(job, file);
      return this.write(file, job.text);
    }
    const suggestedName = file === null ? `${fileStem(job.title)}.job.json` : bareName(file);
    const saved = await this.save({ suggestedName, kind: 'job', content: job.text });
    if (saved !== null) store.jobs.setFile(job.job, saved.path);
    return saved;
  }

  /** Asks the person where this host can; else writes to its own folder under a name that is free. */
  async save(request: {
    readonly suggestedName: string;
    readonly kind: FileKind;
    readonly content: string | Uint8Array;
  }): Promise<WrittenFile | null> {
    const { door, about } = this.bench;
    const { suggestedName, kind, content } = request;
    if (about.can.askWhereToSave) {
      const path = await door.askSave({ suggestedName, kind });
      return path === null ? null : this.write(resolve(path), content);
    }
    const folder = resolve(door.saveFolder);
    const path = onFile(join(folder, suggestedName), 'written', () => {
      mkdirSync(folder, { recursive: true });
      return writeNumbered(folder, suggestedName, content);
    });
    return this.noted(path);
  }

  hasWritten(path: string): boolean {
    return this.written.has(resolve(path));
  }

  private write(path: string, content: string | Uint8Array): WrittenFile {
    onFile(path, 'written', () => {
      writeWhole(path, content);
    });
    return this.noted(path);
  }

  private noted(path: string): WrittenFile {
    this.written.add(path);
    return { name: bareName(path), path };
  }

  /** A file that somebody else has changed since is not written over. */
  private expectOwn({ job }: KeptJob, file: string): void {
    const bytes = bytesIfThere(file);
    if (bytes === undefined) return;
    const text = jobText(bytes);
    if (text.ok && this.bench.store.jobs.hasText(job, text.value)) return;
    throw new Refused({
      code: 'conflict',
      message: `${bareName(file)} was changed by another program since this job was read from it or written to it. Nothing was written. Open the file to take its changes into the job, or save under another name.`,
    });
  }
}

export function fileServices({ store, door, about }: Bench, desk: FileDesk): { readonly [M in FileMethods]: Doing<M> } {
  return {
    'files.open': async (_, { window }) => {
      if (!about.can.askForFile) throw cannot('This host cannot ask for a file; give the file to the page instead.');
      const path = await door.askOpen();
      return path === null ? null : desk.jobOf(path, window);
    },
    'files.saveJob': async ({ job, revision, where }) => {
      const kept = store.jobs.open(job);
      if (kept.head !== revision) {
        throw new Refused({
          code: 'conflict',
          message: 'This job was changed by another window or program in between. No file was written.',
          head: kept.head,
        });
      }
      return await desk.saveJob(kept, where);
    },
    'files.show': async ({ path }) => {
      if (!about.can.showFile) throw cannot('This host cannot show a file; it lies where it was saved.');
      if (!desk.hasWritten(path)) {
        throw new Refused({
          code: 'not-found',
          message: 'Only a file that was written here since the start is shown.',
        });
      }
      await door.show(resolve(path));
      return null;
    },
  };
}

function cannot(message: string): Refused {
  return new Refused({ code: 'cannot', message });
}

function readJobFile(file: string): string {
  const bytes = onFile(file, 'read', () => fileBytes(file));
  const text = jobText(bytes);
  if (!text.ok) throw issuesRefusal(`${bareName(file)} cannot be read`, text.issues);
  return text.value;
}

function bytesIfThere(file: string): Uint8Array | undefined {
  try {
    return onFile(file, 'read', () => fileBytes(file));
  } catch (error) {
    if (error instanceof Refused && error.trouble.code === 'not-found') return undefined;
    throw error;
  }
}

/** Not read to its end where it is longer than any job, and not at all where it is no file but a pipe or a folder. */
function fileBytes(file: string): Uint8Array {
  // Asked first, since opening a pipe would wait for whoever writes into it.
  if (!statSync(file).isFile()) throw Object.assign(new Error('no file'), { code: 'EISDIR' });
  const descriptor = openSync(file, 'r');
  try {
    const bytes = new Uint8Array(Math.min(fstatSync(descriptor).size, largestBytes + 1));
    let length = 0;
    for (let read = -1; read !== 0 && length < bytes.length; length += read) {
      read = readSync(descriptor, bytes, length, bytes.length - length, length);
    }
    return bytes.subarray(0, length);
  } finally {
    closeSync(descriptor);
  }
}
