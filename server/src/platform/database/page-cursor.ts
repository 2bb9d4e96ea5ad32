import type { Page } from '@kerfyard/common/api';
import { AppError } from '../http/app-error.ts';

/** Where a page read by key ended: the sort instant and the id of its last row. */
export interface PageKey {
  at: Date;
  id: string;
}

const CURSOR = /^(\d{1,16})\.([0-9a-f]{8}(?:-[0-9a-f]{4}){3}-[0-9a-f]{12})$/;

/** @throws AppError 422 for a cursor we did not give out */
export function readCursor(cursor: string | undefined): PageKey | null {
  if (cursor === undefined) return null;
  const match = CURSOR.exec(Buffer.from(cursor, 'base64url').toString('latin1'));
  if (match?.[1] === undefined || match[2] === undefined) {
    throw AppError.field('cursor', 'Start again from the first page');
  }
  return { at: new Date(Number(match[1])), id: match[2] };
}

/**
 * A page from rows read with one more than the limit: the extra row only says that there is a next page.
 * Columns compared by key have milliseconds (`timestamptz(3)`), as JavaScript has; else rows would be skipped.
 */
export function toPage<Row, Item>(
  rows: readonly Row[],
  limit: number,
  describe: { key: (row: Row) => PageKey; item: (row: Row) => Item },
): Page<Item> {
  const shown = rows.slice(0, limit);
  const last = rows.length > limit ? shown.at(-1) : undefined;
  return {
    items: shown.map(describe.item),
    nextCursor: last === undefined ? null : toCursor(describe.key(last)),
  };
}

function toCursor({ at, id }: PageKey): string {
  return Buffer.from(`${at.getTime()}.${id}`, 'latin1').toString('base64url');
}
