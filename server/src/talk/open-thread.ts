import { Injectable } from '@nestjs/common';
import type { Actor } from '@kerfyard/common/people';
import type { ScopeStatus } from '@kerfyard/common/scopes';
import type { ThreadView } from '@kerfyard/common/talk';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { newId } from '../platform/ids/ids.ts';
import { LiveHints, rooms } from '../platform/realtime/live-hints.ts';
import { ReadThreads } from './read-threads.ts';
import { INSERT_THREAD, SCOPE_FOR_THREAD, THREAD_OF_CREW } from './talk.queries.ts';

interface ScopeRow {
  id: string;
  company_id: string;
  status: ScopeStatus | 'discarded';
  thread_id: string | null;
  has_bid: boolean;
  subcontract_id: string | null;
}

interface Sides {
  scopeId: string;
  gcCompanyId: string;
  crewCompanyId: string;
  subcontractId: string | null;
}

/** While people may still bid or wait for the award, any crew may ask how to get to the site. */
const ASKABLE: readonly ScopeRow['status'][] = ['open', 'due'];

/** One thread per scope and crew: opened by the crew, or by the general contractor with a bidder it knows of. */
@Injectable()
export class OpenThread {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly threads: ReadThreads,
    private readonly hints: LiveHints,
  ) {}

  /**
   * The thread that is there, or a new one.
   * @throws AppError 404 where this company may not know of the scope or the bidder; 422 when it is not said with whom
   */
  async run(actor: Actor, scopeId: string, asked: string | undefined): Promise<ThreadView> {
    const crewCompanyId = this.crewOf(actor, asked);
    const { threadId, sides } = await this.uow.run(async (tx) => {
      const scope = await this.uow.row<ScopeRow>(tx, SCOPE_FOR_THREAD, [scopeId, crewCompanyId]);
      if (scope === null || !mayOpen(actor, scope)) throw new AppError('not_found');
      if (scope.thread_id !== null) return { threadId: scope.thread_id, sides: null };
      const made = {
        scopeId,
        gcCompanyId: scope.company_id,
        crewCompanyId,
        subcontractId: scope.subcontract_id,
      };
      return { threadId: await this.insert(tx, made), sides: made };
    });
    if (sides !== null) this.tell(threadId, sides);
    return this.threads.one(actor, threadId);
  }

  private crewOf(actor: Actor, asked: string | undefined): string {
    if (actor.company === null) throw new AppError('forbidden');
    const isCrew = actor.company.kind === 'cutting_contractor';
    if (isCrew && asked !== undefined && asked !== actor.company.id) {
      throw AppError.field('crewCompanyId', 'A crew opens its own thread');
    }
    if (!isCrew && asked === undefined) throw AppError.field('crewCompanyId', 'Say with which bidder');
    return isCrew ? actor.company.id : (asked ?? '');
  }

  /** Two people pressing at once get one thread. */
  private async insert(tx: Tx, sides: Sides): Promise<string> {
    await this.uow.rows(tx, INSERT_THREAD, values(sides));
    const row = await this.uow.row<{ id: string }>(tx, THREAD_OF_CREW, [sides.scopeId, sides.crewCompanyId]);
    if (row === null) throw new Error('a thread was neither made nor found');
    return row.id;
  }

  private tell(threadId: string, { gcCompanyId, crewCompanyId }: Sides): void {
    const to = [rooms.company(gcCompanyId), rooms.company(crewCompanyId)];
    this.hints.emit(to, { topic: 'thread', threadId, seq: 0 });
  }
}

const values = ({ scopeId, gcCompanyId, crewCompanyId, subcontractId }: Sides): unknown[] => [
  newId(),
  scopeId,
  gcCompanyId,
  crewCompanyId,
  subcontractId,
];

function mayOpen(actor: Actor, scope: ScopeRow): boolean {
  const isKnown = scope.thread_id !== null || scope.has_bid || scope.subcontract_id !== null;
  if (actor.company?.kind === 'cutting_contractor') return isKnown || ASKABLE.includes(scope.status);
  return scope.company_id === actor.company?.id && isKnown;
}
