import { Injectable } from '@nestjs/common';
import type { CompanyView } from '@kerfyard/common/api';
import type { BidInput, PricedBid } from '@kerfyard/common/bids';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { READABLE_BIDS } from './bid-reader.queries.ts';

/** A bid its scope's general contractor may read. */
export interface OpenedBid {
  id: string;
  scopeId: string;
  crew: CompanyView;
  revision: number;
  /** `in`: ranked and not yet due; `opened`: due has passed. */
  status: 'in' | 'opened';
  input: BidInput;
  priced: PricedBid;
  submittedBy: string;
  submittedAt: Date;
  yard: { lat: number; lon: number } | null;
}

interface Row {
  id: string;
  scope_id: string;
  company_id: string;
  company_name: string;
  revision: number;
  status: 'in' | 'opened';
  input: BidInput;
  priced: PricedBid;
  submitted_by: string;
  submitted_at: Date;
  yard_lat: number | null;
  yard_lon: number | null;
}

/** Reads the bids on a scope for its general contractor. A sealed bid is not there until the opening has written it. */
@Injectable()
export class BidReader {
  constructor(private readonly uow: UnitOfWork) {}

  /** Bids standing at due, the lowest first: what an award may choose from. Empty before due. */
  async opened(scopeId: string, tx: Tx | null = null): Promise<OpenedBid[]> {
    const bids = await this.readable(scopeId, tx);
    return bids.filter((bid) => bid.status === 'opened');
  }

  /** Bids the general contractor may read now, the lowest first: in a ranked scope from the first one on. */
  async readable(scopeId: string, tx: Tx | null = null): Promise<OpenedBid[]> {
    const rows = await this.uow.rows<Row>(tx, READABLE_BIDS, [scopeId]);
    return rows.map((row) => ({
      id: row.id,
      scopeId: row.scope_id,
      crew: { id: row.company_id, name: row.company_name },
      revision: row.revision,
      status: row.status,
      input: row.input,
      priced: row.priced,
      submittedBy: row.submitted_by,
      submittedAt: row.submitted_at,
      yard: row.yard_lat === null || row.yard_lon === null ? null : { lat: row.yard_lat, lon: row.yard_lon },
    }));
  }
}
