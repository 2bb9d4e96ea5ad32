import type { Config } from '../config/config.ts';

const LOOPBACK = ['127.0.0.1', 'localhost'];

/** The origins the app is served from. On a loopback address both of its names, outside production. */
export function allowedOrigins(config: Config): ReadonlySet<string> {
  const url = new URL(config.appUrl);
  const origins = new Set([url.origin]);
  if (config.mode !== 'production' && LOOPBACK.includes(url.hostname)) {
    for (const name of LOOPBACK) origins.add(`${url.protocol}//${name}:${url.port}`);
  }
  return origins;
}
