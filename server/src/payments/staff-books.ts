import { Injectable } from '@nestjs/common';
import type { BooksView, OperationStatus } from '@kerfyard/common/payments';
import { Books } from '../ledger/books.ts';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { RECENT_INCIDENTS } from './incidents.queries.ts';
import { RECENT_OPERATIONS } from './operations.queries.ts';

/** What staff read of the money: books, checks, operations, incidents. No sealed amount is anywhere near. */
@Injectable()
export class StaffBooks {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly books: Books,
  ) {}

  async read(): Promise<BooksView> {
    const [trialBalance, checks, operations, incidents] = await Promise.all([
      this.books.trialBalance(),
      this.books.checks(),
      this.uow.rows<OperationRow>(null, RECENT_OPERATIONS),
      this.uow.rows<IncidentRow>(null, RECENT_INCIDENTS),
    ]);
    return {
      trialBalance,
      checks,
      operations: operations.map(({ created_at, ...row }) => ({
        ...row,
        createdAt: created_at.toISOString(),
      })),
      incidents: incidents.map(({ opened_at, closed_at, subject, ...row }) => ({
        id: row.id,
        kind: row.kind,
        detail: `${subject}: ${row.detail}`,
        openedAt: opened_at.toISOString(),
        closedAt: closed_at?.toISOString() ?? null,
      })),
    };
  }
}

interface OperationRow {
  id: string;
  kind: string;
  status: OperationStatus;
  attempts: number;
  created_at: Date;
  error: string | null;
}

interface IncidentRow {
  id: string;
  kind: string;
  subject: string;
  detail: string;
  opened_at: Date;
  closed_at: Date | null;
}
