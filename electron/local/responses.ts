/** What goes back over HTTP, always with the headers that keep other pages out. */
import type { IncomingMessage, ServerResponse } from 'node:http';
import type { HostAnswer, Trouble } from '../../core/host.ts';
import { securityHeaders } from '../page/contentPolicy.ts';
import type { PageFiles } from '../page/staticFiles.ts';
import type { Refused } from './doorman.ts';

export const answerHeaders: Readonly<Record<string, string>> = { ...securityHeaders(), 'Cache-Control': 'no-store' };

export async function sendPage(
  page: PageFiles,
  path: string,
  to: ServerResponse,
  asked: IncomingMessage,
): Promise<void> {
  const { status, headers, body } = await page(path);
  to.writeHead(status, { ...headers, 'Content-Length': String(body.byteLength) });
  to.end(asked.method === 'HEAD' ? undefined : body);
}

export function send(to: ServerResponse, status: number, answer: HostAnswer<unknown>): void {
  const body = Buffer.from(JSON.stringify(answer));
  to.writeHead(status, {
    ...answerHeaders,
    'Content-Type': 'application/json; charset=utf-8',
    'Content-Length': String(body.byteLength),
  });
  to.end(body);
}

/** Says why not, and reads nothing more from there. */
export function refuse(to: ServerResponse, { status, why, allow }: Refused): void {
  to.setHeader('Connection', 'close');
  if (allow !== undefined) to.setHeader('Allow', allow);
  if (status === 401) to.setHeader('WWW-Authenticate', 'Bearer');
  send(to, status, troubleAnswer('refused', why));
}

export function troubleAnswer(code: Trouble['code'], message: string): HostAnswer<never> {
  return { ok: false, trouble: { code, message } };
}
