import { randomInt } from 'node:crypto';
import { PLATFORM } from './records.ts';
import type { Fault } from './records.ts';
import type { Work } from './work.ts';

/** Whether a fault is meant for a path: exactly that path, or all below it when it ends in `*`. */
function isMeantFor(fault: Fault, method: string, path: string): boolean {
  if (fault.method !== null && fault.method !== method) return false;
  return fault.path.endsWith('*') ? path.startsWith(fault.path.slice(0, -1)) : path === fault.path;
}

/** Takes the oldest fault ordered for this request, counting it down; null when there is none. */
export function takeFault(work: Work, method: string, path: string): Fault | null {
  const fault = work
    .list('fault', PLATFORM)
    .reverse()
    .find((one) => isMeantFor(one, method, path) && (one.percent >= 100 || randomInt(100) < one.percent));
  if (!fault) return null;
  if (fault.remaining <= 1) work.remove('fault', fault.id);
  else work.edit('fault', fault.id).remaining -= 1;
  return fault;
}
