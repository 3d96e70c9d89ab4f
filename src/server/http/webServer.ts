import { randomUUID } from 'node:crypto';
import http, { type IncomingMessage, type RequestListener, type ServerResponse } from 'node:http';
import { log } from '../log';

export interface WebServerOptions {
  maxBodyBytes: number;
  /** Whether the X-Forwarded-* headers come from a proxy of our own. */
  trustProxy: boolean;
}

/**
 * The HTTP server around the built application: limits what is read, drops forwarding headers nobody
 * vouches for, gives each request an id, and logs it without query, address or secrets.
 */
export function createWebServer(
  application: RequestListener,
  options: WebServerOptions,
): http.Server {
  const server = http.createServer((request, response) => {
    const id = randomUUID();
    request.headers['x-request-id'] = id;
    response.setHeader('x-request-id', id);
    response.setHeader('x-content-type-options', 'nosniff');
    keepForwardingHonest(request, options.trustProxy);
    logWhenDone(request, response, id);
    response.once('finish', () => {
      cutUnreadBody(request);
    });
    if (limitBody(request, response, options.maxBodyBytes)) application(request, response);
  });
  server.headersTimeout = 15_000;
  server.requestTimeout = 60_000;
  server.keepAliveTimeout = 65_000;
  return server;
}

/**
 * Stops accepting connections, lets requests under way finish for `longestMs`, then cuts what is left.
 */
export async function drain(server: http.Server, longestMs: number): Promise<void> {
  const closed = new Promise<void>((resolve) => server.close(() => resolve()));
  server.on('request', (_request, response: ServerResponse) => {
    response.setHeader('connection', 'close');
  });
  // A kept-alive connection becomes idle only when its last answer is out.
  const sweep = setInterval(() => server.closeIdleConnections(), 100);
  const cut = setTimeout(() => server.closeAllConnections(), longestMs);
  await closed;
  clearInterval(sweep);
  clearTimeout(cut);
}

const FORWARDING = ['for', 'host', 'port', 'proto', 'server', 'by'].map((x) => `x-forwarded-${x}`);

/** Without a trusted proxy these headers are the visitor's own words; with one, its entry is the last. */
function keepForwardingHonest(request: IncomingMessage, trustProxy: boolean): void {
  if (!trustProxy) {
    for (const name of FORWARDING) request.headers[name] = undefined;
    return;
  }
  const chain = request.headers['x-forwarded-for'];
  const last = String(chain ?? '')
    .split(',')
    .at(-1)
    ?.trim();
  if (last) request.headers['x-forwarded-for'] = last;
}

/** False when the request was refused at once; a body that turns out too long is cut off while it comes. */
function limitBody(request: IncomingMessage, response: ServerResponse, maxBytes: number): boolean {
  if (Number(request.headers['content-length'] ?? 0) > maxBytes) {
    request.resume();
    refuse(response, maxBytes);
    return false;
  }
  // Reading the stream here would take it away from the application, so count what the parser puts in.
  const push = request.push.bind(request);
  let size = 0;
  request.push = (chunk: unknown, encoding?: BufferEncoding) => {
    size += chunk instanceof Uint8Array ? chunk.byteLength : 0;
    if (size <= maxBytes) return push(chunk, encoding);
    if (!response.writableEnded) refuse(response, maxBytes);
    return true;
  };
  return true;
}

function refuse(response: ServerResponse, maxBytes: number): void {
  const message = `The request is larger than ${Math.floor(maxBytes / 1e6)} MB, the most that is read here.`;
  const body = JSON.stringify({ error: { code: 'bodyTooLarge', message, fields: [] } });
  if (!response.headersSent) {
    response.writeHead(413, {
      'content-type': 'application/json; charset=utf-8',
      'content-length': Buffer.byteLength(body),
      'cache-control': 'no-store',
    });
  }
  response.end(body);
  // The application may answer to the broken body; that answer has nowhere to go.
  response.writeHead = () => response;
  response.write = () => true;
  response.end = () => response;
}

/** How long a client that has its answer may go on sending. */
const LINGER_MS = 2000;

/**
 * An answer is out and the client is still sending. What comes is thrown away, because a line that is cut at
 * once takes the answer with it; after a while it is cut all the same. An application that waits for the rest
 * of the body is told that it will not come.
 */
function cutUnreadBody(request: IncomingMessage): void {
  if (request.complete) return;
  setTimeout(() => {
    if (!request.complete) request.destroy(new Error('The rest of the body was not wanted.'));
  }, LINGER_MS).unref();
}

function logWhenDone(request: IncomingMessage, response: ServerResponse, requestId: string): void {
  const startedAt = performance.now();
  response.once('close', () => {
    log.info(
      {
        requestId,
        method: request.method,
        path: withoutSecrets(request.url ?? ''),
        status: response.statusCode,
        ms: Math.round(performance.now() - startedAt),
        ...(response.writableFinished ? {} : { cutOff: true }),
      },
      'request',
    );
  });
}

/** Ids and secrets of mail links become ":id"; the query is dropped. */
export function withoutSecrets(url: string): string {
  const path = url.split(/[?#]/, 1)[0] ?? '';
  return path.replace(/[^/.]{16,}/g, ':id');
}
