import i18next, { type BackendModule, type PostProcessorModule, type ReadCallback } from 'i18next';
import { initReactI18next } from 'react-i18next';
import shell from '../locales/en/shell.json';
import { readStored, writeStored } from './storage.ts';

/**
 * Words live in `locales/<language>/<namespace>.json`, one namespace a feature. `shell` comes with the page; the others
 * load with the route that names them (`words` in its routes file). A word missing in `es` falls back to English.
 */
type Words = Record<string, unknown>;
const catalogues = import.meta.glob<Words>(['../locales/*/*.json', '!../locales/en/shell.json'], {
  import: 'default',
});

const backend: BackendModule = {
  type: 'backend',
  init: () => undefined,
  read(language: string, namespace: string, callback: ReadCallback) {
    const load = catalogues[`../locales/${language}/${namespace}.json`];
    if (load === undefined) return callback(null, {});
    load().then(
      (words) => callback(null, words),
      (error: unknown) => callback(error instanceof Error ? error : new Error(String(error)), null),
    );
  },
};

const accented: Record<string, string> = {
  a: 'á',
  c: 'ç',
  e: 'é',
  i: 'í',
  n: 'ñ',
  o: 'ö',
  s: 'š',
  u: 'ü',
  y: 'ÿ',
  A: 'Â',
  E: 'Ê',
  I: 'Î',
  O: 'Ô',
  S: 'Š',
  U: 'Û',
};

/** Longer and accented: what stays plain on the screen does not come from a catalogue. */
export function pseudo(text: string): string {
  const changed = text.replace(/<[^>]*>|[aceinosuyAEIOSU]/g, (part) => accented[part] ?? part);
  return `[${changed}${'·'.repeat(Math.ceil(text.length * 0.3))}]`;
}

const pseudoWords: PostProcessorModule = {
  type: 'postProcessor',
  name: 'pseudo',
  process: (value: string) => pseudo(value),
};

export const locales = ['en', 'es', 'pseudo'] as const;
export type Locale = (typeof locales)[number];
const KEY = 'kerfyard.locale';

/**
 * `?locale=` first, then what was chosen before, then English. The browser's language decides nothing yet: only the
 * field screens are in Spanish, and a page in two languages is for people who asked for it.
 */
export function chosenLocale(): Locale {
  const asked = new URLSearchParams(window.location.search).get('locale');
  const stored = readStored('localStorage', KEY);
  for (const candidate of [asked, stored]) {
    const known = locales.find((locale) => locale === candidate);
    if (known !== undefined) return known;
  }
  return 'en';
}

/** Keep the language for later visits and show the page in it. */
export function changeLocale(locale: Locale): void {
  writeStored('localStorage', KEY, locale);
  // The whole page is said anew: catalogues, document language, formats.
  window.location.reload();
}

/** Starts the catalogues; the page renders after it. */
export async function startWords(locale: Locale = chosenLocale()): Promise<void> {
  const isPseudo = locale === 'pseudo';
  await i18next
    .use(backend)
    .use(pseudoWords)
    .use(initReactI18next)
    .init({
      lng: isPseudo ? 'en' : locale,
      fallbackLng: 'en',
      ns: ['shell'],
      defaultNS: 'shell',
      fallbackNS: 'shell',
      resources: { en: { shell } },
      partialBundledLanguages: true,
      postProcess: isPseudo ? ['pseudo'] : [],
      interpolation: { escapeValue: false },
      returnNull: false,
      saveMissing: import.meta.env.DEV,
      // An unknown word fails the browser tests, which allow no console error.
      missingKeyHandler: (_languages, namespace, key) => console.error(`no words for ${namespace}:${key}`),
      react: { useSuspense: true },
    });
  document.documentElement.lang = isPseudo ? 'en' : locale;
}

/** Loads namespaces ahead of the page that shows them. */
export function loadWords(namespaces: readonly string[]): Promise<void> {
  return i18next.loadNamespaces(namespaces);
}
