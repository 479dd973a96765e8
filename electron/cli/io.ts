/** What a command touches beside the files it is given: its three streams and the date. */
import { fstatSync } from 'node:fs';
import { fileRefusal } from './refusal.ts';

/** Which file something is, however it is called. */
export interface FileIdentity {
  readonly dev: number;
  readonly ino: number;
}

export interface Io {
  /** Standard input, cut off once it is longer than the limit. */
  readStdin(limitBytes: number): Promise<Uint8Array>;
  /** The file that standard input is redirected from, if it is one. */
  stdinFile(): FileIdentity | undefined;
  /** Writes to standard output; ends quietly where nobody reads any more. */
  out(text: string): Promise<void>;
  /** Writes to standard error. */
  err(text: string): void;
  /** Today's date as `2025-03-31`, where the user is. */
  today(): string;
}

/** The streams of the running process. */
export function processIo(): Io {
  // A closed pipe is reported twice, to the callback of the write and here; here it is only kept from ending the process.
  process.stdout.on('error', () => {});
  process.stderr.on('error', () => {});
  return {
    readStdin: async (limitBytes) => collect(process.stdin, limitBytes),
    stdinFile: () => {
      const found = fstatSync(0);
      return found.isFile() ? { dev: found.dev, ino: found.ino } : undefined;
    },
    out: async (text) => writeAll(text),
    err: (text) => {
      process.stderr.write(text);
    },
    today: () => {
      const now = new Date();
      const two = (value: number): string => String(value).padStart(2, '0');
      return `${String(now.getFullYear())}-${two(now.getMonth() + 1)}-${two(now.getDate())}`;
    },
  };
}

/** Gathers a stream until it ends or is longer than the limit. */
export async function collect(stream: AsyncIterable<Uint8Array>, limitBytes: number): Promise<Uint8Array> {
  const chunks: Uint8Array[] = [];
  let length = 0;
  for await (const chunk of stream) {
    chunks.push(chunk);
    length += chunk.length;
    if (length > limitBytes) break;
  }
  return Buffer.concat(chunks);
}

async function writeAll(text: string): Promise<void> {
  await new Promise<void>((resolve, reject) => {
    process.stdout.write(text, (error) => {
      if (error === undefined || error === null || ('code' in error && error.code === 'EPIPE')) resolve();
      else reject(fileRefusal('Standard output cannot be written', error));
    });
  });
}
