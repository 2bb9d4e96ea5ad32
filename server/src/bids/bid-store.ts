import { Injectable } from '@nestjs/common';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import type { BidContent, BidIdentity } from './bid-envelope.ts';
import { INSERT_BID, INSERT_BID_LINES } from './bid-core.queries.ts';

/** A bid in the clear, with what the row says beside its content. */
export interface ClearBid extends BidIdentity {
  revision: number;
  status: 'in' | 'opened';
  content: BidContent;
  submittedBy: string;
  submittedAt: Date;
  version: number;
}

/** Writes readable bids: ranked ones as they come, sealed ones at the opening. */
@Injectable()
export class BidStore {
  constructor(private readonly uow: UnitOfWork) {}

  async insert(tx: Tx, bid: ClearBid): Promise<void> {
    const { input, priced } = bid.content;
    await this.uow.rows(tx, INSERT_BID, [
      bid.bidId,
      bid.scopeId,
      bid.companyId,
      bid.revision,
      bid.status,
      JSON.stringify(input),
      JSON.stringify(priced),
      priced.totalCents,
      bid.submittedBy,
      bid.submittedAt,
      bid.version,
    ]);
    await this.insertLines(tx, bid.bidId, bid.content);
  }

  async insertLines(tx: Tx, bidId: string, { priced }: BidContent): Promise<void> {
    if (priced.lines.length === 0) return;
    const rows = priced.lines.map(({ cutId, ...line }, index) => ({
      cut_id: cutId,
      position: index + 1,
      ...line,
    }));
    await this.uow.rows(tx, INSERT_BID_LINES, [bidId, JSON.stringify(rows)]);
  }
}
