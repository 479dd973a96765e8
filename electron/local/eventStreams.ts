/** The open pages: each holds one answer open, on which the host tells it things, a line of JSON each. */
import type { ServerResponse } from 'node:http';
import type { HostEvent } from '../../core/host.ts';

/** An empty line this often keeps the way open and shows a page that its host is alive. */
const heartbeatMs = 10_000;
/** A page that has stopped reading is let go before it fills our memory; it comes back by itself. */
const mostUnreadBytes = 4 * 1024 * 1024;

export interface EventStreams {
  /** How many pages listen. */
  readonly open: number;
  add(response: ServerResponse, headers: Readonly<Record<string, string>>): void;
  /** Tells all pages; what must not be lost waits for the first page where none is there. */
  tell(event: HostEvent): void;
  /** Ends all streams. */
  close(): void;
}

/** `changed` is called whenever a page has come or gone. */
export function eventStreams(changed: () => void): EventStreams {
  const streams = new Set<ServerResponse>();
  const waiting: HostEvent[] = [];
  const beat = setInterval(() => {
    for (const stream of streams) write(stream, '\n');
  }, heartbeatMs);
  beat.unref();

  return {
    get open() {
      return streams.size;
    },
    add(response, headers) {
      response.writeHead(200, { ...headers, 'Content-Type': 'application/x-ndjson; charset=utf-8' });
      streams.add(response);
      response.on('close', () => {
        streams.delete(response);
        changed();
      });
      // The first line is sent at once, so that the page knows that it is listening before it asks for anything.
      write(response, `\n${waiting.splice(0).map(line).join('')}`);
      changed();
    },
    tell(event) {
      if (streams.size === 0) {
        if (event.event !== 'job-changed') waiting.push(event);
        return;
      }
      for (const stream of streams) write(stream, line(event));
    },
    close() {
      clearInterval(beat);
      for (const stream of streams) stream.end();
    },
  };
}

function line(event: HostEvent): string {
  return `${JSON.stringify(event)}\n`;
}

function write(stream: ServerResponse, text: string): void {
  if (stream.writableLength > mostUnreadBytes) stream.destroy();
  else if (!stream.writableEnded) stream.write(text);
}
