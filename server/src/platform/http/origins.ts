import type { IncomingHttpHeaders } from 'node:http';
import type { Config } from '../config/config.ts';

const LOOPBACK = ['127.0.0.1', 'localhost'];

/** The origins the app is served from. On a loopback address both of its names, outside production. */
export function allowedOrigins(config: Config): ReadonlySet<string> {
  const url = new URL(config.appUrl);
  const origins = new Set([url.origin]);
  if (config.mode !== 'production' && LOOPBACK.includes(url.hostname)) {
    for (const name of LOOPBACK) origins.add(new URL(`${url.protocol}//${name}:${url.port}`).origin);
  }
  return origins;
}

/** Whether a page of ours sent this: its origin, or, where browsers send none, their word that it is the same. */
export function isFromOurPages(origins: ReadonlySet<string>, headers: IncomingHttpHeaders): boolean {
  return headers.origin === undefined
    ? headers['sec-fetch-site'] === 'same-origin'
    : origins.has(headers.origin);
}
