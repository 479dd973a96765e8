/** How a host lets the person choose files; each host brings its own. Writing and reading themselves are done by the services. */
import type { HostCan } from '../../core/host.ts';

export type FileKind = 'job' | 'pdf';

export interface FileDoor {
  /** Path of the file that the person chose; null where they changed their mind. Called only where `can.askForFile`. */
  askOpen(): Promise<string | null>;
  /** Path where the file shall go, overwriting agreed with the person; null where they changed their mind. Called only where `can.askWhereToSave`. */
  askSave(ask: { readonly suggestedName: string; readonly kind: FileKind }): Promise<string | null>;
  /** Shows a file with the program that the person uses for its kind. Called only where `can.showFile`. */
  show(path: string): Promise<void>;
  /** Where files go that are saved without asking; made when it is first needed. */
  readonly saveFolder: string;
}

/** What a host says about itself; the rest of `AboutHost` comes from the store and the door. */
export interface HostFacts {
  readonly kind: 'window' | 'browser';
  readonly version: string;
  readonly can: HostCan;
}
