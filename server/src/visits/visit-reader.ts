import { Injectable } from '@nestjs/common';
import type { Actor } from '@kerfyard/common/people';
import type { VisitsQuery, VisitView } from '@kerfyard/common/visits';
import { MoneyReader } from '../payments/money-reader.ts';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { VISIT_BY_ID, VISITS_OF_COMPANY, VISITS_OF_SUBCONTRACT } from './visit.queries.ts';
import { presentVisit, type VisitRow } from './visit.presenter.ts';

/** Reads visits, always in two queries: the rows, and which of their lines are paid for. */
@Injectable()
export class VisitReader {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly money: MoneyReader,
  ) {}

  /** The own company's visits of a span, of both its sides, by time. */
  async ofCompany(actor: Actor, { from, to }: VisitsQuery): Promise<VisitView[]> {
    if (actor.company === null) throw new AppError('forbidden');
    return this.present(await this.uow.rows<VisitRow>(null, VISITS_OF_COMPANY, [actor.company.id, from, to]));
  }

  /** All visits of a subcontract, cancelled ones too, as they were proposed. The caller has checked access. */
  async ofSubcontract(subcontractId: string): Promise<VisitView[]> {
    return this.present(await this.uow.rows<VisitRow>(null, VISITS_OF_SUBCONTRACT, [subcontractId]));
  }

  /** The caller has checked access. */
  async one(visitId: string): Promise<VisitView> {
    const [view] = await this.present(await this.uow.rows<VisitRow>(null, VISIT_BY_ID, [visitId]));
    if (view === undefined) throw new AppError('not_found');
    return view;
  }

  private async present(rows: readonly VisitRow[]): Promise<VisitView[]> {
    const paidFor = await this.money.paidForLineIds([...new Set(rows.map((row) => row.subcontract_id))]);
    return rows.map((row) => presentVisit(row, paidFor));
  }
}
