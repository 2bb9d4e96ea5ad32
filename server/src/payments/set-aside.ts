import { Inject, Injectable, type OnModuleInit } from '@nestjs/common';
import { platformChargeCents } from '@kerfyard/common/money';
import type { FundingView, SetAside, SetAsideQuote } from '@kerfyard/common/payments';
import type { Actor } from '@kerfyard/common/people';
import type { Origin } from '../platform/auth/access.decorators.ts';
import { Audit } from '../platform/audit/audit.ts';
import { CONFIG, type Config } from '../platform/config/config.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { LiveHints, rooms } from '../platform/realtime/live-hints.ts';
import type { StripeClient } from '../platform/stripe/stripe-client.ts';
import {
  FREE_FUNDING_LINES,
  FUNDING_AWAITS_PAYMENT,
  FUNDING_BY_ID,
  FUNDING_ENDS,
  FUNDING_LINES,
  INSERT_FUNDING,
  INSERT_FUNDING_LINES,
  LOCK_SUBCONTRACT,
  SOV_LINES,
  STANDING_LINES,
} from './fundings.queries.ts';
import { presentFunding, type FundingRow } from './funding-views.ts';
import { Operations, type Operation } from './operations.ts';

interface SubcontractRow {
  id: string;
  number: string;
  gc_company_id: string;
  crew_company_id: string;
  status: string;
}

interface SovRow {
  id: string;
  description: string;
  amount_cents: string;
}

/** The part of a checkout session that is recorded. */
interface Session {
  id: string;
  url: string | null;
}

