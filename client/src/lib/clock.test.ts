import { afterEach, expect, it } from 'vitest';
import { deviceMs, nowMs, syncClock } from './clock.ts';

const header = (ms: number) => new Date(ms).toUTCString();
afterEach(() => syncClock(header(deviceMs())));

it("follows the server's clock when this device's is wrong, and leaves small differences alone", () => {
  const hourAhead = deviceMs() + 3_600_000;
  syncClock(header(hourAhead));
  expect(Math.abs(nowMs() - hourAhead)).toBeLessThan(2000);
  syncClock('no date');
  syncClock(null);
  expect(Math.abs(nowMs() - hourAhead)).toBeLessThan(2000);
  syncClock(header(deviceMs() - 1000));
  expect(Math.abs(nowMs() - deviceMs())).toBeLessThan(100);
});
