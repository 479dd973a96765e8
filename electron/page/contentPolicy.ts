/** What a page of ours may load and who may use it: nothing from outside, no script or style that is not a file of ours. */

/** The place in index.html that gets a fresh nonce at each load. */
export const noncePlace = '__CSP_NONCE__';

/** `nonce` lets the page add styles of its own; there is no other way in, and no `unsafe-*`. */
function contentPolicy(nonce: string | undefined): string {
  const ownStyle = nonce === undefined ? '' : ` 'nonce-${nonce}'`;
  return [
    "default-src 'none'",
    "script-src 'self'",
    `style-src 'self'${ownStyle}`,
    "font-src 'self'",
    "img-src 'self' data: blob:",
    "connect-src 'self'",
    "worker-src 'self'",
    "form-action 'none'",
    "base-uri 'none'",
    "frame-ancestors 'none'",
    "object-src 'none'",
  ].join('; ');
}

/** Headers of every answer, whatever it holds. */
export function securityHeaders(nonce?: string): Readonly<Record<string, string>> {
  return {
    'Content-Security-Policy': contentPolicy(nonce),
    'X-Content-Type-Options': 'nosniff',
    'Referrer-Policy': 'no-referrer',
    'Cross-Origin-Opener-Policy': 'same-origin',
    'Cross-Origin-Resource-Policy': 'same-origin',
  };
}
