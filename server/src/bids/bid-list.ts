import { Injectable } from '@nestjs/common';
import type { Page, PageQuery } from '@kerfyard/common/api';
import type { BidListItem, OwnBidView } from '@kerfyard/common/bids';
import type { Actor } from '@kerfyard/common/people';
import type { BiddingMode, ScopeStatus } from '@kerfyard/common/scopes';
import { toInstant, toNumber } from '../platform/database/codecs.ts';
import { readCursor, toPage } from '../platform/database/page-cursor.ts';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { requireCompany } from '../scopes/require-company.ts';
import { scopeNumber } from '../scopes/scope-number.ts';
import { readOwnBid } from './bid-envelope.ts';
import { CompanyKeys } from './company-keys.ts';
import { OWN_BIDS } from './own-bid.queries.ts';
import { toOutcome, type OutcomeColumns } from './own-bid.ts';
import { OwnMarks, type OwnMark } from './own-marks.ts';

interface BidRow extends OutcomeColumns {
  id: string;
  scope_id: string;
  status: OwnBidView['status'];
  submitted_at: Date;
  total_cents: string | null;
  ciphertext: Buffer | null;
  key_for_bidder: Buffer | null;
  number: string;
  title: string;
  scope_status: ScopeStatus;
  mode: BiddingMode;
  due_at: Date;
  time_zone: string;
  gc_id: string;
  gc_name: string;
  subcontract_id: string | null;
}

/** A crew's own bids, the latest first; those still sealed are read with the company's key. */
@Injectable()
export class BidList {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly keys: CompanyKeys,
    private readonly marks: OwnMarks,
  ) {}

  async own(actor: Actor, query: PageQuery): Promise<Page<BidListItem>> {
    const company = requireCompany(actor, 'cutting_contractor');
    const after = readCursor(query.cursor);
    const [key, rows] = await Promise.all([
      this.keys.of(null, company.id),
      this.uow.rows<BidRow>(null, OWN_BIDS, [
        company.id,
        after?.at ?? null,
        after?.id ?? null,
        query.limit + 1,
      ]),
    ]);
    const marks = await this.marks.of(
      company.id,
      rows.map((row) => row.scope_id),
    );
    return toPage(rows, query.limit, {
      key: (row) => ({ at: row.submitted_at, id: row.id }),
      item: (row) => toItem(row, totalCents(row, company.id, key), marks.get(row.scope_id)),
    });
  }
}

function totalCents(row: BidRow, companyId: string, key: Buffer): number {
  if (row.total_cents !== null) return toNumber(row.total_cents);
  if (row.ciphertext === null || row.key_for_bidder === null) throw new Error('A bid without content');
  const parts = { ciphertext: row.ciphertext, keyForBidder: row.key_for_bidder };
  return readOwnBid(parts, { bidId: row.id, scopeId: row.scope_id, companyId }, key).priced.totalCents;
}

function toItem(row: BidRow, cents: number, mark: OwnMark | undefined): BidListItem {
  return {
    id: row.id,
    scopeId: row.scope_id,
    scopeNumber: scopeNumber(row.number),
    scopeTitle: row.title,
    scopeStatus: row.scope_status,
    mode: row.mode,
    gc: { id: row.gc_id, name: row.gc_name },
    dueAt: toInstant(row.due_at),
    timeZone: row.time_zone,
    status: row.status,
    totalCents: cents,
    rank: mark?.rank ?? null,
    of: mark?.of ?? null,
    outcome: toOutcome(row),
    subcontractId: row.subcontract_id,
  };
}
