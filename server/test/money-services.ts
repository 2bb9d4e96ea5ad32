import { Sequelize } from 'sequelize';
import { CompletionStates } from '../src/completions/completion-states.ts';
import { Books } from '../src/ledger/books.ts';
import { Ledger } from '../src/ledger/ledger.service.ts';
import { LedgerSeals } from '../src/ledger/seals.ts';
import { Fundings } from '../src/payments/fundings.ts';
import { Incidents } from '../src/payments/incidents.ts';
import { Operations } from '../src/payments/operations.ts';
import { Payouts } from '../src/payments/payouts.ts';
import { Reconciliation } from '../src/payments/reconcile.ts';
import { ReleaseService } from '../src/payments/releases.ts';
import { SetAsideService } from '../src/payments/set-aside.ts';
import { StripeEvents } from '../src/payments/stripe-events.ts';
import { Transfers } from '../src/payments/transfers.ts';
import { Audit } from '../src/platform/audit/audit.ts';
import type { Config } from '../src/platform/config/config.ts';
import { UnitOfWork, type Tx } from '../src/platform/database/unit-of-work.ts';
import type { JobQueue } from '../src/platform/jobs/job-queue.ts';
import { Mailer } from '../src/platform/mail/mailer.ts';
import { LiveHints } from '../src/platform/realtime/live-hints.ts';
import type { MoneyLab } from './money-lab.ts';

export interface WaitingJob {
  name: 'provider_operation' | 'stripe_event';
  id: string;
}

/** Jobs wait, once committed, until the spec runs them: in any order, twice, and again after a failure. */
export class HeldJobs {
  readonly waiting: WaitingJob[] = [];
  uow: UnitOfWork | null = null;

  async send(tx: Tx, name: string, data: { operationId?: string; eventId?: string }): Promise<void> {
    const id = data.operationId ?? data.eventId;
    if (id === undefined || (name !== 'provider_operation' && name !== 'stripe_event')) return;
    this.uow?.afterCommit(tx, () => void this.waiting.push({ name, id }));
  }
}

/** The money services as the app wires them, over a lab, with their jobs in the spec's hand. */
export function wireMoney(lab: MoneyLab) {
  const sequelize = new Sequelize(lab.appUrl, { logging: false, pool: { max: 4 } });
  const uow = new UnitOfWork(sequelize);
  const jobs = new HeldJobs();
  jobs.uow = uow;
  const queue = jobs as unknown as JobQueue;
  const config = {
    appUrl: 'http://127.0.0.1:1',
    stripe: { webhookSecret: 'whsec_lab', connectWebhookSecret: 'whsec_lab_connect' },
    mail: { smtpUrl: 'smtp://127.0.0.1:1', from: 'lab@kerfyard.example' },
  } as Config;
  const live = new LiveHints();
  const audit = new Audit(uow);
  const ledger = new Ledger(uow);
  const seals = new LedgerSeals(uow);
  const incidents = new Incidents(uow);
  const mailer = new Mailer(config, uow, queue);
  for (const kind of ['set_aside', 'released', 'transferred']) mailer.register(kind, async () => null);
  const operations = new Operations(uow, queue, incidents, lab.provider);
  const events = new StripeEvents(uow, queue, lab.provider, config);
  const setAside = new SetAsideService(uow, operations, audit, live, config);
  const fundings = new Fundings(uow, ledger, incidents, events, mailer, live, lab.provider);
  const transfers = new Transfers(uow, ledger, operations, mailer, live);
  const payouts = new Payouts(uow, events, transfers, live, lab.provider, config);
  const completions = new CompletionStates(uow);
  const releases = new ReleaseService(uow, ledger, completions, transfers, audit, mailer, live);
  for (const service of [setAside, fundings, transfers, payouts]) service.onModuleInit();
  return {
    uow,
    jobs,
    ledger,
    seals,
    books: new Books(uow, seals),
    reconciliation: new Reconciliation(uow, incidents, lab.provider),
    operations,
    events,
    setAside,
    fundings,
    transfers,
    payouts,
    releases,
    /** Run one job as the runner would; a failure puts it back. */
    run: async (job: WaitingJob): Promise<void> => {
      try {
        await (job.name === 'provider_operation' ? operations.attempt(job.id) : events.handle(job.id));
      } catch {
        jobs.waiting.push(job);
      }
    },
    close: () => sequelize.close(),
  };
}

export type MoneyServices = ReturnType<typeof wireMoney>;
