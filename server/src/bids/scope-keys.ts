import {
  createPrivateKey,
  createPublicKey,
  diffieHellman,
  generateKeyPairSync,
  hkdfSync,
  type KeyObject,
} from 'node:crypto';
import { KEY_BYTES, openBytes, sealBytes } from '../platform/crypto/sealing.ts';

/** Both halves of a scope's key pair as DER (SPKI and PKCS #8); the private one leaves memory only wrapped. */
export interface ScopeKeyPair {
  publicKey: Buffer;
  privateKey: Buffer;
}

const INFO = 'kerfyard sealed bid key';
/** An X25519 public key in SPKI DER always has this length (RFC 8410). */
const PUBLIC_KEY_BYTES = 44;

/** A fresh X25519 key pair (RFC 7748). */
export function newScopeKeyPair(): ScopeKeyPair {
  const { publicKey, privateKey } = generateKeyPairSync('x25519');
  return { publicKey: toDer(publicKey), privateKey: privateKey.export({ format: 'der', type: 'pkcs8' }) };
}

/**
 * Encrypt a bid's data key to a scope: a one-time key pair, Diffie-Hellman with the scope's public half, HKDF-SHA256
 * over both public halves, AES-256-GCM. Who has only the public half and this result reads nothing.
 * @param context bound to the result; opening under another one fails
 * @returns the one-time public half, then the sealed key
 */
export function sealToScope(scopePublicKey: Buffer, dataKey: Buffer, context: string): Buffer {
  const recipient = createPublicKey({ key: scopePublicKey, format: 'der', type: 'spki' });
  const oneTime = generateKeyPairSync('x25519');
  const oneTimePublic = toDer(oneTime.publicKey);
  const shared = diffieHellman({ privateKey: oneTime.privateKey, publicKey: recipient });
  const key = keyFor(shared, oneTimePublic, scopePublicKey);
  return Buffer.concat([oneTimePublic, sealBytes(key, dataKey, context)]);
}

/**
 * The reverse of `sealToScope`, with the scope's private half.
 * @throws Error on another key, another context or altered bytes
 */
export function openFromScope(pair: ScopeKeyPair, sealed: Buffer, context: string): Buffer {
  const oneTimePublic = sealed.subarray(0, PUBLIC_KEY_BYTES);
  const shared = diffieHellman({
    privateKey: createPrivateKey({ key: pair.privateKey, format: 'der', type: 'pkcs8' }),
    publicKey: createPublicKey({ key: oneTimePublic, format: 'der', type: 'spki' }),
  });
  const key = keyFor(shared, oneTimePublic, pair.publicKey);
  return openBytes(key, sealed.subarray(PUBLIC_KEY_BYTES), context);
}

function keyFor(shared: Buffer, oneTimePublic: Buffer, scopePublic: Buffer): Buffer {
  const salt = Buffer.concat([oneTimePublic, scopePublic]);
  return Buffer.from(hkdfSync('sha256', shared, salt, INFO, KEY_BYTES));
}

function toDer(key: KeyObject): Buffer {
  return key.export({ format: 'der', type: 'spki' });
}
