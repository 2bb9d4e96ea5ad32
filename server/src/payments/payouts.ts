import { Inject, Injectable, type OnModuleInit } from '@nestjs/common';
import type { Actor } from '@kerfyard/common/people';
import { CONFIG, type Config } from '../platform/config/config.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { LiveHints, rooms } from '../platform/realtime/live-hints.ts';
import { readStripeError, STRIPE, type StripeClient } from '../platform/stripe/stripe-client.ts';
import {
  COMPANY_BY_ACCOUNT,
  COMPANY_BY_ID,
  LOCK_COMPANY,
  SET_PAYOUT_ACCOUNT,
  SET_PAYOUT_STATE,
} from './payouts.queries.ts';
import { StripeEvents } from './stripe-events.ts';
import { Transfers } from './transfers.ts';

interface CompanyRow {
  id: string;
  name: string;
  kind: string;
  payout_account_id: string | null;
}

/** Where a crew's money goes: an account at the provider, set up on the provider's own page. */
@Injectable()
export class Payouts implements OnModuleInit {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly events: StripeEvents,
    private readonly transfers: Transfers,
    private readonly live: LiveHints,
    @Inject(STRIPE) private readonly stripe: StripeClient,
    @Inject(CONFIG) private readonly config: Config,
  ) {}

  onModuleInit(): void {
    this.events.on(['account.updated', 'capability.updated'], (event) =>
      this.readAccount(event.account ?? event.objectId),
    );
  }

  /** The address of the provider's set-up page; single use, so a new one each time. */
  async onboardingUrl(actor: Actor): Promise<{ url: string }> {
    const companyId = actor.company?.id ?? '';
    const company = await this.uow.row<CompanyRow>(null, COMPANY_BY_ID, [companyId]);
    if (company === null) throw new AppError('not_found');
    try {
      const account = company.payout_account_id ?? (await this.createAccount(company));
      const back = `${this.config.appUrl}/company?payouts`;
      const link = await this.stripe.accountLinks.create({
        account,
        type: 'account_onboarding',
        return_url: `${back}=back`,
        refresh_url: `${back}=again`,
      });
      return { url: link.url };
    } catch (error) {
      readStripeError(error);
      throw new AppError('provider_unavailable');
    }
  }

  /** Coming back from the page does not mean complete: read the account as it stands. */
  async refresh(actor: Actor): Promise<void> {
    const company = await this.uow.row<CompanyRow>(null, COMPANY_BY_ID, [actor.company?.id ?? '']);
    if (company?.payout_account_id) await this.readAccount(company.payout_account_id);
  }

  /** One account per company: the key is the company's id, so a lost reply or a second click finds the same one. */
  private async createAccount(company: CompanyRow): Promise<string> {
    const account = await this.stripe.accounts.create(
      {
        controller: {
          fees: { payer: 'application' },
          losses: { payments: 'application' },
          stripe_dashboard: { type: 'none' },
          requirement_collection: 'stripe',
        },
        capabilities: { transfers: { requested: true } },
        business_profile: { name: company.name },
        metadata: { company_id: company.id },
      },
      { idempotencyKey: `payout-account:${company.id}` },
    );
    await this.uow.run(async (tx: Tx) => {
      await this.uow.row(tx, LOCK_COMPANY, [company.id]);
      await this.uow.rows(tx, SET_PAYOUT_ACCOUNT, [company.id, account.id]);
    });
    return account.id;
  }

  private async readAccount(accountId: string): Promise<void> {
    const known = await this.uow.row<{ id: string; payouts_ready: boolean }>(null, COMPANY_BY_ACCOUNT, [
      accountId,
    ]);
    if (known === null) return;
    const account = await this.stripe.accounts.retrieve(accountId);
    const ready = account.capabilities?.transfers === 'active' && account.payouts_enabled === true;
    await this.uow.run((tx) =>
      this.uow.rows(tx, SET_PAYOUT_STATE, [accountId, ready, account.requirements?.currently_due ?? []]),
    );
    if (ready) await this.transfers.retryForCrew(known.id);
    this.live.emit(rooms.company(known.id), { topic: 'money', subcontractId: '' });
  }
}
