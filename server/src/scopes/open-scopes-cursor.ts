import type { OpenScopesQuery } from '@kerfyard/common/scopes';
import { z } from 'zod';
import { AppError } from '../platform/http/app-error.ts';

type Sort = OpenScopesQuery['sort'];

/** Where a page ended: what its last row was sorted by (an instant in milliseconds, or a measure), and its id. */
export interface OpenScopesKey {
  value: number;
  id: string;
}

const keySchema = z.tuple([z.string(), z.number(), z.uuid()]);

export function writeOpenScopesCursor(sort: Sort, key: OpenScopesKey): string {
  return Buffer.from(JSON.stringify([sort, key.value, key.id])).toString('base64url');
}

/** @throws AppError 422 for a cursor we did not give out, or gave out for another order */
export function readOpenScopesCursor(sort: Sort, cursor: string | undefined): OpenScopesKey | null {
  if (cursor === undefined) return null;
  const parsed = keySchema.safeParse(parseJson(Buffer.from(cursor, 'base64url').toString('utf8')));
  if (!parsed.success || parsed.data[0] !== sort || Math.abs(parsed.data[1]) > 8e15) {
    throw AppError.field('cursor', 'Start again from the first page');
  }
  return { value: parsed.data[1], id: parsed.data[2] };
}

function parseJson(text: string): unknown {
  try {
    return JSON.parse(text);
  } catch {
    return null;
  }
}
