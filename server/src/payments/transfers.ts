import { Injectable, type OnModuleInit } from '@nestjs/common';
import { accounts, credit, debit } from '../ledger/accounts.ts';
import { Ledger } from '../ledger/ledger.service.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { Mailer } from '../platform/mail/mailer.ts';
import { LiveHints, rooms } from '../platform/realtime/live-hints.ts';
import type { StripeClient } from '../platform/stripe/stripe-client.ts';
import { LOCK_FUNDING } from './fundings.queries.ts';
import { Operations, type Operation } from './operations.ts';
import {
  BLOCKED_RELEASES_OF_CREW,
  CREW_ACCOUNT,
  FUNDING_LOTS,
  INSERT_TRANSFER,
  LOCK_RELEASE,
  POINT_TRANSFER,
  REFUSED_TRANSFERS,
  RELEASE_BLOCKED,
  RELEASE_RETRIED,
  RELEASE_TRANSFERRED,
  TRANSFER_BY_OPERATION,
  TRANSFER_DONE,
  TRANSFERS_LEFT,
} from './releases.queries.ts';

interface TransferRow {
  release_id: string;
  funding_id: string;
  amount_cents: string;
  transfer_id: string | null;
  subcontract_id: string;
  available_at: Date | null;
  charge_id: string;
  gc_company_id: string;
  crew_company_id: string;
  payout_account_id: string | null;
}

interface CrewAccount {
  payout_account_id: string | null;
  payouts_ready: boolean;
}

