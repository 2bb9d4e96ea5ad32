import { useSyncExternalStore } from 'react';
import { readStored, writeStored } from './storage.ts';

/**
 * Who is signed in on this page, and the question "sign in again?" asked over whatever is on the screen.
 * Requests that met a 401 wait here; the dialog answers them all at once.
 */
export interface KnownPerson {
  userId: string;
  email: string;
}

// A hint, no secret: the cookies are HttpOnly, so a signed-out first page would otherwise have to ask the server.
const HINT = 'kerfyard.signed-in';

let person: KnownPerson | null = null;
let waiters: { resolve: () => void; reject: () => void }[] = [];
const listeners = new Set<() => void>();

function changed(): void {
  for (const listener of listeners) listener();
}

export const sessionGate = {
  /** Remember who is signed in here; null at sign-out. */
  know(next: KnownPerson | null): void {
    person = next;
    writeStored('localStorage', HINT, next === null ? null : '1');
  },
  known(): KnownPerson | null {
    return person;
  },
  /** Whether this browser was signed in when last seen; only ever used to save a request. */
  hinted(): boolean {
    return readStored('localStorage', HINT) !== null;
  },
  /** Ask to sign in again in place. Rejects when the person turns it down. */
  ask(): Promise<void> {
    return new Promise((resolve, reject) => {
      waiters.push({ resolve, reject: () => reject(new Error('not signed in again')) });
      changed();
    });
  },
  /** The dialog's answer: everything that waits goes on, or gives up. */
  answer(signedIn: boolean): void {
    const waiting = waiters;
    waiters = [];
    for (const waiter of waiting) {
      if (signedIn) waiter.resolve();
      else waiter.reject();
    }
    changed();
  },
};

/** True while at least one request waits for the person to sign in again. */
export function useSessionAsked(): boolean {
  return useSyncExternalStore(
    (listener) => {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
    () => waiters.length > 0,
  );
}
