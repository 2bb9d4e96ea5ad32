import { Module } from '@nestjs/common';
import { CompletionStatesModule } from '../completions/completion-states.module.ts';
import { LedgerModule } from '../ledger/ledger.module.ts';
import { Fundings } from './fundings.ts';
import { MoneyMails } from './money-mails.ts';
import { MoneyReaderModule } from './money-reader.module.ts';
import { MoneySweep } from './money-sweep.ts';
import { Incidents } from './incidents.ts';
import { Operations } from './operations.ts';
import { PaymentsController } from './payments.controller.ts';
import { Payouts } from './payouts.ts';
import { Reconciliation } from './reconcile.ts';
import { ReleaseService } from './releases.ts';
import { SetAsideService } from './set-aside.ts';
import { StaffBooks } from './staff-books.ts';
import { Statements } from './statements.ts';
import { StripeEvents } from './stripe-events.ts';
import { Transfers } from './transfers.ts';
import { WebhooksController } from './webhooks.controller.ts';

@Module({
  imports: [LedgerModule, MoneyReaderModule, CompletionStatesModule],
  controllers: [PaymentsController, WebhooksController],
  providers: [
    Incidents,
    Operations,
    StripeEvents,
    SetAsideService,
    Fundings,
    ReleaseService,
    Transfers,
    Payouts,
    Statements,
    StaffBooks,
    MoneyMails,
    MoneySweep,
    Reconciliation,
  ],
})
export class PaymentsModule {}
