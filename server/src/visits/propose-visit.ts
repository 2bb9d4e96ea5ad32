import { Injectable } from '@nestjs/common';
import type { FieldIssue } from '@kerfyard/common/errors';
import type { Actor } from '@kerfyard/common/people';
import type { ProposeVisit as ProposeVisitInput, VisitView, VisitWindow } from '@kerfyard/common/visits';
import { Audit } from '../platform/audit/audit.ts';
import type { Origin } from '../platform/auth/access.decorators.ts';
import { Clock } from '../platform/clock/clock.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { Mailer } from '../platform/mail/mailer.ts';
import { SubcontractEvents } from '../subcontracts/subcontract-events.ts';
import { SubcontractReader, type OwnSubcontract } from '../subcontracts/subcontract-reader.ts';
import { INSERT_VISIT, INSERT_VISIT_LINES, SUBCONTRACT_OF_VISIT, UNITS_OF_COMPANY } from './visit.queries.ts';
import { VisitReader } from './visit-reader.ts';

/** The crew offers windows for a visit; one crew, one truck, some lines of the subcontract. */
@Injectable()
export class ProposeVisit {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly subcontracts: SubcontractReader,
    private readonly events: SubcontractEvents,
    private readonly visits: VisitReader,
    private readonly clock: Clock,
    private readonly audit: Audit,
    private readonly mailer: Mailer,
  ) {}

  /** The same id again answers with the visit as it is. */
  async propose(actor: Actor, origin: Origin, input: ProposeVisitInput): Promise<VisitView> {
    const change = await this.uow.run(async (tx) => {
      const subcontract = await this.subcontracts.lockForActor(tx, actor, input.subcontractId);
      const known = await this.uow.row<{ subcontract_id: string }>(tx, SUBCONTRACT_OF_VISIT, [input.id]);
      if (known !== null) {
        if (known.subcontract_id !== subcontract.id) throw new AppError('key_reused');
        return null;
      }
      if (subcontract.status !== 'active') throw new AppError('illegal_move');
      await this.check(tx, actor, input, subcontract);
      await this.insert(tx, actor, input, subcontract);
      await this.mailer.toCompany(tx, 'window_proposed', subcontract.gc.id, 'visit.confirm', {
        visitId: input.id,
      });
      await this.audit.write(tx, {
        actor,
        origin,
        action: 'visit.proposed',
        subject: { type: 'visit', id: input.id },
        detail: { subcontractId: subcontract.id, windows: input.windows.length },
      });
      return this.events.bump(tx, subcontract.id);
    });
    if (change !== null) this.events.tell(change, { visits: true });
    return this.visits.one(input.id);
  }

  /** All faults at once, each at its field. */
  private async check(
    tx: Tx,
    actor: Actor,
    input: ProposeVisitInput,
    subcontract: OwnSubcontract,
  ): Promise<void> {
    const fields: FieldIssue[] = [];
    const units = await this.uow.row<{ crew_id: string | null; truck_id: string | null }>(
      tx,
      UNITS_OF_COMPANY,
      [actor.company?.id, input.crewId, input.truckId],
    );
    if (units?.crew_id == null) fields.push({ path: 'crewId', message: 'Not a crew of your company' });
    if (units?.truck_id == null) fields.push({ path: 'truckId', message: 'Not a truck of your company' });
    const lines = new Set(subcontract.sov.map((line) => line.id));
    if (
      input.sovLineIds.some((id) => !lines.has(id)) ||
      new Set(input.sovLineIds).size !== input.sovLineIds.length
    ) {
      fields.push({ path: 'sovLineIds', message: 'Lines of this subcontract, each once' });
    }
    const now = (await this.clock.now(tx)).getTime();
    input.windows.forEach((window, index) => {
      if (Date.parse(window.startsAt) <= now) {
        fields.push({ path: `windows.${index}.startsAt`, message: 'In the future' });
      }
    });
    if (fields.length > 0) throw new AppError('invalid_input', { fields });
  }

  private async insert(
    tx: Tx,
    actor: Actor,
    input: ProposeVisitInput,
    subcontract: OwnSubcontract,
  ): Promise<void> {
    const row = await this.uow.row(tx, INSERT_VISIT, [
      input.id,
      subcontract.id,
      input.crewId,
      input.truckId,
      JSON.stringify(input.windows.map(inUtc)),
      subcontract.timeZone,
      input.note,
      actor.userId,
    ]);
    if (row === null) throw new AppError('key_reused');
    await this.uow.rows(tx, INSERT_VISIT_LINES, [input.id, input.sovLineIds]);
  }
}

function inUtc({ startsAt, endsAt }: VisitWindow): VisitWindow {
  return { startsAt: new Date(startsAt).toISOString(), endsAt: new Date(endsAt).toISOString() };
}
