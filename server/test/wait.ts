import { setTimeout as sleep } from 'node:timers/promises';

/** Until something holds, asked every 50 ms; throws when it does not within the time. */
export async function waitFor(holds: () => boolean | Promise<boolean>, timeoutMs = 5_000): Promise<void> {
  const end = Date.now() + timeoutMs;
  while (!(await holds())) {
    if (Date.now() > end) throw new Error(`still not so after ${timeoutMs} ms: ${holds.toString()}`);
    await sleep(50);
  }
}
