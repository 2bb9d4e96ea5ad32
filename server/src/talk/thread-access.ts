import { Injectable } from '@nestjs/common';
import { may, type Actor } from '@kerfyard/common/people';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { LOCK_THREAD, THREAD_SIDES } from './talk.queries.ts';

export interface ThreadRow {
  id: string;
  scope_id: string;
  gc_company_id: string;
  crew_company_id: string;
  seq: string;
}

/** A thread belongs to its two companies and to nobody else. */
@Injectable()
export class ThreadAccess {
  constructor(private readonly uow: UnitOfWork) {}

  /** @throws AppError 404 for unknown and foreign ids alike */
  async demand(tx: Tx | null, actor: Actor, threadId: string): Promise<ThreadRow> {
    return this.find(tx, THREAD_SIDES, actor, threadId);
  }

  /** Whether a thread is one of the actor's company's; for those who only look, the permission included. */
  async has(actor: Actor, threadId: string): Promise<boolean> {
    if (actor.company === null || !may(actor, 'talk')) return false;
    return (await this.uow.row(null, THREAD_SIDES, [threadId, actor.company.id])) !== null;
  }

  /** The same under the row's lock: what gives out sequence numbers. */
  async lock(tx: Tx, actor: Actor, threadId: string): Promise<ThreadRow> {
    return this.find(tx, LOCK_THREAD, actor, threadId);
  }

  private async find(tx: Tx | null, sql: string, actor: Actor, threadId: string): Promise<ThreadRow> {
    const row = await this.uow.row<ThreadRow>(tx, sql, [threadId, actor.company?.id ?? null]);
    if (row === null) throw new AppError('not_found');
    return row;
  }
}
