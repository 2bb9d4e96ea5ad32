import { useSyncExternalStore } from 'react';
import { isApiError } from './api-error.ts';

/**
 * The question "is it still you?", asked over whatever is on the screen before a sensitive act. Requests that met it
 * wait here; the dialog answers them all at once.
 */
export type Proof = 'password' | 'code';

let asked: Proof | null = null;
let waiters: { resolve: () => void; reject: () => void }[] = [];
const listeners = new Set<() => void>();

function changed(): void {
  for (const listener of listeners) listener();
}

/** What an answer asks for before the request may go on; null when it says something else. */
export function proofAskedBy(error: unknown): Proof | null {
  if (isApiError(error, 'confirm_with_password')) return 'password';
  return isApiError(error, 'confirm_with_code') ? 'code' : null;
}

export const confirmGate = {
  /** Ask in place. Rejects when the person turns it down. */
  ask(proof: Proof): Promise<void> {
    return new Promise((resolve, reject) => {
      asked = proof;
      waiters.push({ resolve, reject: () => reject(new Error('not confirmed')) });
      changed();
    });
  },
  /** The dialog's answer: everything that waits goes on, or gives up. */
  answer(isConfirmed: boolean): void {
    const waiting = waiters;
    waiters = [];
    asked = null;
    for (const waiter of waiting) {
      if (isConfirmed) waiter.resolve();
      else waiter.reject();
    }
    changed();
  },
};

/** What is asked for right now, or null. */
export function useProofAsked(): Proof | null {
  return useSyncExternalStore(
    (listener) => {
      listeners.add(listener);
      return () => listeners.delete(listener);
    },
    () => asked,
  );
}
