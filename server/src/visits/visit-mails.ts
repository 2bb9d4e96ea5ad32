import { Injectable, type OnModuleInit } from '@nestjs/common';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import type { MailContent } from '../platform/mail/mail-content.ts';
import { Mailer } from '../platform/mail/mailer.ts';
import { workPath } from '../subcontracts/work-path.ts';
import { subcontractNumber } from '../subcontracts/subcontract-row.ts';
import { windowWords } from './window-words.ts';
import { VISIT_BY_ID } from './visit.queries.ts';
import type { VisitRow } from './visit.presenter.ts';
import { visitMailWords as words } from './visits.words.en.ts';

/** Letters about visits; each says nothing when the visit has moved on meanwhile. */
@Injectable()
export class VisitMails implements OnModuleInit {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly mailer: Mailer,
  ) {}

  onModuleInit(): void {
    this.mailer.register('window_proposed', ({ visitId }) => this.build(visitId, 'proposed', proposed));
    this.mailer.register('window_confirmed', ({ visitId }) => this.build(visitId, 'confirmed', confirmed));
    this.mailer.register('visit_cancelled', ({ visitId }) => this.build(visitId, 'cancelled', cancelled));
  }

  private async build(
    visitId: unknown,
    status: VisitRow['status'],
    write: (visit: VisitRow) => MailContent,
  ): Promise<MailContent | null> {
    const visit = await this.uow.row<VisitRow>(null, VISIT_BY_ID, [visitId]);
    return visit === null || visit.status !== status ? null : write(visit);
  }
}

function proposed(visit: VisitRow): MailContent {
  const windows = visit.windows.map((window) => windowWords(window, visit.time_zone));
  return {
    subject: words.proposed.subject(subcontractNumber(visit.subcontract_number)),
    lines: words.proposed.lines(visit.crew_company_name, visit.title, windows),
    action: { label: words.proposed.action, path: workPath(visit.subcontract_id) },
  };
}

function confirmed(visit: VisitRow): MailContent {
  const window = booked(visit) ?? '';
  return {
    subject: words.confirmed.subject(subcontractNumber(visit.subcontract_number), window),
    lines: words.confirmed.lines(visit.gc_name, visit.title, window, visit.crew_name, visit.truck_name),
    action: { label: words.confirmed.action, path: workPath(visit.subcontract_id) },
  };
}

function cancelled(visit: VisitRow): MailContent {
  return {
    subject: words.cancelled.subject(subcontractNumber(visit.subcontract_number)),
    lines: words.cancelled.lines(visit.title, visit.cancel_reason ?? '', booked(visit)),
    action: { label: words.cancelled.action, path: workPath(visit.subcontract_id) },
  };
}

function booked({ starts_at, ends_at, time_zone }: VisitRow): string | null {
  if (starts_at === null || ends_at === null) return null;
  return windowWords({ startsAt: starts_at.toISOString(), endsAt: ends_at.toISOString() }, time_zone);
}
