import { Injectable } from '@nestjs/common';
import type { OwnBidView } from '@kerfyard/common/bids';
import type { Actor } from '@kerfyard/common/people';
import { Audit } from '../platform/audit/audit.ts';
import type { Origin } from '../platform/auth/access.decorators.ts';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { requireCompany } from '../scopes/require-company.ts';
import { ScopeAccess } from '../scopes/scope-access.ts';
import { ScopeEvents } from '../scopes/scope-events.ts';
import { BidWindow } from './bid-window.ts';
import { BidderList } from './bidder-list.ts';
import { WITHDRAW_RANKED, WITHDRAW_SEALED } from './own-bid.queries.ts';
import { OwnBids } from './own-bid.ts';

/** Takes a crew's bid back before due. A ranked one stays back; a sealed one may be handed in anew. */
@Injectable()
export class WithdrawBid {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly access: ScopeAccess,
    private readonly window: BidWindow,
    private readonly ownBids: OwnBids,
    private readonly bidders: BidderList,
    private readonly events: ScopeEvents,
    private readonly audit: Audit,
  ) {}

  /** @throws AppError not_found without a bid; bids_closed from due on; illegal_move when it is withdrawn already */
  async withdraw(actor: Actor, origin: Origin, scopeId: string): Promise<OwnBidView> {
    const company = requireCompany(actor, 'cutting_contractor');
    if ((await this.access.sight(actor, scopeId)) === 'nothing') throw new AppError('not_found');
    const { gcId, bidSeq, hearers } = await this.uow.run(async (tx) => {
      const locked = await this.window.lock(tx, scopeId);
      const bid = await this.ownBids.find(tx, scopeId, company.id);
      if (bid === null) throw new AppError('not_found');
      this.window.requireOpen(locked);
      const isRanked = locked.scope.mode === 'ranked';
      const statement = isRanked ? WITHDRAW_RANKED : WITHDRAW_SEALED;
      if ((await this.uow.row(tx, statement, [scopeId, company.id])) === null)
        throw new AppError('illegal_move');
      await this.audit.write(tx, {
        actor,
        action: 'bid.withdrawn',
        subject: { type: 'bid', id: bid.id },
        detail: { scopeId },
        origin,
      });
      return {
        gcId: locked.scope.company_id,
        bidSeq: await this.events.bumpBids(tx, scopeId),
        hearers: isRanked ? await this.bidders.of(tx, scopeId) : [company.id],
      };
    });
    this.events.bidsChanged({ id: scopeId, companyId: gcId }, bidSeq);
    this.events.ownBidsChanged(scopeId, hearers);
    const view = await this.ownBids.viewOf(company.id, scopeId);
    if (view === null) throw new AppError('not_found');
    return view;
  }
}
