/** Names in a browser's own description of itself, the more telling first: many claim to be several. */
const browsers: readonly [RegExp, string][] = [
  [/\bEdgA?\//, 'Edge'],
  [/\bOPR\//, 'Opera'],
  [/\bFirefox\/|\bFxiOS\//, 'Firefox'],
  [/\bChrom(e|ium)\/|\bHeadlessChrome\/|\bCriOS\//, 'Chrome'],
  [/\bSafari\//, 'Safari'],
];
const systems: readonly [RegExp, string][] = [
  [/\biPhone\b|\biPad\b/, 'iOS'],
  [/\bAndroid\b/, 'Android'],
  [/\bWindows\b/, 'Windows'],
  [/\bMac OS X\b/, 'macOS'],
  [/\bCrOS\b/, 'ChromeOS'],
  [/\bLinux\b/, 'Linux'],
];

/** What a browser and its system are called, as far as the `User-Agent` says; null for what it does not. */
export function deviceOf(userAgent: string): { browser: string | null; system: string | null } {
  const find = (names: readonly [RegExp, string][]) =>
    names.find(([pattern]) => pattern.test(userAgent))?.[1] ?? null;
  return { browser: find(browsers), system: find(systems) };
}
