import { Injectable, type OnModuleInit } from '@nestjs/common';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { LedgerSeals } from '../ledger/seals.ts';
import { Clock } from '../platform/clock/clock.ts';
import { JobQueue } from '../platform/jobs/job-queue.ts';
import { Sweeps } from '../platform/jobs/sweeps.ts';
import { Fundings } from './fundings.ts';
import { OPEN_OPERATIONS } from './operations.queries.ts';
import { Reconciliation } from './reconcile.ts';
import { READY_BUT_BLOCKED } from './releases.queries.ts';
import { OPEN_EVENTS } from './stripe-events.queries.ts';
import { StripeEvents } from './stripe-events.ts';
import { Transfers } from './transfers.ts';

const HOUR_MS = 3_600_000;

/** Every minute: what a webhook missed, what a job gave up on, what has settled, what is to be sealed. */
@Injectable()
export class MoneySweep implements OnModuleInit {
  private reconciledAtMs = 0;

  constructor(
    private readonly sweeps: Sweeps,
    private readonly uow: UnitOfWork,
    private readonly jobs: JobQueue,
    private readonly events: StripeEvents,
    private readonly fundings: Fundings,
    private readonly transfers: Transfers,
    private readonly seals: LedgerSeals,
    private readonly reconciliation: Reconciliation,
    private readonly clock: Clock,
  ) {}

  onModuleInit(): void {
    this.sweeps.register('provider events', () => this.events.poll());
    this.sweeps.register('settled charges', () => this.fundings.settleAll());
    this.sweeps.register('open operations', () => this.requeue());
    this.sweeps.register('blocked releases', () => this.retryBlocked());
    this.sweeps.register('ledger seals', async () => void (await this.seals.sealAll()));
    this.sweeps.register('reconciliation', () => this.reconcileHourly());
  }

  private async requeue(): Promise<void> {
    const operations = await this.uow.rows<{ id: string }>(null, OPEN_OPERATIONS);
    const events = await this.uow.rows<{ id: string }>(null, OPEN_EVENTS);
    await this.uow.run(async (tx) => {
      for (const { id } of operations)
        await this.jobs.send(tx, 'provider_operation', { operationId: id }, { singletonKey: id });
      for (const { id } of events)
        await this.jobs.send(tx, 'stripe_event', { eventId: id }, { singletonKey: id });
    });
  }

  /** By this process's own watch: more servers look a little more often, and find the same. */
  private async reconcileHourly(): Promise<void> {
    const nowMs = this.clock.wallMs();
    if (nowMs - this.reconciledAtMs < HOUR_MS) return;
    this.reconciledAtMs = nowMs;
    await this.reconciliation.run();
  }

  private async retryBlocked(): Promise<void> {
    const crews = await this.uow.rows<{ crew_company_id: string }>(null, READY_BUT_BLOCKED);
    for (const { crew_company_id } of crews) await this.transfers.retryForCrew(crew_company_id);
  }
}
