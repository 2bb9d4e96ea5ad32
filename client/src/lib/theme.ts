import { useSyncExternalStore } from 'react';
import { readStored, writeStored } from './storage.ts';

export const themeChoices = ['system', 'light', 'dark'] as const;
export type ThemeChoice = (typeof themeChoices)[number];

// public/theme.js reads the same key before the first paint.
const KEY = 'kerfyard.theme';
const listeners = new Set<() => void>();
const systemDark = () => window.matchMedia('(prefers-color-scheme: dark)');

function readChoice(): ThemeChoice {
  const stored = readStored('localStorage', KEY);
  return themeChoices.find((choice) => choice === stored) ?? 'system';
}

function apply(): void {
  const choice = readChoice();
  const dark = choice === 'dark' || (choice === 'system' && systemDark().matches);
  document.documentElement.classList.toggle('dark', dark);
  document.documentElement.classList.toggle('light', !dark);
}

function subscribe(listener: () => void): () => void {
  listeners.add(listener);
  return () => listeners.delete(listener);
}

/** Follows the system while the choice is "system"; called once at start. */
export function watchSystemTheme(): void {
  systemDark().addEventListener('change', apply);
}

/** The chosen appearance and a way to change it. */
export function useTheme(): [ThemeChoice, (choice: ThemeChoice) => void] {
  const choice = useSyncExternalStore(subscribe, readChoice);
  const choose = (next: ThemeChoice) => {
    writeStored('localStorage', KEY, next === 'system' ? null : next);
    apply();
    for (const listener of listeners) listener();
  };
  return [choice, choose];
}
