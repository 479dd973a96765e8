/** The key that opens a running host: new at each start, known to the page through its address only. */
import { createHash, randomBytes, timingSafeEqual } from 'node:crypto';

/** 32 random bytes, written with the letters that an address may hold. */
export function newKey(): string {
  return randomBytes(32).toString('base64url');
}

/** Whether an `Authorization` header holds the key; takes equally long for every wrong one. */
export function opens(authorization: string | undefined, key: string): boolean {
  const given = /^Bearer ([A-Za-z0-9_-]{1,128})$/.exec(authorization ?? '')?.[1] ?? '';
  return timingSafeEqual(digest(given), digest(key));
}

/** Digests have one length, which the comparison asks for. */
function digest(text: string): Buffer {
  return createHash('sha256').update(text).digest();
}
