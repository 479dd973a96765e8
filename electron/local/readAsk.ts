/** The body of a call, read within its limit, becomes what is asked. */
import type { IncomingMessage } from 'node:http';
import { largestBodyBytes, type Refused, tooLarge } from './doorman.ts';

/** What is asked is flat; only own parts and readings have fields of fields. Text of a job is one string, however deep the job. */
const deepest = 64;

const quote = 0x22;
const backslash = 0x5c;
const openBracket = 0x5b;
const closeBracket = 0x5d;
const openBrace = 0x7b;
const closeBrace = 0x7d;

export type AskRead = { readonly kind: 'ask'; readonly ask: unknown } | Refused;

/** Reads the body to its end; a body that turns out too long is given up there and then. */
export async function readAsk(request: IncomingMessage): Promise<AskRead> {
  const pieces: Buffer[] = [];
  let length = 0;
  // A flowing stream, not an iterator: leaving an iterator early destroys the socket, and with it the answer that says why.
  return await new Promise((resolve, reject) => {
    request.on('data', (piece: Buffer) => {
      length += piece.length;
      if (length > largestBodyBytes) {
        pieces.length = 0;
        resolve(tooLarge);
      } else pieces.push(piece);
    });
    request.on('end', () => {
      resolve(askIn(Buffer.concat(pieces)));
    });
    request.on('close', () => {
      if (!request.complete) reject(new Error('the body ended early'));
    });
    request.on('error', reject);
  });
}

function askIn(bytes: Uint8Array): AskRead {
  let text: string;
  try {
    text = new TextDecoder('utf-8', { fatal: true }).decode(bytes);
  } catch {
    return malformed('The body is not UTF-8.');
  }
  if (isDeep(text)) return malformed('The body is nested too deeply.');
  try {
    return { kind: 'ask', ask: JSON.parse(text) };
  } catch {
    return malformed('The body is not JSON.');
  }
}

/** Counts open brackets outside of strings, before the text is parsed: a parsed depth is already a cost. */
function isDeep(text: string): boolean {
  let depth = 0;
  let inString = false;
  for (let index = 0; index < text.length; index += 1) {
    const code = text.charCodeAt(index);
    if (inString) {
      if (code === backslash) index += 1;
      else if (code === quote) inString = false;
    } else if (code === quote) inString = true;
    else if (code === openBracket || code === openBrace) {
      depth += 1;
      if (depth > deepest) return true;
    } else if (code === closeBracket || code === closeBrace) depth -= 1;
  }
  return false;
}

function malformed(why: string): Refused {
  return { kind: 'refused', status: 400, why };
}
