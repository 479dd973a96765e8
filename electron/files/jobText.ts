/** The text of a job file out of its bytes. */
import { type Issue, largestTextLength, type Result } from '../../core/api.ts';

/** A text of this many bytes may still be short enough; one of more is not. */
export const largestBytes = largestTextLength;

export function jobText(bytes: Uint8Array): Result<string, readonly Issue[]> {
  if (bytes.length > largestBytes) return { ok: false, issues: [tooLarge] };
  try {
    return { ok: true, value: new TextDecoder('utf-8', { fatal: true }).decode(bytes) };
  } catch {
    return { ok: false, issues: [notText(bytes)] }; // the decoder's way of saying that the bytes are no UTF-8
  }
}

const tooLarge: Issue = {
  path: '',
  code: 'too-large',
  message: `The text is longer than ${String(largestBytes)} bytes; a job of more is not read.`,
};

function notText(bytes: Uint8Array): Issue {
  const [first, second] = bytes;
  const isUtf16 = (first === 0xff && second === 0xfe) || (first === 0xfe && second === 0xff);
  const hint = isUtf16 ? ' It looks like UTF-16.' : '';
  return { path: '', code: 'not-json', message: `This is not UTF-8 text.${hint} Save the job as UTF-8 and try again.` };
}
