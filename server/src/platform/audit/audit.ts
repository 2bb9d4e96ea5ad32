import { Injectable } from '@nestjs/common';
import type { Actor } from '@kerfyard/common/people';
import type { Origin } from '../auth/access.decorators.ts';
import { UnitOfWork, type Tx } from '../database/unit-of-work.ts';
import { INSERT_AUDIT_EVENT } from './audit.queries.ts';

export interface AuditEvent {
  actor: Actor | null;
  action: string;
  subject: { type: string; id: string };
  /** Before and after, without secrets and without any amount of a sealed bid. */
  detail?: Record<string, unknown>;
  origin?: Origin;
}

/** Writes who did what to what, in the transaction of the deed. */
@Injectable()
export class Audit {
  constructor(private readonly uow: UnitOfWork) {}

  async write(tx: Tx, event: AuditEvent): Promise<void> {
    await this.uow.rows(tx, INSERT_AUDIT_EVENT, [
      event.actor?.userId ?? null,
      event.actor?.company?.id ?? null,
      event.action,
      event.subject.type,
      event.subject.id,
      JSON.stringify(event.detail ?? {}),
      event.origin?.ip ?? null,
      event.origin?.requestId ?? null,
    ]);
  }
}
