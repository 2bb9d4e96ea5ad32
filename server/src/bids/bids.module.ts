import { Module } from '@nestjs/common';
import { ScopeCoreModule } from '../scopes/scope-core.module.ts';
import { ScopesModule } from '../scopes/scopes.module.ts';
import { BidCoreModule } from './bid-core.module.ts';
import { BidDrafts } from './bid-drafts.ts';
import { BidLadder } from './bid-ladder.ts';
import { BidList } from './bid-list.ts';
import { BidReader } from './bid-reader.ts';
import { BidWindow } from './bid-window.ts';
import { BidWriter } from './bid-writer.ts';
import { BidsController } from './bids.controller.ts';
import { CompanyKeys } from './company-keys.ts';
import { OwnBids } from './own-bid.ts';
import { PreviewPrice } from './preview-price.ts';
import { SubmitBid } from './submit-bid.ts';
import { Tabulation } from './tabulation.ts';
import { WithdrawBid } from './withdraw-bid.ts';

@Module({
  imports: [ScopeCoreModule, ScopesModule, BidCoreModule],
  controllers: [BidsController],
  providers: [
    BidDrafts,
    BidLadder,
    BidList,
    BidReader,
    BidWindow,
    BidWriter,
    CompanyKeys,
    OwnBids,
    PreviewPrice,
    SubmitBid,
    Tabulation,
    WithdrawBid,
  ],
  exports: [BidReader, BidCoreModule],
})
export class BidsModule {}
