/** Where the page lives inside the window: a scheme of our own, answered from the folder of the built page, never from a network. */

export const pageScheme = 'app';
const pageHost = 'ohmwright';
export const pageAddress = `${pageScheme}://${pageHost}/`;

/** Is this an address of our own page or of its files? Compared as a parsed address: `app://ohmwright@elsewhere/` is not ours. */
export function isOurAddress(address: string): boolean {
  const parsed = parsedAddress(address);
  return parsed !== undefined && isOurs(parsed);
}

/** The page itself, as a reload asks for it; its files are no pages. */
export function isOurPage(address: string): boolean {
  const parsed = parsedAddress(address);
  return parsed !== undefined && isOurs(parsed) && (parsed.pathname === '/' || parsed.pathname === '/index.html');
}

/** Something that our page made in memory, such as a list to be saved; it is read without any network. */
export function isOurBlob(address: string): boolean {
  return address.startsWith(`blob:${pageAddress}`);
}

/** The path of one of our own addresses, still percent-encoded, as the handler of files wants it. */
export function pathOf(address: string): string {
  return parsedAddress(address)?.pathname ?? '/';
}

function isOurs(parsed: URL): boolean {
  const { protocol, host, username, password } = parsed;
  return protocol === `${pageScheme}:` && host === pageHost && username === '' && password === '';
}

function parsedAddress(address: string): URL | undefined {
  try {
    return new URL(address);
  } catch {
    return undefined;
  }
}