/** A release becomes one transfer per funding charge it draws on, first in first out, each an operation of its own (event E08). */
@Injectable()
export class Transfers implements OnModuleInit {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly ledger: Ledger,
    private readonly operations: Operations,
    private readonly mailer: Mailer,
    private readonly live: LiveHints,
  ) {}

  onModuleInit(): void {
    this.operations.register<{ id: string }>('transfer', {
      call: (stripe, operation) => this.createTransfer(stripe, operation),
      find: (stripe, operation) => this.findTransfer(stripe, operation),
      succeed: (tx, operation, transfer) => this.record(tx, operation, transfer.id),
      refuse: async (tx, operation, error) => {
        const because = error.code === 'balance_insufficient' ? 'balance' : 'capability';
        await this.uow.rows(tx, RELEASE_BLOCKED, [operation.subjectId, because]);
      },
      settled: ({ params }) =>
        this.live.emit(
          [rooms.company(String(params.gcCompanyId)), rooms.company(String(params.crewCompanyId))],
          {
            topic: 'money',
            subcontractId: String(params.subcontractId),
          },
        ),
    });
  }

  /** Divide the crew's part over the funding lots and ask for a transfer from each. */
  async request(
    tx: Tx,
    input: { releaseId: string; subcontractId: string; crewCompanyId: string; cents: number },
  ): Promise<void> {
    if (input.cents === 0) return;
    const crew = await this.uow.row<CrewAccount>(tx, CREW_ACCOUNT, [input.crewCompanyId]);
    const lots = await this.uow.rows<{ id: string; left_cents: string }>(tx, FUNDING_LOTS, [
      input.subcontractId,
    ]);
    let left = input.cents;
    for (const lot of lots) {
      const cents = Math.min(left, Number(lot.left_cents));
      if (cents <= 0) continue;
      const operationId = await this.operation(tx, input.releaseId, lot.id, cents);
      await this.uow.rows(tx, INSERT_TRANSFER, [input.releaseId, lot.id, cents, operationId]);
      left -= cents;
    }
    if (left > 0) throw new Error(`release ${input.releaseId}: ${left} cents have no charge to draw on`);
    if (crew?.payouts_ready !== true)
      await this.uow.rows(tx, RELEASE_BLOCKED, [input.releaseId, 'capability']);
  }

  /** After a definite refusal (onboarding lapsed, balance short): new operations for what is still owed. */
  async retry(tx: Tx, releaseId: string): Promise<void> {
    await this.uow.row(tx, LOCK_RELEASE, [releaseId]);
    const refused = await this.uow.rows<{ funding_id: string; amount_cents: string }>(tx, REFUSED_TRANSFERS, [
      releaseId,
    ]);
    for (const row of refused) {
      const operationId = await this.operation(tx, releaseId, row.funding_id, Number(row.amount_cents));
      await this.uow.rows(tx, POINT_TRANSFER, [releaseId, row.funding_id, operationId]);
    }
    if (refused.length > 0) await this.uow.rows(tx, RELEASE_RETRIED, [releaseId]);
  }

  /** The crew's account can take transfers again: try everything that waited for it. */
  async retryForCrew(crewCompanyId: string): Promise<void> {
    const blocked = await this.uow.rows<{ id: string }>(null, BLOCKED_RELEASES_OF_CREW, [crewCompanyId]);
    for (const { id } of blocked) await this.uow.run((tx) => this.retry(tx, id));
  }

  private operation(tx: Tx, releaseId: string, fundingId: string, cents: number): Promise<string> {
    return this.operations.request(tx, 'transfer', { type: 'release', id: releaseId }, { fundingId, cents });
  }

  private async createTransfer(stripe: StripeClient, operation: Operation): Promise<{ id: string }> {
    const row = await this.uow.row<TransferRow>(null, TRANSFER_BY_OPERATION, [operation.id]);
    if (row === null) throw new Error(`operation ${operation.id} belongs to no transfer`);
    Object.assign(operation.params, {
      subcontractId: row.subcontract_id,
      gcCompanyId: row.gc_company_id,
      crewCompanyId: row.crew_company_id,
    });
    return stripe.transfers.create(
      {
        amount: Number(row.amount_cents),
        currency: 'usd',
        // An account that was never opened is refused by the provider like one that may not receive yet.
        destination: row.payout_account_id ?? 'acct_none',
        source_transaction: row.charge_id,
        metadata: {
          operation_id: operation.id,
          release_id: row.release_id,
          subcontract_id: row.subcontract_id,
        },
      },
      { idempotencyKey: operation.id },
    );
  }

  /** By the row's id among the transfers of its subcontract: those drawn on a charge carry the charge's group. */
  private async findTransfer(stripe: StripeClient, operation: Operation): Promise<{ id: string } | null> {
    const row = await this.uow.row<TransferRow>(null, TRANSFER_BY_OPERATION, [operation.id]);
    if (row === null) return null;
    for await (const transfer of stripe.transfers.list({ limit: 100, transfer_group: row.subcontract_id })) {
      if (transfer.metadata.operation_id === operation.id) return { id: transfer.id };
    }
    return null;
  }

  /** E08: the crew's claim on us becomes its balance at the provider. */
  private async record(tx: Tx, operation: Operation, transferId: string): Promise<void> {
    const found = await this.uow.row<TransferRow>(tx, TRANSFER_BY_OPERATION, [operation.id]);
    if (found === null || found.transfer_id !== null) return;
    await this.uow.row(tx, LOCK_FUNDING, [found.funding_id]);
    // Read again under the charge's lock: settling (E02) may have moved it from pending to available meanwhile.
    const row = (await this.uow.row<TransferRow>(tx, TRANSFER_BY_OPERATION, [operation.id])) ?? found;
    const cents = Number(row.amount_cents);
    const account = row.payout_account_id ?? '';
    await this.ledger.post(tx, {
      book: 'platform',
      event: 'E08',
      key: `E08:${operation.id}`,
      provider: { objectId: transferId, kind: 'transfer.created' },
      subcontractId: row.subcontract_id,
      lines: [
        debit(accounts.crewPayable(row.crew_company_id, row.subcontract_id), cents),
        credit(row.available_at === null ? accounts.stripePending() : accounts.stripeAvailable(), cents),
      ],
    });
    await this.ledger.post(tx, {
      book: 'connect',
      event: 'E08',
      key: `E08:memo:${operation.id}`,
      subcontractId: row.subcontract_id,
      lines: [
        debit(accounts.crewBalance(account, row.crew_company_id), cents),
        credit(accounts.crewOwner(account, row.crew_company_id), cents),
      ],
    });
    await this.uow.rows(tx, TRANSFER_DONE, [operation.id, transferId]);
    const rest = await this.uow.row<{ left_count: number }>(tx, TRANSFERS_LEFT, [row.release_id]);
    if (rest?.left_count === 0) {
      await this.uow.rows(tx, RELEASE_TRANSFERRED, [row.release_id]);
      await this.mailer.toCompany(tx, 'transferred', row.crew_company_id, 'money.read', {
        releaseId: row.release_id,
      });
    }
  }
}
