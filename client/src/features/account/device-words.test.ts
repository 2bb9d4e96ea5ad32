import { expect, it } from 'vitest';
import { deviceOf } from './device-words.ts';

// Forms of browsers' own descriptions, shortened, from memory.
it.each([
  [
    'Mozilla/5.0 (Windows NT 10.0; Win64; x64) AppleWebKit/537.36 Chrome/150.0 Safari/537.36',
    'Chrome',
    'Windows',
  ],
  [
    'Mozilla/5.0 (Windows NT 10.0) AppleWebKit/537.36 Chrome/150.0 Safari/537.36 Edg/150.0',
    'Edge',
    'Windows',
  ],
  [
    'Mozilla/5.0 (iPhone; CPU iPhone OS 18_0 like Mac OS X) Version/18.0 Mobile Safari/604.1',
    'Safari',
    'iOS',
  ],
  [
    'Mozilla/5.0 (Linux; Android 14) AppleWebKit/537.36 Chrome/150.0 Mobile Safari/537.36',
    'Chrome',
    'Android',
  ],
  ['Mozilla/5.0 (X11; Linux x86_64; rv:140.0) Gecko/20100101 Firefox/140.0', 'Firefox', 'Linux'],
  ['curl/8', null, null],
  ['', null, null],
])('%s', (userAgent, browser, system) => {
  expect(deviceOf(userAgent)).toEqual({ browser, system });
});
