import { Injectable } from '@nestjs/common';
import type { CompletionView, SubmitCompletion as SubmitInput } from '@kerfyard/common/completions';
import type { Actor } from '@kerfyard/common/people';
import type { VisitStatus } from '@kerfyard/common/visits';
import { FilesService } from '../files/files.service.ts';
import { Audit } from '../platform/audit/audit.ts';
import type { Origin } from '../platform/auth/access.decorators.ts';
import { Clock } from '../platform/clock/clock.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { Mailer } from '../platform/mail/mailer.ts';
import { endOfDayAfter } from '../subcontracts/site-days.ts';
import { SubcontractEvents } from '../subcontracts/subcontract-events.ts';
import { SubcontractReader, type OwnSubcontract } from '../subcontracts/subcontract-reader.ts';
import { checkAsCut } from './as-cut.ts';
import {
  INSERT_COMPLETION,
  INSERT_COMPLETION_LINES,
  INSERT_COMPLETION_PHOTOS,
  SUBCONTRACT_OF_COMPLETION,
  VISIT_FOR_COMPLETION,
} from './completion.queries.ts';
import { CompletionReader } from './completion-reader.ts';

interface VisitRow {
  subcontract_id: string;
  status: VisitStatus;
  sov_line_ids: string[];
}

/** The crew says what was cut, with photos, and thereby asks for the money of those lines. */
@Injectable()
export class SubmitCompletion {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly subcontracts: SubcontractReader,
    private readonly events: SubcontractEvents,
    private readonly completions: CompletionReader,
    private readonly files: FilesService,
    private readonly clock: Clock,
    private readonly audit: Audit,
    private readonly mailer: Mailer,
  ) {}

  /** The same id again answers with the completion as it is. */
  async submit(actor: Actor, origin: Origin, input: SubmitInput): Promise<CompletionView> {
    const change = await this.uow.run(async (tx) => {
      const visit = await this.uow.row<VisitRow>(tx, VISIT_FOR_COMPLETION, [input.visitId]);
      if (visit === null) throw new AppError('not_found');
      const subcontract = await this.subcontracts.lockForActor(tx, actor, visit.subcontract_id);
      const known = await this.uow.row<{ subcontract_id: string }>(tx, SUBCONTRACT_OF_COMPLETION, [input.id]);
      if (known !== null) {
        if (known.subcontract_id !== subcontract.id) throw new AppError('key_reused');
        return null;
      }
      await this.check(tx, actor, input, subcontract);
      await this.insert(tx, actor, input, subcontract);
      await this.mailer.toCompany(tx, 'payment_asked', subcontract.gc.id, 'completion.accept', {
        completionId: input.id,
      });
      await this.audit.write(tx, {
        actor,
        origin,
        action: 'completion.submitted',
        subject: { type: 'completion', id: input.id },
        detail: { subcontractId: subcontract.id, visitId: input.visitId, lines: input.sovLineIds.length },
      });
      return this.events.bump(tx, subcontract.id);
    });
    if (change !== null) this.events.tell(change);
    return this.completions.one(input.id);
  }

  private async check(tx: Tx, actor: Actor, input: SubmitInput, subcontract: OwnSubcontract): Promise<void> {
    // Read again: the lock is held now, and the visit moves only under it.
    const visit = await this.uow.row<VisitRow>(tx, VISIT_FOR_COMPLETION, [input.visitId]);
    if (visit === null || !['on_site', 'finished'].includes(visit.status)) throw new AppError('illegal_move');
    const ofVisit = new Set(visit.sov_line_ids);
    const fields = checkAsCut(input, { lines: subcontract.sov.filter((line) => ofVisit.has(line.id)) });
    if (fields.length > 0) throw new AppError('invalid_input', { fields });
    if (new Set(input.photoIds).size !== input.photoIds.length) {
      throw AppError.field('photoIds', 'Each photo once');
    }
    await this.files.requireOwn(tx, {
      companyId: actor.company?.id ?? '',
      fileIds: input.photoIds,
      field: 'photoIds',
      kinds: ['photo'],
    });
  }

  private async insert(tx: Tx, actor: Actor, input: SubmitInput, subcontract: OwnSubcontract): Promise<void> {
    const now = await this.clock.now(tx);
    const row = await this.uow.row(tx, INSERT_COMPLETION, [
      input.id,
      subcontract.id,
      input.visitId,
      JSON.stringify(input.asCut),
      input.note,
      actor.userId,
      now,
      endOfDayAfter(now, subcontract.answerDays, subcontract.timeZone),
    ]);
    if (row === null) throw new AppError('key_reused');
    await this.uow.rows(tx, INSERT_COMPLETION_LINES, [input.id, input.sovLineIds]);
    await this.uow.rows(tx, INSERT_COMPLETION_PHOTOS, [input.id, input.photoIds]);
  }
}
