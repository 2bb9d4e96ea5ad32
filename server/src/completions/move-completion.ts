import { Injectable } from '@nestjs/common';
import type { CompletionView } from '@kerfyard/common/completions';
import { may, type Actor, type PermissionName } from '@kerfyard/common/people';
import { Audit } from '../platform/audit/audit.ts';
import type { Origin } from '../platform/auth/access.decorators.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { Mailer } from '../platform/mail/mailer.ts';
import { SubcontractEvents } from '../subcontracts/subcontract-events.ts';
import { SubcontractReader, type OwnSubcontract } from '../subcontracts/subcontract-reader.ts';
import {
  ACCEPT_COMPLETION,
  FREE_COMPLETION_LINES,
  SUBCONTRACT_OF_COMPLETION,
  WITHDRAW_COMPLETION,
} from './completion.queries.ts';
import { CompletionReader } from './completion-reader.ts';

interface Move {
  actor: Actor;
  origin: Origin;
  completionId: string;
  action: string;
  permission: PermissionName;
}

/** The general contractor accepts a completion, or the crew takes it back. Releasing the money is not done here. */
@Injectable()
export class MoveCompletion {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly subcontracts: SubcontractReader,
    private readonly events: SubcontractEvents,
    private readonly completions: CompletionReader,
    private readonly audit: Audit,
    private readonly mailer: Mailer,
  ) {}

  async accept(actor: Actor, origin: Origin, completionId: string): Promise<CompletionView> {
    const move = {
      actor,
      origin,
      completionId,
      action: 'completion.accepted',
      permission: 'completion.accept',
    } as const;
    return this.run(move, async (tx, subcontract) => {
      await this.moved(tx, ACCEPT_COMPLETION, [completionId, actor.userId]);
      // The crew hears that it was accepted; those who may release hear that it is theirs to do.
      await this.mailer.toCompany(tx, 'completion_accepted', subcontract.crew.id, 'completion.submit', {
        completionId,
      });
      await this.mailer.toCompany(tx, 'release_due', subcontract.gc.id, 'money.release', { completionId });
    });
  }

  async withdraw(actor: Actor, origin: Origin, completionId: string): Promise<CompletionView> {
    const move = {
      actor,
      origin,
      completionId,
      action: 'completion.withdrawn',
      permission: 'completion.submit',
    } as const;
    return this.run(move, async (tx) => {
      await this.moved(tx, WITHDRAW_COMPLETION, [completionId]);
      await this.uow.rows(tx, FREE_COMPLETION_LINES, [completionId]);
    });
  }

  private async run(
    { actor, origin, completionId, action, permission }: Move,
    work: (tx: Tx, subcontract: OwnSubcontract) => Promise<void>,
  ): Promise<CompletionView> {
    const change = await this.uow.run(async (tx) => {
      const parent = await this.uow.row<{ subcontract_id: string }>(tx, SUBCONTRACT_OF_COMPLETION, [
        completionId,
      ]);
      if (parent === null) throw new AppError('not_found');
      const subcontract = await this.subcontracts.lockForActor(tx, actor, parent.subcontract_id);
      if (!may(actor, permission)) throw new AppError('forbidden');
      await work(tx, subcontract);
      await this.audit.write(tx, {
        actor,
        origin,
        action,
        subject: { type: 'completion', id: completionId },
        detail: { subcontractId: subcontract.id },
      });
      return this.events.bump(tx, subcontract.id);
    });
    this.events.tell(change);
    return this.completions.one(completionId);
  }

  /** A conditional update that must have found its row in the state it starts from. */
  private async moved(tx: Tx, sql: string, bind: readonly unknown[]): Promise<void> {
    if ((await this.uow.row(tx, sql, bind)) === null) throw new AppError('illegal_move');
  }
}
