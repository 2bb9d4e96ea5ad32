import { BOOK_CHECKS } from '../src/ledger/ledger.queries.ts';
import { sql } from './database.ts';

/** Every rule of the books, by name, with what breaks it: all empty. */
export async function brokenRules(): Promise<string[]> {
  const broken = await Promise.all(
    Object.entries(BOOK_CHECKS).map(async ([id, check]) => ((await sql(check.sql)).length > 0 ? id : null)),
  );
  return broken.filter((id) => id !== null);
}
