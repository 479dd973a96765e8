/** The page's own scheme: the files of the built page, with the same policy and nonce as in every other host. */
import type { Protocol } from 'electron';
import type { PageFiles } from '../page/staticFiles.ts';
import { isOurAddress, pageScheme, pathOf } from './address.ts';

/** Must run before Electron is ready. A page of this scheme counts as a secure one with an origin, and has no special rights. */
export function registerPageScheme(protocol: Protocol): void {
  const privileges = { standard: true, secure: true, supportFetchAPI: true, codeCache: true };
  protocol.registerSchemesAsPrivileged([{ scheme: pageScheme, privileges }]);
}

/** Answers our own addresses from `files`, and all others of the scheme with 404. */
export function servePage(protocol: Protocol, files: PageFiles): void {
  protocol.handle(pageScheme, async (request) => {
    if (request.method !== 'GET') return new Response(null, { status: 405, headers: { Allow: 'GET' } });
    if (!isOurAddress(request.url)) return new Response(null, { status: 404 });
    const { status, headers, body } = await files(pathOf(request.url));
    return new Response(new Uint8Array(body), { status, headers });
  });
}
