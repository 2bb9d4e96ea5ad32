import type { IncomingMessage, Server, ServerResponse } from 'node:http';
import type { AddressInfo } from 'node:net';
import type { SafeHtml } from './html.ts';

/** The client sent more than a stand-in is willing to read. */
export class BodyTooLargeError extends Error {}

/** Reads a request body as text. Throws BodyTooLargeError beyond `limitBytes`. */
export async function readBody(request: IncomingMessage, limitBytes = 1_000_000): Promise<string> {
  const chunks: Buffer[] = [];
  let sizeBytes = 0;
  for await (const chunk of request) {
    sizeBytes += (chunk as Buffer).length;
    if (sizeBytes > limitBytes) throw new BodyTooLargeError();
    chunks.push(chunk as Buffer);
  }
  return Buffer.concat(chunks).toString('utf8');
}

/**
 * The address to bind for a host name. Stand-ins are called `localhost` so that they share no cookies with the
 * app at 127.0.0.1, but they bind IPv4: binding the name takes whichever family the resolver lists first.
 */
export function bindAddress(host: string): string {
  return host === 'localhost' ? '127.0.0.1' : host;
}

/** Listens and resolves with the port in use (pass 0 for a free one). Rejects when the port is taken. */
export async function listen(server: Server, port: number, host: string): Promise<number> {
  await new Promise<void>((resolve, reject) => {
    server.once('error', reject);
    server.listen(port, bindAddress(host), () => {
      server.off('error', reject);
      resolve();
    });
  });
  return (server.address() as AddressInfo).port;
}

/** Stops a server at once: idle and busy connections are closed. */
export async function closeServer(server: Server): Promise<void> {
  await new Promise<void>((resolve) => {
    server.close(() => resolve());
    server.closeAllConnections();
  });
}

const PAGE_HEADERS = {
  'Content-Type': 'text/html; charset=utf-8',
  'Cache-Control': 'no-store',
  'X-Content-Type-Options': 'nosniff',
  'Referrer-Policy': 'same-origin',
};

/**
 * Sends a page. The policy allows this server's own style sheet and no script at all.
 * `formTargets` lists origins a form's redirect may lead to: browsers apply form-action to redirects too.
 */
export function sendPage(
  response: ServerResponse,
  page: SafeHtml,
  options: { status?: number; formTargets?: readonly string[] } = {},
): void {
  const formAction = ["'self'", ...(options.formTargets ?? [])].join(' ');
  response.writeHead(options.status ?? 200, {
    ...PAGE_HEADERS,
    'Content-Security-Policy': `default-src 'none'; style-src 'self'; img-src 'self' data:; frame-src 'self'; frame-ancestors 'self'; base-uri 'none'; form-action ${formAction}`,
  });
  response.end(`<!doctype html>\n${page.text}`);
}

/** Whether a browser sends this on behalf of another site: stand-ins take no orders from there. */
export function isFromAnotherSite(request: IncomingMessage): boolean {
  return request.method !== 'GET' && request.headers['sec-fetch-site'] === 'cross-site';
}

/** Sends JSON with a status. */
export function sendJson(response: ServerResponse, status: number, body: unknown): void {
  response.writeHead(status, { 'Content-Type': 'application/json', 'Cache-Control': 'no-store' });
  response.end(JSON.stringify(body, null, 2));
}

/** Sends a style sheet. */
export function sendStyle(response: ServerResponse, css: string): void {
  response.writeHead(200, { 'Content-Type': 'text/css; charset=utf-8', 'Cache-Control': 'no-cache' });
  response.end(css);
}

/** Redirects after a form so that a reload does not send it again. */
export function seeOther(response: ServerResponse, location: string): void {
  response.writeHead(303, { Location: location });
  response.end();
}
