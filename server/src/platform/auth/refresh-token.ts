import { createHash, randomBytes, timingSafeEqual } from 'node:crypto';
import { deriveKey, openBytes, sealBytes } from '../crypto/sealing.ts';

const FORM = /^([0-9a-f-]{36})\.([A-Za-z0-9_-]{43})$/;

export interface RefreshToken {
  sessionId: string;
  /** What the browser holds: the session's id and 256 random bits. */
  text: string;
  /** What the database holds. */
  hash: Buffer;
}

export function newRefreshToken(sessionId: string): RefreshToken {
  return toToken(sessionId, `${sessionId}.${randomBytes(32).toString('base64url')}`);
}

/** The token a cookie carries, or null when it cannot be one of ours. */
export function parseRefreshToken(text: string | null): RefreshToken | null {
  const [, sessionId] = FORM.exec(text ?? '') ?? [];
  return sessionId === undefined || text === null ? null : toToken(sessionId, text);
}

export function hasHash(token: RefreshToken, hash: Buffer | null): boolean {
  return hash !== null && hash.length === token.hash.length && timingSafeEqual(hash, token.hash);
}

/** The successor under a key that only the holder of the token it follows can make. */
export function sealSuccessor(token: RefreshToken, successor: RefreshToken): Buffer {
  return sealBytes(successorKey(token), Buffer.from(successor.text), token.sessionId);
}

export function openSuccessor(token: RefreshToken, sealed: Buffer): RefreshToken {
  const text = openBytes(successorKey(token), sealed, token.sessionId).toString();
  return toToken(token.sessionId, text);
}

const successorKey = (token: RefreshToken) => deriveKey(token.text, 'kerfyard refresh successor');

function toToken(sessionId: string, text: string): RefreshToken {
  return { sessionId, text, hash: createHash('sha256').update(text).digest() };
}
