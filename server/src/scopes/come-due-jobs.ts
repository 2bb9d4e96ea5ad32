import { Injectable } from '@nestjs/common';
import { Clock } from '../platform/clock/clock.ts';
import type { Tx } from '../platform/database/unit-of-work.ts';
import { JobQueue } from '../platform/jobs/job-queue.ts';

/** Puts the job that opens or closes a scope's bids at due. */
@Injectable()
export class ComeDueJobs {
  constructor(
    private readonly jobs: JobQueue,
    private readonly clock: Clock,
  ) {}

  /** `dueAt` and `now` are times of the one clock; the job runner waits by wall time, so only their distance counts. */
  async send(tx: Tx, due: { scopeId: string; dueAt: Date; now: Date }): Promise<void> {
    const aheadMs = Math.max(0, due.dueAt.getTime() - due.now.getTime());
    const startAfter = new Date(this.clock.wallMs() + aheadMs);
    await this.jobs.send(tx, 'come_due', { scopeId: due.scopeId }, { startAfter });
  }
}
