import { createHash } from 'node:crypto';
import { invalidRequest, StripeError } from './errors.ts';
import type { FormValue } from './form-encoding.ts';
import type { SavedAnswer } from './records.ts';
import type { Work } from './work.ts';

/** Keys may be pruned after this time; the request then runs again (docs.stripe.com/api/idempotent_requests). */
const KEY_LIFE_SECONDS = 24 * 3600;

function canonical(value: FormValue): unknown {
  if (typeof value === 'string') return value;
  if (Array.isArray(value)) return value.map(canonical);
  return Object.keys(value)
    .sort()
    .map((key) => [key, canonical(value[key]!)]);
}

/** One text for a request's method, path and parameters, whatever their order. */
export function hashRequest(method: string, path: string, params: Record<string, FormValue>): string {
  return createHash('sha256')
    .update(JSON.stringify([method, path, canonical(params)]))
    .digest('hex');
}

/** Keys of one account do not meet those of another. Throws 400 for a key that is too long. */
export function savedAnswerId(owner: string, key: string): string {
  if (key.length > 255) {
    throw invalidRequest('Idempotency keys may be at most 255 characters long.', {
      param: 'Idempotency-Key',
    });
  }
  return `${owner}:${key}`;
}

/**
 * The answer saved under a key, or null when the request is to run. Throws 400 `idempotency_error` when the key was
 * used with other parameters.
 */
export function findSavedAnswer(work: Work, id: string, requestHash: string): SavedAnswer | null {
  const saved = work.get('saved_answer', id);
  if (!saved || saved.createdAt + KEY_LIFE_SECONDS <= work.now()) return null;
  if (saved.requestHash === requestHash) return saved;
  const key = id.slice(id.indexOf(':') + 1);
  throw new StripeError(400, {
    type: 'idempotency_error',
    message: `Keys for idempotent requests can only be used with the same parameters they were first used with. Try using a key other than '${key}' if you meant to execute a different request.`,
  });
}

/** 409 while the first request with this key is still running. */
export function keyInUse(key: string): StripeError {
  return new StripeError(409, {
    type: 'idempotency_error',
    code: 'idempotency_key_in_use',
    message: `There is currently another in-progress request using this Idempotent Key: ${key}. Please try again later.`,
  });
}
