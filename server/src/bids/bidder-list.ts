import { Injectable } from '@nestjs/common';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { BIDDERS } from './bid-core.queries.ts';

/** Which companies have bid on a scope, withdrawn bids included: those who hear of what becomes of it. */
@Injectable()
export class BidderList {
  constructor(private readonly uow: UnitOfWork) {}

  async of(tx: Tx | null, scopeId: string): Promise<string[]> {
    const rows = await this.uow.rows<{ company_id: string }>(tx, BIDDERS, [scopeId]);
    return rows.map((row) => row.company_id);
  }
}
