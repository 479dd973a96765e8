/**
 * What the screens and a host say to each other: types only, one contract for every host. A host answers each call with a value or
 * with trouble in plain words; it never throws across the channel.
 */
import type { Issue } from './job/issue.ts';
import type { Practice } from './job/job.ts';

/** Identity of a job in the store; not the name of a file. */
export type JobKey = string;
/** One kept state of a job. Revisions of a job form a tree: each but the first has a parent, and none is ever changed or removed. */
export type RevisionNumber = number;

export type HostKind = 'window' | 'browser';

/** What a host is able to do; what it cannot is false here, never a stub that does nothing. */
export interface HostCan {
  /** Asks the person for a file to open, in the system's own dialog. */
  readonly askForFile: boolean;
  /** Asks the person where a file should go, and writes it there whole or not at all; else it goes to the host's own folder. */
  readonly askWhereToSave: boolean;
  /** Shows a written file with the program that the person uses for its kind. */
  readonly showFile: boolean;
}

/** Something that the person should know from the start, such as a damaged store that was set aside. */
export interface HostNotice {
  readonly kind: 'store-damaged' | 'store-recovered' | 'clock-behind';
  readonly message: string;
}

export interface AboutHost {
  readonly kind: HostKind;
  readonly version: string;
  readonly can: HostCan;
  /** Where the store lies, to be shown to the person. */
  readonly storeFolder: string;
  /** Where files go that are saved without asking. */
  readonly saveFolder: string;
  readonly notices: readonly HostNotice[];
}

export interface JobSummary {
  readonly job: JobKey;
  readonly title: string;
  readonly parts: number;
  /** When it was last changed, as the host's clock said, ISO 8601 in UTC. For show only: order is the store's own. */
  readonly changedAt: string;
  /** The file that it was read from or last written to. */
  readonly file: string | null;
}

/** A job at its head. */
export interface KeptJob {
  readonly job: JobKey;
  readonly title: string;
  readonly head: RevisionNumber;
  /** The job file, whole. */
  readonly text: string;
  readonly file: string | null;
}

export interface RevisionSummary {
  readonly revision: RevisionNumber;
  readonly parent: RevisionNumber | null;
  /** What was done, in words: `Fuse F3: rating 60 A`. */
  readonly label: string;
  readonly at: string;
  /** Name that the person gave to this state. */
  readonly snapshot: string | null;
}

export type Theme = 'system' | 'light' | 'dark';
/** How the person likes it; none of it is part of a job. */
export interface Preferences {
  readonly theme: Theme;
  readonly paper: 'A4' | 'Letter';
  /** Which units are shown first; the other stands beside in grey. No stored figure depends on it. */
  readonly units: 'metric' | 'us';
  readonly textPercent: 100 | 125 | 150 | 200;
  readonly motion: 'system' | 'reduced';
}

/** A part that the person keeps for use in other jobs: fields of a part without id and junctions. */
export interface OwnPart {
  readonly id: string;
  readonly label: string;
  readonly part: Readonly<Record<string, unknown>>;
}

/** A reading as logged; the log only grows. */
export interface LoggedReading {
  readonly entry: number;
  readonly job: JobKey;
  readonly at: string;
  /** A reading as the job file has it. */
  readonly reading: Readonly<Record<string, unknown>>;
}

export interface WrittenFile {
  readonly name: string;
  readonly path: string;
}

export interface PdfRequest {
  readonly text: string;
  readonly paper: 'A4' | 'Letter';
  /** The day to print, as the page writes it: `2025-03-31`. */
  readonly preparedOn: string;
  readonly practice?: Practice;
}

export type ListKind = 'cables' | 'fuses' | 'parts';

export interface HostMethods {
  /** What this host is and can. */
  'host.about': { readonly ask: Record<string, never>; readonly answer: AboutHost };
  /** Ends the host; the store is closed first. */
  'host.end': { readonly ask: Record<string, never>; readonly answer: null };

  /** Jobs, last changed first. */
  'jobs.list': { readonly ask: Record<string, never>; readonly answer: readonly JobSummary[] };
  /** A new job from the text of a job file; refused with its issues where it cannot be read. */
  'jobs.create': {
    readonly ask: { readonly text: string; readonly label: string; readonly file?: string };
    readonly answer: KeptJob;
  };
  'jobs.open': { readonly ask: { readonly job: JobKey }; readonly answer: KeptJob };
  /** Keeps a changed job as a child of `after`, which must be the head: else trouble `conflict`, and nothing is written. */
  'jobs.keep': {
    readonly ask: {
      readonly job: JobKey;
      readonly after: RevisionNumber;
      readonly text: string;
      readonly label: string;
    };
    readonly answer: { readonly head: RevisionNumber; readonly at: string };
  };
  /** Moves the head from `from` (which must be the head) to any revision of the job: undo, redo, go back. Nothing is lost by it. */
  'jobs.go': {
    readonly ask: { readonly job: JobKey; readonly from: RevisionNumber; readonly to: RevisionNumber };
    readonly answer: KeptJob;
  };
  /** Revisions, newest first, below `before` where given. */
  'jobs.history': {
    readonly ask: { readonly job: JobKey; readonly before?: RevisionNumber; readonly most: number };
    readonly answer: { readonly head: RevisionNumber; readonly revisions: readonly RevisionSummary[] };
  };
  /** The way that undo and redo take: the head's ancestors and its line of last-visited descendants, oldest first. */
  'jobs.line': {
    readonly ask: { readonly job: JobKey; readonly most: number };
    readonly answer: { readonly head: RevisionNumber; readonly line: readonly RevisionSummary[] };
  };
  'jobs.revision': {
    readonly ask: { readonly job: JobKey; readonly revision: RevisionNumber };
    readonly answer: RevisionSummary & { readonly text: string };
  };
  /** Names a state; an empty name takes the name away. */
  'jobs.snapshot': {
    readonly ask: { readonly job: JobKey; readonly revision: RevisionNumber; readonly name: string };
    readonly answer: RevisionSummary;
  };
  /** Takes a job off the list; its revisions stay in the store and `jobs.restore` brings it back. */
  'jobs.remove': { readonly ask: { readonly job: JobKey }; readonly answer: null };
  'jobs.restore': { readonly ask: { readonly job: JobKey }; readonly answer: JobSummary };

