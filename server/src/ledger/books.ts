import { Injectable } from '@nestjs/common';
import type { BooksView } from '@kerfyard/common/payments';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { BOOK_CHECKS, TRIAL_BALANCE } from './ledger.queries.ts';
import { LedgerSeals } from './seals.ts';

/** A page cannot wait for the whole chain to be computed again; the nightly check and `npm run books` do that. */
const NEWEST_SEALS = 2_000;

/** The books as staff read them: trial balance and every invariant as a query that must find nothing. */
@Injectable()
export class Books {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly seals: LedgerSeals,
  ) {}

  async trialBalance(): Promise<BooksView['trialBalance']> {
    const rows = await this.uow.rows<{ book: string; code: string; kind: string; balance_cents: string }>(
      null,
      TRIAL_BALANCE,
    );
    const books = new Map<string, BooksView['trialBalance'][number]>();
    for (const row of rows) {
      const book = books.get(row.book) ?? { book: row.book, accounts: [], sumCents: 0 };
      const balanceCents = Number(row.balance_cents);
      book.accounts.push({ code: row.code, kind: row.kind, balanceCents });
      book.sumCents += balanceCents;
      books.set(row.book, book);
    }
    return [...books.values()];
  }

  /** @param wholeChain compute every seal again, not only the newest */
  async checks(wholeChain = false): Promise<BooksView['checks']> {
    const checks = await Promise.all(
      Object.entries(BOOK_CHECKS).map(async ([id, check]) => {
        const broken = await this.uow.rows(null, check.sql);
        return { id, name: check.name, failures: broken.length };
      }),
    );
    const broken = await this.seals.verify(wholeChain ? undefined : NEWEST_SEALS);
    return [
      ...checks,
      { id: 'B-I10', name: 'sealed entries stand as they were posted', failures: broken.length },
    ];
  }
}
