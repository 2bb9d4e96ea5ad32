import { Module } from '@nestjs/common';
import { MoneyReaderModule } from '../payments/money-reader.module.ts';
import { SubcontractReaderModule } from '../subcontracts/subcontract-reader.module.ts';
import { MoveVisit } from './move-visit.ts';
import { ProposeVisit } from './propose-visit.ts';
import { VisitMails } from './visit-mails.ts';
import { VisitReaderModule } from './visit-reader.module.ts';
import { VisitsController } from './visits.controller.ts';
import { VisitsService } from './visits.service.ts';

@Module({
  imports: [MoneyReaderModule, SubcontractReaderModule, VisitReaderModule],
  controllers: [VisitsController],
  providers: [VisitsService, ProposeVisit, MoveVisit, VisitMails],
})
export class VisitsModule {}
