import { Injectable } from '@nestjs/common';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { LADDER } from './own-bid.queries.ts';

type Rung = 'yard' | 'service_radius' | 'methods';
const missing: Record<Rung, string> = {
  yard: 'Say where your trucks start',
  service_radius: 'Say how far you go',
  methods: 'Choose at least one method',
};

/** What bidding asks of a company beyond the verified address that signing in already needs. */
@Injectable()
export class BidLadder {
  constructor(private readonly uow: UnitOfWork) {}

  /** @throws AppError profile_incomplete with a field for each thing that is missing */
  async require(companyId: string): Promise<void> {
    const row = await this.uow.row<Record<Rung, boolean>>(null, LADDER, [companyId]);
    const rungs = (Object.keys(missing) as Rung[]).filter((rung) => row?.[rung] !== true);
    if (rungs.length === 0) return;
    throw new AppError('profile_incomplete', {
      fields: rungs.map((rung) => ({ path: rung, message: missing[rung] })),
    });
  }
}
