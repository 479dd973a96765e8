/** The local browser host's door: HTTP on the loopback address, for the page of this start and nobody else. */
import { createServer, type IncomingMessage, type Server, type ServerResponse } from 'node:http';
import type { AddressInfo } from 'node:net';
import { Defect } from '../../core/api.ts';
import type { HostAnswer, HostEvent } from '../../core/host.ts';
import type { PageFiles } from '../page/staticFiles.ts';
import { type Admission, admit, type House, type RequestHead } from './doorman.ts';
import { type EventStreams, eventStreams } from './eventStreams.ts';
import { newKey } from './key.ts';
import { type Patience, type Presence, presence } from './presence.ts';
import { readAsk } from './readAsk.ts';
import { answerHeaders, refuse, send, sendPage, troubleAnswer } from './responses.ts';
import { callsUnderWay, type UnderWay } from './underWay.ts';

/** The only address that is ever listened on: it is reached from this machine alone. */
export const loopback = '127.0.0.1';

/** How long the other end may take to send a request. */
export interface Haste {
  readonly headersMs: number;
  readonly requestMs: number;
}

const usualHaste: Haste = { headersMs: 10_000, requestMs: 30_000 };
/** How often requests are looked through for those that take too long. */
const lookThroughMs = 1_000;
/** A browser opens six; this is room for anything odd, and an end to a flood. */
const mostConnections = 1_500;
const mostRequestsPerConnection = 10_000;
const largestHeadBytes = 16 * 1024;
const keepAliveMs = 5_000;
/** Answers that were written get this long to arrive once the host has ended. */
const lastWordMs = 1_000;

export interface LocalServerOptions {
  readonly page: PageFiles;
  /** Answers a call of the page that names itself `window`; never throws. */
  readonly answer: (method: string, ask: unknown, window: string) => Promise<HostAnswer<unknown>>;
  /** Called once, after the last answer. */
  readonly closeStore: () => void;
  /** The loopback address; any other is a `Defect`. */
  readonly address: string;
  /** 0 takes any free one. */
  readonly port: number;
  readonly patience: Patience;
  readonly haste?: Haste;
}

/** Listens, or throws what the system says about the port. */
export async function startServer(options: LocalServerOptions): Promise<LocalServer> {
  if (options.address !== loopback) throw new Defect('the local host listens on the loopback address and on no other');
  const { headersMs, requestMs } = options.haste ?? usualHaste;
  const http = createServer({
    maxHeaderSize: largestHeadBytes,
    headersTimeout: headersMs,
    requestTimeout: requestMs,
    connectionsCheckingInterval: lookThroughMs,
    keepAliveTimeout: keepAliveMs,
  });
  http.maxConnections = mostConnections;
  http.maxRequestsPerSocket = mostRequestsPerConnection;
  await new Promise<void>((resolve, reject) => {
    http.once('error', reject);
    http.listen({ host: options.address, port: options.port, exclusive: true, backlog: mostConnections }, resolve);
  });
  return new LocalServer(http, options);
}

type Call = Extract<Admission, { kind: 'call' }>;

export class LocalServer {
  readonly port: number;
  /** Settles when the host has ended, for whatever reason. */
  readonly ended: Promise<void>;
  private readonly http: Server;
  private readonly options: LocalServerOptions;
  private readonly house: House;
  private readonly streams: EventStreams;
  private readonly calls: UnderWay;
  private readonly presence: Presence;
  private tellEnded: () => void = () => {};
  /** No more calls are taken on. */
  private closing = false;
  private ending: Promise<void> | undefined;

  constructor(http: Server, options: LocalServerOptions) {
    this.http = http;
    this.options = options;
    this.port = (http.address() as AddressInfo).port;
    this.house = { address: `${loopback}:${String(this.port)}`, key: newKey() };
    this.ended = new Promise((resolve) => {
      this.tellEnded = resolve;
    });
    const noticed = (): void => {
      this.presence.noticed({ pages: this.streams.open, calls: this.calls.count });
    };
    this.streams = eventStreams(noticed);
    this.calls = callsUnderWay(noticed);
    this.presence = presence(options.patience, () => void this.end());
    http.on('request', (request: IncomingMessage, response: ServerResponse) => {
      this.take(request, response);
    });
    http.on('checkContinue', (request: IncomingMessage, response: ServerResponse) => {
      if (admit(headOf(request), this.house).kind === 'call') response.writeContinue();
      this.take(request, response);
    });
  }

  /** Address of the page, with the key behind the `#`, where no request carries it. */
  get url(): string {
    return `http://${this.house.address}/#key=${this.house.key}`;
  }

  tell(event: HostEvent): void {
    this.streams.tell(event);
  }

  /** Ends the host: calls under way are finished, the store is closed, the port is freed. Asked again, the same end. */
  async end(): Promise<void> {
    this.ending ??= this.finish();
    await this.ending;
  }

  private async finish(): Promise<void> {
    this.closing = true;
    this.presence.stop();
    this.http.close();
    await this.calls.atMost(0);
    this.options.closeStore();
    this.streams.close();
    this.http.closeIdleConnections();
    setTimeout(() => {
      this.http.closeAllConnections();
    }, lastWordMs).unref();
    this.tellEnded();
  }

  private take(request: IncomingMessage, response: ServerResponse): void {
    const admission = admit(headOf(request), this.house);
    if (admission.kind === 'refused') refuse(response, admission);
    else if (admission.kind === 'events') this.streams.add(response, answerHeaders);
    else if (admission.kind === 'page') void sendPage(this.options.page, admission.path, response, request);
    else {
      const done = this.calls.begin();
      this.answerCall(admission, request, response)
        .catch(() => {
          response.destroy(); // the asker has gone in the middle of its own call
        })
        .finally(done);
    }
  }

  private async answerCall({ name, window }: Call, request: IncomingMessage, response: ServerResponse): Promise<void> {
    const read = await readAsk(request);
    if (read.kind === 'refused') refuse(response, read);
    else if (this.closing) send(response, 503, troubleAnswer('no-host', 'The program is ending.'));
    else if (name === 'host.end') await this.answerEnd(read.ask, window, response);
    else send(response, 200, await this.options.answer(name, read.ask, window));
  }

  /** The end that a page asks for: what others have asked comes first, and its own answer still gets through. */
  private async answerEnd(ask: unknown, window: string, response: ServerResponse): Promise<void> {
    this.closing = true;
    await this.calls.atMost(1);
    const answer = await this.options.answer('host.end', ask, window);
    send(response, 200, answer);
    this.closing = answer.ok;
    if (answer.ok) void this.end();
  }
}

function headOf(request: IncomingMessage): RequestHead {
  const names = request.rawHeaders.filter((_, index) => index % 2 === 0);
  return {
    method: request.method ?? '',
    target: request.url ?? '',
    headers: request.headers,
    hosts: names.filter((name) => name.toLowerCase() === 'host').length,
  };
}
