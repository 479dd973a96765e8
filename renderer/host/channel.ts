/** Which host the page runs in: the desktop window hands the page a way in, the browser host an address with a key. */
import type { HostChannel } from '../../core/host.ts';
import { httpChannel } from './httpChannel.ts';
import { takeKey } from './key.ts';
import { windowChannel } from './windowChannel.ts';

let opened: HostChannel | undefined;

/** The page's channel; asked again, the same one. */
export function openChannel(): HostChannel {
  opened ??= window.ohmwright === undefined ? browserChannel() : windowChannel(window.ohmwright);
  return opened;
}

function browserChannel(): HostChannel {
  return httpChannel({
    base: location.origin,
    key: takeKey(location, history, sessionStorage),
    window: newName(),
    fetch: window.fetch.bind(window),
  });
}

/** A name for this page, new at each load: a copy of a tab is a page of its own. */
function newName(): string {
  const bytes = crypto.getRandomValues(new Uint8Array(9));
  return Array.from(bytes, (byte) => byte.toString(16).padStart(2, '0')).join('');
}
