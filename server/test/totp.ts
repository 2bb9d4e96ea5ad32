import { setTimeout as sleep } from 'node:timers/promises';
import { stepAt, totpCode } from '../src/platform/auth/totp.ts';

const BASE32 = 'ABCDEFGHIJKLMNOPQRSTUVWXYZ234567';

function fromBase32(text: string): Buffer {
  const bits = [...text].map((letter) => BASE32.indexOf(letter).toString(2).padStart(5, '0')).join('');
  return Buffer.from((bits.match(/.{8}/g) ?? []).map((byte) => Number.parseInt(byte, 2)));
}

/** An authenticator app with one secret in it, that never gives the same code twice. */
export class Authenticator {
  private lastStep = 0;

  constructor(private readonly secret: string) {}

  /** A code not given before: of the step before, now or next, all of which the server takes; else it waits. */
  async next(): Promise<string> {
    for (;;) {
      const now = stepAt(Date.now());
      const step = Math.max(now - 1, this.lastStep + 1);
      if (step <= now + 1) {
        this.lastStep = step;
        return totpCode(fromBase32(this.secret), step);
      }
      await sleep(1_000);
    }
  }
}
