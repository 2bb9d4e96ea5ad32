import { Inject, Injectable } from '@nestjs/common';
import { isDeepStrictEqual } from 'node:util';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { STRIPE, type StripeClient } from '../platform/stripe/stripe-client.ts';
import { Incidents } from './incidents.ts';
import {
  readBalance,
  readCrewMoney,
  readProvider,
  type ProviderCharge,
  type ProviderState,
  type ProviderTransfer,
} from './provider-state.ts';
import {
  AWAITED_AMONG,
  BOOKS_MARK,
  CLAIMED_OBJECTS,
  CREW_MEMOS,
  OPEN_AMONG,
  OUR_BALANCE,
  OUR_CHARGES,
  OUR_TRANSFERS,
} from './reconcile.queries.ts';

/** Something that our books and the provider say differently. */
export interface Difference {
  kind: string;
  subject: string;
  detail: string;
}

interface OurCharge {
  charge_id: string;
  cents: string;
  is_available: boolean;
  drawn_cents: string;
}

interface OurTransfer {
  transfer_id: string;
  cents: string;
  charge_id: string;
  payout_account_id: string | null;
}

interface OurBooks {
  balance: { pending_cents: string; available_cents: string };
  charges: OurCharge[];
  transfers: OurTransfer[];
}

/** At the provider, and on its way into our books: no difference, but counted where totals are compared. */
interface UnderWay {
  charges: ProviderCharge[];
  transfers: ProviderTransfer[];
}

const TRIES = 5;

/**
 * Compares the books with the provider (B-I7, B-I8): its balance, and charges, transfers, refunds and disputes by id,
 * both ways, and what each crew has there. Each difference is an incident that a person closes.
 */
@Injectable()
export class Reconciliation {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly incidents: Incidents,
    @Inject(STRIPE) private readonly stripe: StripeClient,
  ) {}

  /** Compare, and open an incident for each difference. */
  async run(): Promise<Difference[]> {
    const differences = await this.compare();
    for (const { kind, subject, detail } of differences) {
      await this.uow.run((tx) => this.incidents.open(tx, kind, subject, detail));
    }
    return differences;
  }

  /** Money moves while it is read: totals are compared only when neither side moved meanwhile. */
  async compare(): Promise<Difference[]> {
    for (let attempt = 1; ; attempt += 1) {
      const mark = await this.mark();
      const known = await this.uow.rows<{ id: string; kind: string }>(null, CLAIMED_OBJECTS);
      const provider = await readProvider(this.stripe);
      const books = await this.readBooks();
      const underWay = await this.findUnderWay(provider, books);
      const crews = await this.crewDifferences(underWay);
      const isStill = isDeepStrictEqual(mark, await this.mark());
      if (!isStill && attempt < TRIES) continue;
      const byId = [...missing(known, provider), ...differing(books, provider, underWay)];
      return isStill ? [...byId, ...crews, ...balanceDifferences(books, provider, underWay)] : byId;
    }
  }

  private async mark(): Promise<unknown> {
    return [await this.uow.row(null, BOOKS_MARK), await readBalance(this.stripe)];
  }

  private async readBooks(): Promise<OurBooks> {
    const balance = await this.uow.row<OurBooks['balance']>(null, OUR_BALANCE);
    return {
      balance: balance ?? { pending_cents: '0', available_cents: '0' },
      charges: await this.uow.rows<OurCharge>(null, OUR_CHARGES),
      transfers: await this.uow.rows<OurTransfer>(null, OUR_TRANSFERS),
    };
  }

  private async findUnderWay(provider: ProviderState, books: OurBooks): Promise<UnderWay> {
    const charged = new Set(books.charges.map((row) => row.charge_id));
    const transferred = new Set(books.transfers.map((row) => row.transfer_id));
    const charges = provider.charges.filter((charge) => !charged.has(charge.id));
    const transfers = provider.transfers.filter((transfer) => !transferred.has(transfer.id));
    const awaited = await this.idsAmong(
      AWAITED_AMONG,
      charges.map((one) => one.subcontractId),
    );
    const open = await this.idsAmong(
      OPEN_AMONG,
      transfers.map((one) => one.operationId),
    );
    return {
      charges: charges.filter((charge) => awaited.has(charge.subcontractId)),
      // One transfer per open operation: a second one of the same is no longer on its way, it is one too many.
      transfers: transfers.filter((transfer) => open.delete(transfer.operationId)),
    };
  }

  private async idsAmong(sql: string, ids: string[]): Promise<Set<string>> {
    const rows = await this.uow.rows<{ id: string }>(null, sql, [ids]);
    return new Set(rows.map((row) => row.id));
  }

  private async crewDifferences(underWay: UnderWay): Promise<Difference[]> {
    const memos = await this.uow.rows<{ account: string; cents: string }>(null, CREW_MEMOS);
    const differences: Difference[] = [];
    for (const { account, cents } of memos) {
      const expected =
        Number(cents) +
        underWay.transfers
          .filter((transfer) => transfer.account === account)
          .reduce((total, transfer) => total + transfer.cents, 0);
      const there = await readCrewMoney(this.stripe, account);
      if (there === expected) continue;
      differences.push({
        kind: 'crew_balance_differs',
        subject: `${account}: ${expected} and ${there}`,
        detail: `by our books the crew has had ${expected} cents, the provider says ${there}`,
      });
    }
    return differences;
  }
}

