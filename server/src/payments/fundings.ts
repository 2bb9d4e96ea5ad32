import { Inject, Injectable, type OnModuleInit } from '@nestjs/common';
import { accounts, credit, debit, type EntryLine } from '../ledger/accounts.ts';
import { Ledger } from '../ledger/ledger.service.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { Mailer } from '../platform/mail/mailer.ts';
import { LiveHints, rooms } from '../platform/realtime/live-hints.ts';
import { STRIPE, type StripeClient } from '../platform/stripe/stripe-client.ts';
import type { FundingRow } from './funding-views.ts';
import {
  DRAWN_ON_FUNDING,
  FREE_FUNDING_LINES,
  FUNDING_AVAILABLE,
  FUNDING_BY_SESSION,
  FUNDING_ENDS,
  FUNDING_LINES,
  FUNDING_PROCESSES,
  FUNDING_SUCCEEDS,
  FUNDINGS_TO_SETTLE,
  LOCK_FUNDING,
  LOCK_SUBCONTRACT,
  SUBCONTRACT_PARTIES,
} from './fundings.queries.ts';
import { Incidents } from './incidents.ts';
import { NotYet, StripeEvents } from './stripe-events.ts';

/** A paid charge as read back from the provider. */
interface PaidCharge {
  sessionId: string;
  paymentIntentId: string;
  chargeId: string;
  amountCents: number;
  currency: string;
  transferGroup: string | null;
  feeCents: number;
  netCents: number;
  isAvailable: boolean;
}

interface SubcontractRow {
  gc_company_id: string;
  crew_company_id: string;
}