/** Money for lines of work is set aside before a truck rolls: a checkout page of the provider, asked for by an operation. */
@Injectable()
export class SetAsideService implements OnModuleInit {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly operations: Operations,
    private readonly audit: Audit,
    private readonly live: LiveHints,
    @Inject(CONFIG) private readonly config: Config,
  ) {}

  onModuleInit(): void {
    this.operations.register<Session>('checkout_session', {
      call: (stripe, operation) => this.createSession(stripe, operation),
      find: (stripe, operation) => findSession(stripe, operation),
      succeed: async (tx, operation, session) => {
        await this.uow.rows(tx, FUNDING_AWAITS_PAYMENT, [operation.subjectId, session.id, session.url]);
      },
      refuse: async (tx, operation) => {
        await this.uow.rows(tx, FUNDING_ENDS, [operation.subjectId, 'failed']);
        await this.uow.rows(tx, FREE_FUNDING_LINES, [operation.subjectId]);
      },
      settled: ({ params }) =>
        this.live.emit(
          [rooms.company(String(params.gcCompanyId)), rooms.subcontract(String(params.subcontractId))],
          {
            topic: 'money',
            subcontractId: String(params.subcontractId),
          },
        ),
    });
  }

  /** What setting these lines aside would cost, before anything is asked of anyone. */
  async quote(actor: Actor, subcontractId: string, input: Omit<SetAside, 'id'>): Promise<SetAsideQuote> {
    return this.uow.run(async (tx) => {
      await this.lockOwn(tx, actor, subcontractId);
      const lines = await this.freeLines(tx, subcontractId, input.sovLineIds);
      return price(lines, input.method);
    });
  }

  /** Ask for the money of these lines. Repeating the same id answers with the same funding. */
  async request(actor: Actor, origin: Origin, subcontractId: string, input: SetAside): Promise<FundingView> {
    const funding = await this.uow.run(async (tx) => {
      const subcontract = await this.lockOwn(tx, actor, subcontractId);
      const existing = await this.uow.row<FundingRow>(tx, FUNDING_BY_ID, [input.id]);
      if (existing !== null) return this.sameOrConflict(tx, existing, subcontractId, input);
      if (subcontract.status !== 'active') throw new AppError('illegal_move');
      const lines = await this.freeLines(tx, subcontractId, input.sovLineIds);
      const { amountCents, platformChargeCents: charge, totalCents } = price(lines, input.method);
      const limit = actor.limits.setAsideCents;
      if (limit !== null && totalCents > limit) throw new AppError('over_limit');
      await this.uow.rows(tx, INSERT_FUNDING, [
        input.id,
        subcontractId,
        input.method,
        amountCents,
        charge,
        actor.userId,
      ]);
      await this.uow.rows(tx, INSERT_FUNDING_LINES, [
        input.id,
        lines.map((l) => l.id),
        lines.map((l) => l.amount_cents),
      ]);
      await this.operations.request(
        tx,
        'checkout_session',
        { type: 'funding', id: input.id },
        {
          subcontractId,
          subcontractNumber: subcontract.number,
          gcCompanyId: subcontract.gc_company_id,
          method: input.method,
          amountCents,
          platformChargeCents: charge,
        },
      );
      await this.audit.write(tx, {
        actor,
        origin,
        action: 'money.set_aside_requested',
        subject: { type: 'funding', id: input.id },
        detail: { subcontractId, amountCents, platformChargeCents: charge, lines: lines.length },
      });
      return this.present(tx, input.id);
    });
    return funding;
  }

  private async present(tx: Tx, id: string): Promise<FundingView> {
    const row = await this.uow.row<FundingRow>(tx, FUNDING_BY_ID, [id]);
    if (row === null) throw new AppError('not_found');
    const lines = await this.uow.rows<{ sov_line_id: string }>(tx, FUNDING_LINES, [id]);
    return presentFunding(
      row,
      lines.map((line) => line.sov_line_id),
      'gc',
    );
  }

  private async sameOrConflict(
    tx: Tx,
    existing: FundingRow,
    subcontractId: string,
    input: SetAside,
  ): Promise<FundingView> {
    const view = await this.present(tx, existing.id);
    const same =
      existing.subcontract_id === subcontractId &&
      existing.method === input.method &&
      [...view.sovLineIds].sort().join() === [...input.sovLineIds].sort().join();
    if (!same) throw new AppError('key_reused');
    return view;
  }

  private async lockOwn(tx: Tx, actor: Actor, subcontractId: string): Promise<SubcontractRow> {
    const row = await this.uow.row<SubcontractRow>(tx, LOCK_SUBCONTRACT, [subcontractId]);
    if (row === null || row.gc_company_id !== actor.company?.id) throw new AppError('not_found');
    return row;
  }

  private async freeLines(tx: Tx, subcontractId: string, ids: string[]): Promise<SovRow[]> {
    const lines = await this.uow.rows<SovRow>(tx, SOV_LINES, [subcontractId, ids]);
    if (lines.length !== new Set(ids).size)
      throw AppError.field('sovLineIds', 'Not lines of this subcontract');
    const standing = await this.uow.rows(tx, STANDING_LINES, [ids]);
    if (standing.length > 0) throw new AppError('already_set_aside');
    const worth = lines.filter((line) => Number(line.amount_cents) > 0);
    if (worth.length === 0) throw AppError.field('sovLineIds', 'These lines carry no money');
    return worth;
  }

  private async createSession(stripe: StripeClient, operation: Operation): Promise<Session> {
    const {
      subcontractId,
      subcontractNumber,
      amountCents,
      platformChargeCents: charge,
      method,
    } = operation.params;
    const metadata = {
      operation_id: operation.id,
      funding_id: operation.subjectId,
      subcontract_id: String(subcontractId),
    };
    const back = `${this.config.appUrl}/work/${String(subcontractId)}/money`;
    const session = await stripe.checkout.sessions.create(
      {
        mode: 'payment',
        allowed_payment_method_types: [method === 'bank_debit' ? 'us_bank_account' : 'card'],
        line_items: [
          lineItem(`Set aside for subcontract ${String(subcontractNumber)}`, Number(amountCents)),
          lineItem('Charge for setting money aside', Number(charge)),
        ],
        payment_intent_data: { transfer_group: String(subcontractId), metadata },
        metadata,
        client_reference_id: operation.subjectId,
        success_url: `${back}?set-aside=paid`,
        cancel_url: `${back}?set-aside=left`,
      },
      { idempotencyKey: operation.id },
    );
    return { id: session.id, url: session.url };
  }
}

function lineItem(name: string, cents: number) {
  return { quantity: 1, price_data: { currency: 'usd', unit_amount: cents, product_data: { name } } };
}

async function findSession(stripe: StripeClient, operation: Operation): Promise<Session | null> {
  const createdAfter = Math.floor(Date.parse('2020-01-01') / 1000);
  for await (const session of stripe.checkout.sessions.list({ limit: 100, created: { gte: createdAfter } })) {
    if (session.metadata?.operation_id === operation.id) return { id: session.id, url: session.url };
  }
  return null;
}

function price(lines: SovRow[], method: SetAside['method']): SetAsideQuote {
  const amountCents = lines.reduce((sum, line) => sum + Number(line.amount_cents), 0);
  const charge = platformChargeCents(amountCents, method);
  return { amountCents, platformChargeCents: charge, totalCents: amountCents + charge };
}
