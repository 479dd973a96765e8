/** The key to the browser host, from the address to a place where neither the history nor a look over the shoulder finds it. */

const kept = 'ohmwright-key';

/** Takes the key out of the address where there is one, else the one kept in this tab; empty where there is none. */
export function takeKey(
  place: Pick<Location, 'hash' | 'pathname'>,
  past: Pick<History, 'replaceState'>,
  tab: Pick<Storage, 'getItem' | 'setItem'>,
): string {
  const given = /^#key=([A-Za-z0-9_-]+)$/.exec(place.hash)?.[1];
  if (given === undefined) return tab.getItem(kept) ?? '';
  tab.setItem(kept, given);
  past.replaceState(null, '', place.pathname);
  return given;
}
