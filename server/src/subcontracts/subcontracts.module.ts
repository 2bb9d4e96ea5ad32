import { Module } from '@nestjs/common';
import { CompletionReaderModule } from '../completions/completion-reader.module.ts';
import { MoneyReaderModule } from '../payments/money-reader.module.ts';
import { VisitReaderModule } from '../visits/visit-reader.module.ts';
import { ListSubcontracts } from './list-subcontracts.ts';
import { SignSubcontract } from './sign-subcontract.ts';
import { Signatures } from './signatures.ts';
import { SubcontractAccess } from './subcontract-access.ts';
import { SubcontractMails } from './subcontract-mails.ts';
import { SubcontractReaderModule } from './subcontract-reader.module.ts';
import { SubcontractsController } from './subcontracts.controller.ts';
import { ViewSubcontract } from './view-subcontract.ts';

@Module({
  imports: [SubcontractReaderModule, MoneyReaderModule, VisitReaderModule, CompletionReaderModule],
  controllers: [SubcontractsController],
  providers: [
    ListSubcontracts,
    ViewSubcontract,
    SignSubcontract,
    Signatures,
    SubcontractAccess,
    SubcontractMails,
  ],
})
export class SubcontractsModule {}
