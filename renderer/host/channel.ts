/** Which host the page runs in: the desktop window hands the page a way in, the browser host an address with a key. */
import type { HostChannel } from '../../core/host.ts';
import { httpChannel } from './httpChannel.ts';
import { takeKey } from './key.ts';
import { windowChannel } from './windowChannel.ts';

let opened: HostChannel | undefined;

/** The page's channel; asked again, the same one. `reached` is told when the way to the host is cut, and when it is there again. */
export function openChannel(reached: (isThere: boolean) => void): HostChannel {
  opened ??= window.ohmwright === undefined ? browserChannel(reached) : windowChannel(window.ohmwright);
  return opened;
}

function browserChannel(reached: (isThere: boolean) => void): HostChannel {
  return httpChannel({
    base: location.origin,
    key: takeKey(location, history, sessionStorage),
    window: newName(),
    fetch: window.fetch.bind(window),
    reached,
  });
}

/** A name for this page, new at each load: a copy of a tab is a page of its own. */
function newName(): string {
  const bytes = crypto.getRandomValues(new Uint8Array(9));
  return Array.from(bytes, (byte) => byte.toString(16).padStart(2, '0')).join('');
}
