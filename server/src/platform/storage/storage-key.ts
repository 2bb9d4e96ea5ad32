import { join } from 'node:path';

const SHA256 = /^[0-9a-f]{64}$/;

/**
 * Where the bytes of a hash lie below the storage folder: `ab/cd/<hash>`, so that no folder grows without bound.
 * @throws Error for anything but 64 lower-case hex digits: nothing else ever becomes part of a path
 */
export function storageKey(sha256: string): string {
  if (!SHA256.test(sha256)) throw new Error('not a SHA-256');
  return join(sha256.slice(0, 2), sha256.slice(2, 4), sha256);
}
