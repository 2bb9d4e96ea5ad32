import { Injectable } from '@nestjs/common';
import type { FundingView, MoneyLineView, ReleaseView } from '@kerfyard/common/payments';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { FUNDINGS_OF } from './fundings.queries.ts';
import { presentFunding, type FundingRow } from './funding-views.ts';
import {
  LINES_UNDER_WAY,
  MONEY_LINES,
  PAID_FOR_LINES,
  RELEASED_LINES,
  SET_ASIDE_LINES,
} from './money-reader.queries.ts';
import { RELEASES_OF } from './releases.queries.ts';
import { presentRelease, type ReleaseRow } from './release-views.ts';

interface MoneyLineRow {
  id: string;
  contract_cents: string;
  held_cents: string;
  retainage_cents: string;
  released_cents: string;
}

/** What other features may know of money; always read from the ledger, never kept beside it. */
@Injectable()
export class MoneyReader {
  constructor(private readonly uow: UnitOfWork) {}

  /** The money line of each subcontract, in one query. */
  async moneyLine(subcontractIds: string[]): Promise<Map<string, MoneyLineView>> {
    const rows = await this.uow.rows<MoneyLineRow>(null, MONEY_LINES, [subcontractIds]);
    return new Map(rows.map((row) => [row.id, presentMoneyLine(row)]));
  }

  async fundings(subcontractId: string, viewer: 'gc' | 'crew'): Promise<FundingView[]> {
    const rows = await this.uow.rows<FundingRow>(null, FUNDINGS_OF, [[subcontractId]]);
    return rows.map((row) => presentFunding(row, row.sov_line_ids ?? [], viewer));
  }

  async releases(subcontractId: string): Promise<ReleaseView[]> {
    const rows = await this.uow.rows<ReleaseRow>(null, RELEASES_OF, [[subcontractId]]);
    return rows.map(presentRelease);
  }

  /** Lines that hold money now: only such a line's visit may start. */
  async setAsideLineIds(subcontractId: string, tx: Tx | null = null): Promise<Set<string>> {
    return this.lineIds(tx, SET_ASIDE_LINES, subcontractId);
  }

  async underWayLineIds(subcontractId: string): Promise<Set<string>> {
    return this.lineIds(null, LINES_UNDER_WAY, subcontractId);
  }

  async releasedLineIds(subcontractId: string): Promise<Set<string>> {
    return this.lineIds(null, RELEASED_LINES, subcontractId);
  }

  /** Lines of many subcontracts that hold money now or have had it released, in one query. */
  async paidForLineIds(subcontractIds: readonly string[]): Promise<Set<string>> {
    const rows = await this.uow.rows<{ sov_line_id: string }>(null, PAID_FOR_LINES, [subcontractIds]);
    return new Set(rows.map((row) => row.sov_line_id));
  }

  private async lineIds(tx: Tx | null, sql: string, subcontractId: string): Promise<Set<string>> {
    const rows = await this.uow.rows<{ sov_line_id: string }>(tx, sql, [subcontractId]);
    return new Set(rows.map((row) => row.sov_line_id));
  }
}

/** All that was ever set aside is what is held still, kept as retainage or released since. */
function presentMoneyLine(row: MoneyLineRow): MoneyLineView {
  const retainageCents = Number(row.retainage_cents);
  const releasedCents = Number(row.released_cents);
  return {
    contractCents: Number(row.contract_cents),
    setAsideCents: Number(row.held_cents) + retainageCents + releasedCents,
    releasedCents,
    retainageCents,
    objectedCents: 0,
  };
}