  /** Asks the person for a job file; null where they changed their mind. Only where `can.askForFile`. */
  'files.open': { readonly ask: Record<string, never>; readonly answer: KeptJob | null };
  /** Writes the job at its head to a file, whole or not at all; null where the person changed their mind. */
  'files.saveJob': {
    readonly ask: { readonly job: JobKey; readonly revision: RevisionNumber; readonly where: 'known' | 'ask' };
    readonly answer: WrittenFile | null;
  };
  /** Shows a file that this host wrote in this session. Only where `can.showFile`. */
  'files.show': { readonly ask: { readonly path: string }; readonly answer: null };

  /** The report as a PDF, base64. */
  'reports.pdf': {
    readonly ask: PdfRequest;
    readonly answer: { readonly name: string; readonly base64: string };
  };
  /** Makes the report and writes it; null where the person changed their mind. */
  'reports.save': { readonly ask: PdfRequest; readonly answer: WrittenFile | null };
  /** A list of a job as CSV text. */
  'lists.csv': {
    readonly ask: { readonly text: string; readonly list: ListKind };
    readonly answer: { readonly name: string; readonly csv: string };
  };

  'library.list': { readonly ask: Record<string, never>; readonly answer: readonly OwnPart[] };
  'library.keep': { readonly ask: OwnPart; readonly answer: OwnPart };
  'library.remove': { readonly ask: { readonly id: string }; readonly answer: null };

  'preferences.read': { readonly ask: Record<string, never>; readonly answer: Preferences };
  'preferences.change': { readonly ask: Partial<Preferences>; readonly answer: Preferences };

  'readings.add': {
    readonly ask: { readonly job: JobKey; readonly reading: Readonly<Record<string, unknown>> };
    readonly answer: LoggedReading;
  };
  'readings.list': { readonly ask: { readonly job: JobKey }; readonly answer: readonly LoggedReading[] };
}

export type HostMethod = keyof HostMethods;
export type HostAsk<M extends HostMethod> = HostMethods[M]['ask'];
export type HostValue<M extends HostMethod> = HostMethods[M]['answer'];

export type TroubleCode =
  /** The message itself is malformed: unknown method or wrong fields. */
  | 'refused'
  /** The job text has issues. */
  | 'issues'
  /** Another window or program changed the job in between. */
  | 'conflict'
  | 'not-found'
  | 'disk-full'
  | 'read-only'
  /** Another program holds the store and did not let go in time. */
  | 'busy'
  | 'damaged'
  /** This host cannot do that; see its `can`. */
  | 'cannot'
  /** A bug of ours. */
  | 'defect'
  /** The host did not answer: it has ended or the way to it is cut. Made by the page itself. */
  | 'no-host';

export interface Trouble {
  readonly code: TroubleCode;
  /** One plain sentence: what happened, and that nothing was lost or what to do. */
  readonly message: string;
  readonly issues?: readonly Issue[];
  /** With `conflict`: where the job's head is now. */
  readonly head?: RevisionNumber;
}

export type HostAnswer<T> =
  | { readonly ok: true; readonly value: T }
  | { readonly ok: false; readonly trouble: Trouble };

/** What a host tells without being asked. */
export type HostEvent =
  /** The job has a new head, made by `window` (a name that each page gives itself). */
  | { readonly event: 'job-changed'; readonly job: JobKey; readonly head: RevisionNumber; readonly by: string }
  /** The person opened a file with the system: go to this job. */
  | { readonly event: 'open-job'; readonly job: JobKey }
  /** A file that was opened could not be read as a job. */
  | { readonly event: 'file-trouble'; readonly file: string; readonly trouble: Trouble }
  /** The person chose a command of the window's menu. */
  | { readonly event: 'menu'; readonly command: MenuCommand };

export type MenuCommand = 'new' | 'open' | 'save' | 'save-as' | 'undo' | 'redo' | 'find' | 'handover';

/** The page's end of the channel; each host gives the page one. */
export interface HostChannel {
  call<M extends HostMethod>(method: M, ask: HostAsk<M>): Promise<HostAnswer<HostValue<M>>>;
  /** Listens until the returned function is called. */
  listen(onEvent: (event: HostEvent) => void): () => void;
}
