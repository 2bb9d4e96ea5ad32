import type { CookieOptions, Request, Response } from 'express';
import type { Config } from '../config/config.ts';

export type CookieKind = 'access' | 'refresh';

/**
 * The cookies' names. `__Host-` makes browsers demand Secure, Path=/ and no Domain; the port keeps apart what runs
 * beside us on one host, since cookies go to every port of it.
 */
export const cookieName = (config: Config, kind: CookieKind): string =>
  `__Host-kerfyard-${config.port}-${kind}`;

const flags: CookieOptions = { secure: true, httpOnly: true, sameSite: 'lax', path: '/' };

export interface SessionTokens {
  access: string;
  refresh: string;
  /** When the refresh token stops working without use. */
  refreshUntil: Date;
}

export function setSessionCookies(config: Config, response: Response, tokens: SessionTokens): void {
  const expires = tokens.refreshUntil;
  response.cookie(cookieName(config, 'access'), tokens.access, { ...flags, expires });
  response.cookie(cookieName(config, 'refresh'), tokens.refresh, { ...flags, expires });
}

export function clearSessionCookies(config: Config, response: Response): void {
  response.clearCookie(cookieName(config, 'access'), flags);
  response.clearCookie(cookieName(config, 'refresh'), flags);
}

/** The cookie's value, or null. A cookie sent twice or as an object form is not ours. */
export function readCookie(
  config: Config,
  request: Pick<Request, 'cookies'>,
  kind: CookieKind,
): string | null {
  const cookies = request.cookies as Record<string, unknown> | undefined;
  const value = cookies?.[cookieName(config, kind)];
  return typeof value === 'string' && value.length <= 2_000 ? value : null;
}
