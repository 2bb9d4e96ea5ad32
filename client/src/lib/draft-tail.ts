import { readStored, writeStored } from './storage.ts';

/**
 * The tail of a draft: what was typed and has not reached the server yet. It lives in this tab only and is cleared
 * at sign-out, so that a shared device shows nothing to the next person.
 */
const PREFIX = 'kerfyard.draft.';

export function keepTail(key: string, value: unknown): void {
  writeStored('sessionStorage', PREFIX + key, JSON.stringify(value));
}

/** What was kept under this key, or undefined. The caller checks the shape: it may be from an older version. */
export function readTail(key: string): unknown {
  const text = readStored('sessionStorage', PREFIX + key);
  if (text === null) return undefined;
  try {
    return JSON.parse(text) as unknown;
  } catch {
    return undefined;
  }
}

export function dropTail(key: string): void {
  writeStored('sessionStorage', PREFIX + key, null);
}

/** Clears every kept tail; called at sign-out. */
export function dropAllTails(): void {
  try {
    const keys = Object.keys(window.sessionStorage).filter((key) => key.startsWith(PREFIX));
    for (const key of keys) window.sessionStorage.removeItem(key);
  } catch {
    // Closed storage holds no tails.
  }
}
