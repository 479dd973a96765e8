/** What may be said to the local browser host when it is started. */
import { resolve } from 'node:path';
import { Command, InvalidArgumentError, Option } from 'commander';
import { programVersion } from '../cli/programVersion.ts';

export interface LocalOptions {
  readonly port: number;
  readonly store?: string;
  readonly saveFolder?: string;
  readonly page?: string;
  readonly browser: boolean;
  /** Seconds. */
  readonly idle: number;
  /** A job file to open. */
  readonly file?: string;
}

/** Usual seconds between the last page's going and the host's end. */
const usualIdleS = 60;
const longestIdleS = 24 * 3600;

export interface Say {
  help(this: void, text: string): void;
  complaint(this: void, text: string): void;
}

/** Reads the words after the program's name; help and wrong words are thrown as `CommanderError`, their text goes where `say` tells. */
export function readOptions(words: readonly string[], say: Say): LocalOptions {
  const command = new Command('ohmwright-local')
    .description('Serves Ohmwright to a browser on this machine, and to nothing outside it.')
    .version(programVersion)
    .addOption(
      new Option('--port <number>', 'port to listen on; 0 takes a free one').default(0).argParser(wholeTo(65_535)),
    )
    .option('--store <folder>', 'where jobs and their history are kept')
    .option('--save-folder <folder>', 'where saved files go')
    .option('--page <folder>', 'the built page, if not the one beside the program')
    .option('--no-browser', 'only print the address')
    .addOption(
      new Option('--idle <seconds>', 'how long to wait once the last page is closed')
        .default(usualIdleS)
        .argParser(wholeTo(longestIdleS)),
    )
    .argument('[job]', 'a job file to open')
    .allowExcessArguments(false)
    .exitOverride()
    .configureOutput({ writeOut: say.help, writeErr: say.complaint });
  command.parse([...words], { from: 'user' });
  const [file] = command.args;
  const options = command.opts<Omit<LocalOptions, 'file'>>();
  return file === undefined ? options : { ...options, file: resolve(file) };
}

function wholeTo(most: number): (word: string) => number {
  return (word) => {
    const value = Number(word);
    if (!/^\d{1,6}$/.test(word) || value > most) {
      throw new InvalidArgumentError(`A whole number from 0 to ${String(most)} is needed.`);
    }
    return value;
  };
}
