import { Module } from '@nestjs/common';
import { BidCoreModule } from '../bids/bid-core.module.ts';
import { ScopeCoreModule } from '../scopes/scope-core.module.ts';
import { SubcontractReaderModule } from '../subcontracts/subcontract-reader.module.ts';
import { AwardBid } from './award-bid.ts';
import { AwardMails } from './award-mails.ts';
import { AwardPaper } from './award-paper.ts';
import { AwardsController } from './awards.controller.ts';
import { LapseAwards } from './lapse-awards.ts';

@Module({
  imports: [ScopeCoreModule, BidCoreModule, SubcontractReaderModule],
  controllers: [AwardsController],
  providers: [AwardBid, AwardPaper, AwardMails, LapseAwards],
})
export class AwardsModule {}