/** What our entries claim and the provider does not know. */
function missing(known: { id: string; kind: string }[], provider: ProviderState): Difference[] {
  const there = new Set([...provider.charges, ...provider.transfers].map((one) => one.id));
  return known
    .filter(({ id }) => !there.has(id))
    .map(({ id, kind }) => ({
      kind: 'object_missing_at_provider',
      subject: id,
      detail: `an entry of the ledger claims it (${kind}); the provider does not know it`,
    }));
}

/** What the provider has and our books have not, or have otherwise. */
function differing(books: OurBooks, provider: ProviderState, underWay: UnderWay): Difference[] {
  const charges = new Map(books.charges.map((row) => [row.charge_id, row]));
  const transfers = new Map(books.transfers.map((row) => [row.transfer_id, row]));
  const differences: Difference[] = [];
  const differ = (kind: string, subject: string, detail: string) =>
    differences.push({ kind, subject, detail });
  for (const charge of provider.charges) {
    const ours = charges.get(charge.id);
    if (ours === undefined) {
      if (!underWay.charges.includes(charge))
        differ('charge_unknown', charge.id, `${charge.cents} cents were paid that no funding knows`);
    } else if (Number(ours.cents) !== charge.cents) {
      differ('charge_differs', charge.id, `ours ${ours.cents}, the provider’s ${charge.cents} cents`);
    }
    if (charge.refundedCents > 0)
      differ('refund_unknown', charge.id, `${charge.refundedCents} cents of it were refunded`);
  }
  for (const transfer of provider.transfers) {
    const ours = transfers.get(transfer.id);
    if (ours === undefined) {
      if (!underWay.transfers.includes(transfer))
        differ('transfer_unknown', transfer.id, `${transfer.cents} cents went to ${transfer.account}`);
    } else if (!isSameTransfer(ours, transfer)) {
      differ(
        'transfer_differs',
        transfer.id,
        `ours ${ours.cents} cents of ${ours.charge_id} to ${ours.payout_account_id ?? 'nobody'}, the provider’s ` +
          `${transfer.cents} cents of ${transfer.chargeId ?? 'nothing'} to ${transfer.account}`,
      );
    }
  }
  for (const id of provider.disputeIds) differ('dispute_unknown', id, 'the provider has a dispute');
  return differences;
}

function isSameTransfer(ours: OurTransfer, transfer: ProviderTransfer): boolean {
  return (
    Number(ours.cents) === transfer.cents &&
    ours.charge_id === transfer.chargeId &&
    ours.payout_account_id === transfer.account &&
    transfer.reversedCents === 0
  );
}

/** Settled and unsettled apart. What settled there is about to settle here, and what is under way counts as if it were in. */
function balanceDifferences(books: OurBooks, provider: ProviderState, underWay: UnderWay): Difference[] {
  let pending = Number(books.balance.pending_cents);
  let available = Number(books.balance.available_cents);
  const there = new Map(provider.charges.map((charge) => [charge.id, charge]));
  for (const row of books.charges) {
    const charge = there.get(row.charge_id);
    if (charge === undefined || row.is_available || !charge.isAvailable) continue;
    const rest = charge.netCents - Number(row.drawn_cents);
    pending -= rest;
    available += rest;
  }
  for (const charge of underWay.charges) {
    if (charge.isAvailable) available += charge.netCents;
    else pending += charge.netCents;
  }
  for (const transfer of underWay.transfers) {
    const source = there.get(transfer.chargeId ?? '');
    if (source?.isAvailable === false) pending -= transfer.cents;
    else available -= transfer.cents;
  }
  const { balance } = provider;
  if (balance.pendingCents === pending && balance.availableCents === available) return [];
  return [
    {
      kind: 'balance_differs',
      subject: `pending ${pending} and ${balance.pendingCents}, available ${available} and ${balance.availableCents}`,
      detail: 'by our books and at the provider, in cents',
    },
  ];
}
