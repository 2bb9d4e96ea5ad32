import { Module } from '@nestjs/common';
import { ScopeCoreModule } from '../scopes/scope-core.module.ts';
import { BidStore } from './bid-store.ts';
import { BidderList } from './bidder-list.ts';
import { OpenBids } from './open-bids.ts';
import { OwnMarks } from './own-marks.ts';

/** What scopes need of bids: the opening, who has bid, and where a crew's own bids stand. */
@Module({
  imports: [ScopeCoreModule],
  providers: [OpenBids, BidStore, BidderList, OwnMarks],
  exports: [OpenBids, BidStore, BidderList, OwnMarks],
})
export class BidCoreModule {}
