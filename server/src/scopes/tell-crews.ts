import { Injectable } from '@nestjs/common';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { JobQueue } from '../platform/jobs/job-queue.ts';
import type { Jobs } from '../platform/jobs/queues.ts';
import { Mailer } from '../platform/mail/mailer.ts';
import { MATCHING_CREWS } from './tell-crews.queries.ts';

/** Companies told by one job; the next page is a job of its own, so that no transaction grows with the platform. */
const PAGE = 100;

/** Tells matching crews of a new scope by e-mail. */
@Injectable()
export class TellCrews {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly jobs: JobQueue,
    private readonly mailer: Mailer,
  ) {}

  async tell({ scopeId, after }: Jobs['tell_crews']): Promise<void> {
    await this.uow.run(async (tx) => {
      const crews = await this.uow.rows<{ id: string }>(tx, MATCHING_CREWS, [scopeId, after, PAGE]);
      for (const { id } of crews) {
        await this.mailer.toCompany(tx, 'scope_published', id, 'bid.write', { scopeId }, { priority: -1 });
      }
      const last = crews.at(-1);
      if (crews.length === PAGE && last !== undefined) {
        await this.jobs.send(tx, 'tell_crews', { scopeId, after: last.id });
      }
    });
  }
}
