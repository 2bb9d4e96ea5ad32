import { Injectable } from '@nestjs/common';
import type { BooksView } from '@kerfyard/common/payments';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { BOOK_CHECKS, TRIAL_BALANCE } from './ledger.queries.ts';

/** The books as staff read them: trial balance and every invariant as a query that must find nothing. */
@Injectable()
export class Books {
  constructor(private readonly uow: UnitOfWork) {}

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

  async checks(): Promise<BooksView['checks']> {
    return Promise.all(
      Object.entries(BOOK_CHECKS).map(async ([id, check]) => {
        const broken = await this.uow.rows(null, check.sql);
        return { id, name: check.name, failures: broken.length };
      }),
    );
  }
}
