import type { NextFunction, Request, Response } from 'express';
import type { FieldIssue } from '@kerfyard/common/errors';
import { AppError } from './app-error.ts';

export const JSON_LIMIT_BYTES = 1_048_576;
const MAX_DEPTH = 32;
const FORBIDDEN_KEYS = new Set(['__proto__', 'constructor', 'prototype']);

/** Refuses bodies that nest too deep or name an object's prototype, before anything walks them by recursion. */
export function limitBody(request: Request, _response: Response, next: NextFunction): void {
  const body: unknown = request.body;
  if (typeof body !== 'object' || body === null) {
    next();
    return;
  }
  next(findFault(body));
}

interface Place {
  value: object;
  path: string[];
}

function findFault(body: object): AppError | undefined {
  const places: Place[] = [{ value: body, path: [] }];
  const fields: FieldIssue[] = [];
  for (let place = places.pop(); place !== undefined; place = places.pop()) {
    if (place.path.length > MAX_DEPTH) return new AppError('unreadable_body');
    for (const [key, value] of Object.entries(place.value)) {
      const path = [...place.path, key];
      if (FORBIDDEN_KEYS.has(key)) fields.push({ path: path.join('.'), message: 'Not a field here' });
      else if (typeof value === 'object' && value !== null) places.push({ value, path });
    }
  }
  return fields.length === 0 ? undefined : new AppError('invalid_input', { fields: fields.slice(0, 50) });
}
