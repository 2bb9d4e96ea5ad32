import { Injectable } from '@nestjs/common';
import type { BiddingMode } from '@kerfyard/common/scopes';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { SCOPE_KEY } from './bid-core.queries.ts';
import { sealBid, type BidContent, type BidIdentity } from './bid-envelope.ts';
import { BidStore } from './bid-store.ts';
import { CompanyKeys } from './company-keys.ts';
import { DELETE_BID_LINES, INSERT_SEALED, REVISE_RANKED, REVISE_SEALED } from './own-bid.queries.ts';

/** A bid about to be written under the scope's lock. */
export interface WrittenBid {
  identity: BidIdentity;
  mode: BiddingMode;
  isRevision: boolean;
  content: BidContent;
  userId: string;
  at: Date;
}

/** Writes a bid where it belongs: as ciphertext in a sealed scope, as a readable row in a ranked one. */
@Injectable()
export class BidWriter {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly store: BidStore,
    private readonly keys: CompanyKeys,
  ) {}

  async write(tx: Tx, bid: WrittenBid): Promise<void> {
    await (bid.mode === 'sealed' ? this.seal(tx, bid) : this.writeRanked(tx, bid));
  }

  private async seal(tx: Tx, { identity, isRevision, content, userId, at }: WrittenBid): Promise<void> {
    const scopeKey = await this.uow.row<{ public_key: Buffer }>(tx, SCOPE_KEY, [identity.scopeId]);
    if (scopeKey === null) throw new Error('The key of this scope is missing');
    const companyKey = await this.keys.of(tx, identity.companyId);
    const sealed = sealBid(content, identity, { scopePublicKey: scopeKey.public_key, companyKey });
    const { revision } = content.input;
    const parts = [sealed.ciphertext, sealed.keyForScope, sealed.keyForBidder, userId, at];
    if (isRevision) await this.uow.rows(tx, REVISE_SEALED, [identity.bidId, revision, ...parts]);
    else {
      const { bidId, scopeId, companyId } = identity;
      await this.uow.rows(tx, INSERT_SEALED, [bidId, scopeId, companyId, revision, ...parts]);
    }
  }

  private async writeRanked(tx: Tx, bid: WrittenBid): Promise<void> {
    const { identity, content, userId, at } = bid;
    if (!bid.isRevision) {
      await this.store.insert(tx, {
        ...identity,
        revision: content.input.revision,
        status: 'in',
        content,
        submittedBy: userId,
        submittedAt: at,
        version: 1,
      });
      return;
    }
    const { input, priced } = content;
    await this.uow.rows(tx, REVISE_RANKED, [
      identity.bidId,
      input.revision,
      JSON.stringify(input),
      JSON.stringify(priced),
      priced.totalCents,
      userId,
      at,
    ]);
    await this.uow.rows(tx, DELETE_BID_LINES, [identity.bidId]);
    await this.store.insertLines(tx, identity.bidId, content);
  }
}
