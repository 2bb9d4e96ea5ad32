import { Injectable } from '@nestjs/common';
import type { Page } from '@kerfyard/common/api';
import type { Actor } from '@kerfyard/common/people';
import type { CutLine } from '@kerfyard/common/scopes';
import type { SubcontractListItem, SubcontractStatus, WorkQuery } from '@kerfyard/common/subcontracts';
import { MoneyReader } from '../payments/money-reader.ts';
import { toInstant } from '../platform/database/codecs.ts';
import { readCursor, toPage } from '../platform/database/page-cursor.ts';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { SUBCONTRACTS_OF_COMPANY } from './subcontract.queries.ts';
import { subcontractNumber } from './subcontract-row.ts';

interface Row {
  id: string;
  number: string;
  status: SubcontractStatus;
  created_at: Date;
  gc_company_id: string;
  gc_name: string;
  crew_company_id: string;
  crew_name: string;
  title: string;
  city: string;
  state: string;
  time_zone: string;
  cuts: CutLine[];
  next_visit_at: Date | null;
}

/** The own company's subcontracts, both as general contractor and as crew, newest first. Two queries a page. */
@Injectable()
export class ListSubcontracts {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly money: MoneyReader,
  ) {}

  /** @throws AppError 403 for staff, who stand outside companies */
  async page(actor: Actor, query: WorkQuery): Promise<Page<SubcontractListItem>> {
    if (actor.company === null) throw new AppError('forbidden');
    const after = readCursor(query.cursor);
    const rows = await this.uow.rows<Row>(null, SUBCONTRACTS_OF_COMPANY, [
      actor.company.id,
      query.status ?? null,
      after?.at ?? null,
      after?.id ?? null,
      query.limit + 1,
    ]);
    const money = await this.money.moneyLine(rows.slice(0, query.limit).map((row) => row.id));
    return toPage(rows, query.limit, {
      key: (row) => ({ at: row.created_at, id: row.id }),
      item: (row) => {
        const line = money.get(row.id);
        if (line === undefined) throw new Error('a subcontract without its money line');
        return {
          id: row.id,
          number: subcontractNumber(row.number),
          title: row.title,
          status: row.status,
          gc: { id: row.gc_company_id, name: row.gc_name },
          crew: { id: row.crew_company_id, name: row.crew_name },
          city: row.city,
          state: row.state,
          timeZone: row.time_zone,
          cuts: row.cuts,
          money: line,
          nextVisitAt: toInstant(row.next_visit_at),
        };
      },
    });
  }
}
