import { Injectable, type OnApplicationBootstrap } from '@nestjs/common';
import { OpenBids } from '../bids/open-bids.ts';
import { Clock } from '../platform/clock/clock.ts';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { JobQueue } from '../platform/jobs/job-queue.ts';
import { Sweeps } from '../platform/jobs/sweeps.ts';
import { ComeDueJobs } from './come-due-jobs.ts';
import { ScopeReader } from './scope-reader.ts';
import { TellCrews } from './tell-crews.ts';

/** Handlers of the jobs that scopes send. */
@Injectable()
export class ScopeJobs implements OnApplicationBootstrap {
  constructor(
    private readonly jobs: JobQueue,
    private readonly sweeps: Sweeps,
    private readonly uow: UnitOfWork,
    private readonly clock: Clock,
    private readonly reader: ScopeReader,
    private readonly opening: OpenBids,
    private readonly comeDue: ComeDueJobs,
    private readonly crews: TellCrews,
  ) {}

  async onApplicationBootstrap(): Promise<void> {
    this.sweeps.register('scopes that came due', () => this.opening.openAllOverdue());
    await this.jobs.work('come_due', ({ scopeId }) => this.onDue(scopeId));
    await this.jobs.work('tell_crews', (job) => this.crews.tell(job));
  }

  /** A job that comes too early (due was moved, or the clock) is put off to the due time of now. */
  private async onDue(scopeId: string): Promise<void> {
    try {
      await this.opening.open(scopeId);
    } catch (error) {
      if (!(error instanceof AppError) || error.code !== 'not_due_yet') throw error;
      await this.putOff(scopeId);
    }
  }

  private async putOff(scopeId: string): Promise<void> {
    await this.uow.run(async (tx) => {
      const { due_at: dueAt } = await this.reader.lock(tx, scopeId);
      if (dueAt !== null) await this.comeDue.send(tx, { scopeId, dueAt, now: await this.clock.now(tx) });
    });
  }
}