/** What the provider says of a payment becomes ours: events E01, E02 and E04 of the ledger. */
@Injectable()
export class Fundings implements OnModuleInit {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly ledger: Ledger,
    private readonly incidents: Incidents,
    private readonly events: StripeEvents,
    private readonly mailer: Mailer,
    private readonly live: LiveHints,
    @Inject(STRIPE) private readonly stripe: StripeClient,
  ) {}

  onModuleInit(): void {
    this.events.on(
      [
        'checkout.session.completed',
        'checkout.session.async_payment_succeeded',
        'checkout.session.async_payment_failed',
        'checkout.session.expired',
      ],
      (event) => this.readSession(event.objectId),
    );
    this.events.on(['balance.available'], () => this.settleAll());
  }

  /** Look at a checkout session as it stands now and bring our funding to the same state. */
  async readSession(sessionId: string): Promise<void> {
    const session = await this.stripe.checkout.sessions.retrieve(sessionId, {
      expand: ['payment_intent.latest_charge.balance_transaction'],
    });
    const known = await this.uow.row<FundingRow>(null, FUNDING_BY_SESSION, [sessionId]);
    if (known === null) {
      if (session.metadata?.funding_id === undefined) return;
      throw new NotYet(`session ${sessionId} is not recorded yet`);
    }
    if (session.payment_status === 'paid') {
      await this.recordPaid(known, await this.paidCharge(session));
    } else if (session.status === 'expired') {
      await this.end(known, 'expired');
    } else if (session.status === 'complete') {
      await this.recordUnpaid(known, session.payment_intent as { id: string; status: string } | null);
    } else {
      return;
    }
    await this.hint(known.subcontract_id);
  }

  private async paidCharge(session: { id: string; payment_intent: unknown }): Promise<PaidCharge> {
    const intent = session.payment_intent as {
      id: string;
      transfer_group: string | null;
      latest_charge: {
        id: string;
        amount: number;
        currency: string;
        balance_transaction: { fee: number; net: number; status: string };
      };
    };
    const charge = intent.latest_charge;
    return {
      sessionId: session.id,
      paymentIntentId: intent.id,
      chargeId: charge.id,
      amountCents: charge.amount,
      currency: charge.currency,
      transferGroup: intent.transfer_group,
      feeCents: charge.balance_transaction.fee,
      netCents: charge.balance_transaction.net,
      isAvailable: charge.balance_transaction.status === 'available',
    };
  }

  private async recordPaid(known: FundingRow, charge: PaidCharge): Promise<void> {
    await this.uow.run(async (tx) => {
      const subcontract = await this.uow.row<SubcontractRow>(tx, LOCK_SUBCONTRACT, [known.subcontract_id]);
      const funding = await this.uow.row<FundingRow>(tx, LOCK_FUNDING, [known.id]);
      if (funding === null || subcontract === null || funding.status === 'succeeded') return;
      const amount = Number(funding.amount_cents);
      const platformCharge = Number(funding.platform_charge_cents);
      const mismatch =
        charge.amountCents !== amount + platformCharge ||
        charge.currency !== 'usd' ||
        charge.transferGroup !== funding.subcontract_id;
      if (mismatch) {
        await this.incidents.open(
          tx,
          'payment_differs',
          charge.chargeId,
          `expected ${amount + platformCharge} usd for ${funding.subcontract_id}, the provider says ${charge.amountCents} ${charge.currency} for ${charge.transferGroup ?? 'nothing'}`,
        );
        return;
      }
      const moved = await this.uow.row(tx, FUNDING_SUCCEEDS, [
        funding.id,
        charge.paymentIntentId,
        charge.chargeId,
        charge.isAvailable,
      ]);
      if (moved === null) {
        await this.incidents.open(
          tx,
          'paid_after_end',
          charge.chargeId,
          `funding ${funding.id} was ${funding.status} when its payment came`,
        );
        return;
      }
      await this.postPaid(tx, funding, charge);
      await this.mailer.toCompany(tx, 'set_aside', subcontract.crew_company_id, 'money.read', {
        fundingId: funding.id,
      });
      await this.mailer.toCompany(tx, 'set_aside', subcontract.gc_company_id, 'money.read', {
        fundingId: funding.id,
      });
    });
  }

  /** E01, then E04 onto the lines; a fee above our charge never comes out of held money, so then E04 waits for a person. */
  private async postPaid(tx: Tx, funding: FundingRow, charge: PaidCharge): Promise<void> {
    const subcontractId = funding.subcontract_id;
    const amount = Number(funding.amount_cents);
    const platformCharge = Number(funding.platform_charge_cents);
    const balance = charge.isAvailable ? accounts.stripeAvailable() : accounts.stripePending();
    await this.ledger.post(tx, {
      book: 'platform',
      event: 'E01',
      key: `E01:${charge.chargeId}`,
      provider: { objectId: charge.chargeId, kind: 'charge.succeeded' },
      subcontractId,
      lines: [
        debit(balance, charge.netCents),
        debit(accounts.stripeFee(), charge.feeCents),
        credit(accounts.heldUnallocated(subcontractId), amount),
        credit(accounts.platformCharge(), platformCharge),
      ],
    });
    if (charge.feeCents > platformCharge) {
      await this.incidents.open(
        tx,
        'fee_above_charge',
        charge.chargeId,
        `the provider kept ${charge.feeCents}, the charge was ${platformCharge}; the money stays unallocated`,
      );
      return;
    }
    const lines = await this.uow.rows<{ sov_line_id: string; amount_cents: string }>(tx, FUNDING_LINES, [
      funding.id,
    ]);
    const held: EntryLine[] = lines.map((line) =>
      credit(accounts.held(subcontractId, line.sov_line_id), Number(line.amount_cents)),
    );
    await this.ledger.post(tx, {
      book: 'platform',
      event: 'E04',
      key: `E04:${funding.id}`,
      subcontractId,
      lines: [debit(accounts.heldUnallocated(subcontractId), amount), ...held],
    });
  }

  private async recordUnpaid(
    known: FundingRow,
    intent: { id: string; status: string } | null,
  ): Promise<void> {
    if (intent === null) return;
    if (intent.status === 'processing') {
      await this.uow.run((tx) => this.uow.rows(tx, FUNDING_PROCESSES, [known.id, intent.id]));
    } else if (intent.status === 'requires_payment_method' || intent.status === 'canceled') {
      await this.end(known, 'failed');
    }
  }

  private async end(known: FundingRow, status: 'failed' | 'expired'): Promise<void> {
    await this.uow.run(async (tx) => {
      const ended = await this.uow.row(tx, FUNDING_ENDS, [known.id, status]);
      if (ended !== null) await this.uow.rows(tx, FREE_FUNDING_LINES, [known.id]);
    });
  }

  /** E02 for every charge whose settlement date has passed at the provider. */
  async settleAll(): Promise<void> {
    const waiting = await this.uow.rows<{ id: string; charge_id: string }>(null, FUNDINGS_TO_SETTLE);
    for (const { id, charge_id } of waiting) {
      const charge = await this.stripe.charges.retrieve(charge_id, { expand: ['balance_transaction'] });
      const transaction = charge.balance_transaction as { status: string; net: number } | null;
      if (transaction?.status === 'available') await this.settle(id, charge_id, transaction.net);
    }
  }

  private async settle(fundingId: string, chargeId: string, netCents: number): Promise<void> {
    await this.uow.run(async (tx) => {
      const funding = await this.uow.row<FundingRow>(tx, LOCK_FUNDING, [fundingId]);
      const moved = await this.uow.row(tx, FUNDING_AVAILABLE, [fundingId]);
      if (funding === null || moved === null) return;
      const drawn = await this.uow.row<{ cents: string }>(tx, DRAWN_ON_FUNDING, [fundingId]);
      const rest = netCents - Number(drawn?.cents ?? 0);
      if (rest === 0) return;
      await this.ledger.post(tx, {
        book: 'platform',
        event: 'E02',
        key: `E02:${chargeId}`,
        provider: { objectId: chargeId, kind: 'settled' },
        subcontractId: funding.subcontract_id,
        lines: [debit(accounts.stripeAvailable(), rest), credit(accounts.stripePending(), rest)],
      });
    });
  }

  private async hint(subcontractId: string): Promise<void> {
    const row = await this.uow.row<SubcontractRow>(null, SUBCONTRACT_PARTIES, [subcontractId]);
    if (row === null) return;
    this.live.emit([rooms.company(row.gc_company_id), rooms.company(row.crew_company_id)], {
      topic: 'money',
      subcontractId,
    });
  }
}
