/** Who is let in: each request is judged by its head alone, before a byte of its body is read. */
import type { IncomingHttpHeaders } from 'node:http';
import { largestTextLength } from '../../core/api.ts';
import { opens } from './key.ts';

/** A job of the largest length, with room for what JSON adds to it: a quarter more covers the escapes of an indented job. */
export const largestBodyBytes = Math.floor(largestTextLength * 1.25);

export interface RequestHead {
  readonly method: string;
  /** The target as sent, with its query. */
  readonly target: string;
  readonly headers: IncomingHttpHeaders;
  /** How many `Host` headers came; Node keeps only the first. */
  readonly hosts: number;
}

export interface House {
  /** `127.0.0.1:PORT`. */
  readonly address: string;
  readonly key: string;
}

export interface Refused {
  readonly kind: 'refused';
  readonly status: 400 | 401 | 403 | 404 | 405 | 413 | 415 | 421;
  readonly why: string;
  /** With 405: what may be asked. */
  readonly allow?: string;
}

export type Admission =
  | { readonly kind: 'page'; readonly path: string }
  | { readonly kind: 'call'; readonly name: string; readonly window: string }
  | { readonly kind: 'events'; readonly window: string }
  | Refused;

/** Methods of the contract look like this; nothing that an object of JavaScript has of its own does. */
const callPath = /^\/call\/([a-z]+\.[a-zA-Z]+)$/;
const windowName = /^[A-Za-z0-9_-]{1,64}$/;
const jsonType = /^application\/json(?:\s*;\s*charset=utf-8)?$/i;

export function admit(head: RequestHead, house: House): Admission {
  const { headers, target } = head;
  // A name that leads here by a trick of the name server still stands in the header.
  if (head.hosts !== 1 || headers.host !== house.address) return refused(421, `This host is ${house.address} only.`);
  const own = `http://${house.address}`;
  if (headers.origin !== undefined && headers.origin !== own) return refused(403, 'Asked from another page.');
  const path = target.split('?', 1)[0] ?? '';
  if (path.startsWith('/call/')) return admitCall(head, path, house, own);
  if (path === '/events') return admitEvents(head, house);
  if (head.method !== 'GET' && head.method !== 'HEAD') return notAllowed('GET, HEAD');
  return { kind: 'page', path };
}

function admitCall(head: RequestHead, path: string, house: House, own: string): Admission {
  const { headers } = head;
  if (head.method !== 'POST') return notAllowed('POST');
  if (headers.origin !== own) return refused(403, 'Calls come from the page of this host.');
  if (!opens(headers.authorization, house.key)) return noKey;
  const name = callPath.exec(path)?.[1];
  if (name === undefined) return refused(404, 'There is no such call.');
  const window = windowOf(headers);
  if (window === undefined) return noWindow;
  if (!jsonType.test(headers['content-type'] ?? '') || headers['content-encoding'] !== undefined) {
    return refused(415, 'A call is plain JSON.');
  }
  if (Number(headers['content-length'] ?? 0) > largestBodyBytes) return tooLarge;
  return { kind: 'call', name, window };
}

function admitEvents(head: RequestHead, house: House): Admission {
  if (head.method !== 'GET') return notAllowed('GET');
  if (!opens(head.headers.authorization, house.key)) return noKey;
  const window = windowOf(head.headers);
  return window === undefined ? noWindow : { kind: 'events', window };
}

function windowOf(headers: IncomingHttpHeaders): string | undefined {
  const name = headers['x-ohmwright-window'];
  return typeof name === 'string' && windowName.test(name) ? name : undefined;
}

function refused(status: Refused['status'], why: string): Refused {
  return { kind: 'refused', status, why };
}

function notAllowed(allow: string): Refused {
  return { kind: 'refused', status: 405, why: `This path takes ${allow}.`, allow };
}

const noKey = refused(
  401,
  'The key is missing or is not the one of this start. Open the address that the program printed.',
);
const noWindow = refused(400, 'The page gave itself no name, or not one of letters, digits, - and _.');
export const tooLarge = refused(413, `A call may have ${String(largestBodyBytes)} bytes.`);
