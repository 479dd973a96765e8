/** Requests as a stranger may write them: nothing is added, completed or put right on the way. */
import { connect } from 'node:net';

export interface RawRequest {
  readonly port: number;
  readonly method?: string;
  readonly target: string;
  readonly headers: readonly (readonly [string, string])[];
  readonly body?: string;
  /** Leaves the head without its end; the body goes on with it. */
  readonly unended?: boolean;
  /** Sends the body in pieces, each after a pause; ends where the other side has closed. */
  readonly slowly?: { readonly pieces: number; readonly pauseMs: number };
}

/** What came back: a status, or `closed` where the other side hung up without a word. */
export type RawOutcome = { readonly status: number; readonly text: string } | { readonly status: 'closed' };

export async function rawRequest(request: RawRequest): Promise<RawOutcome> {
  const { port, method = 'GET', target, headers, body = '', slowly } = request;
  const head = [`${method} ${target} HTTP/1.1`, ...headers.map(([name, value]) => `${name}: ${value}`), ''];
  if (request.unended !== true) head.push('');
  return await new Promise((resolve) => {
    const socket = connect(port, '127.0.0.1');
    const came: Buffer[] = [];
    socket.on('data', (piece) => came.push(piece));
    socket.on('error', () => {}); // a connection that is cut shows as closed
    socket.on('close', () => {
      const text = Buffer.concat(came).toString('latin1');
      const status = /^HTTP\/1\.1 (\d{3})/.exec(text)?.[1];
      resolve(status === undefined ? { status: 'closed' } : { status: Number(status), text });
    });
    socket.write(head.join('\r\n'));
    if (slowly === undefined) socket.write(body);
    else {
      let left = slowly.pieces;
      const timer = setInterval(() => {
        if (left === 0 || socket.destroyed) clearInterval(timer);
        else socket.write(body);
        left -= 1;
      }, slowly.pauseMs);
    }
  });
}

/** Sends a beginning and hangs up at once, without waiting for an answer. */
export async function hangUp(port: number, beginning: string): Promise<void> {
  await new Promise<void>((resolve) => {
    const socket = connect(port, '127.0.0.1', () => {
      socket.write(beginning, () => {
        socket.resetAndDestroy();
      });
    });
    socket.on('error', () => {}); // our own hanging up
    socket.on('close', () => {
      resolve();
    });
  });
}
