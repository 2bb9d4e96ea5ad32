import { Injectable } from '@nestjs/common';
import type { Page } from '@kerfyard/common/api';
import { may, type Actor } from '@kerfyard/common/people';
import type { OpenScopesQuery, OwnScopesQuery, OwnScopeView, ScopeCardView } from '@kerfyard/common/scopes';
import { OwnMarks } from '../bids/own-marks.ts';
import { readCursor, toPage } from '../platform/database/page-cursor.ts';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { OPEN_SCOPES } from './open-scopes.queries.ts';
import { readOpenScopesCursor, writeOpenScopesCursor } from './open-scopes-cursor.ts';
import { cellsWithin, milesToChord } from './place.ts';
import { requireCompany } from './require-company.ts';
import { ScopeAccess, type Yard } from './scope-access.ts';
import { toCard, toOwnScope, type CardRow, type OwnScopeRow } from './scope-presenter.ts';
import { ScopeReader } from './scope-reader.ts';
import { OWN_SCOPES } from './scope-views.queries.ts';

/** The two lists of scopes, each by a fixed number of statements whatever the number of rows. */
@Injectable()
export class ScopeLists {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly access: ScopeAccess,
    private readonly reader: ScopeReader,
    private readonly marks: OwnMarks,
  ) {}

  /** A general contractor's own scopes, the last touched first. */
  async own(actor: Actor, query: OwnScopesQuery): Promise<Page<OwnScopeView>> {
    const company = requireCompany(actor, 'general_contractor');
    const after = readCursor(query.cursor);
    const rows = await this.uow.rows<OwnScopeRow>(null, OWN_SCOPES, [
      company.id,
      query.status ?? null,
      after?.at ?? null,
      after?.id ?? null,
      query.limit + 1,
    ]);
    return toPage(rows, query.limit, {
      key: (row) => ({ at: row.updated_at, id: row.id }),
      item: toOwnScope,
    });
  }

  /**
   * Open scopes as cards for a crew.
   * @throws AppError profile_incomplete when distances are asked for and there is no yard to measure from
   */
  async open(actor: Actor, query: OpenScopesQuery): Promise<Page<ScopeCardView>> {
    const company = requireCompany(actor, 'cutting_contractor');
    const after = readOpenScopesCursor(query.sort, query.cursor);
    const yard = await this.access.yard(company.id);
    requireYard(yard, query);
    const rows = await this.uow.rows<CardRow>(null, OPEN_SCOPES[query.sort], [
      yard.place,
      query.method ?? null,
      query.withinMiles === undefined ? null : milesToChord(query.withinMiles),
      query.dueBefore ?? null,
      query.minInchFeet ?? null,
      query.maxInchFeet ?? null,
      query.limit + 1,
      after === null ? null : toSortParameter(query.sort, after.value),
      after?.id ?? null,
      yard.position === null || query.withinMiles === undefined
        ? null
        : cellsWithin(yard.position, query.withinMiles),
    ]);
    const shown = rows.slice(0, query.limit);
    const [records, ownBids] = await Promise.all([
      this.reader.records(shown.map((row) => row.company_id)),
      this.ownBids(actor, company.id, shown),
    ]);
    const last = rows.length > query.limit ? shown.at(-1) : undefined;
    return {
      items: shown.map((row) =>
        toCard(row, { record: records.get(row.company_id), ownBid: ownBids.get(row.id) }),
      ),
      nextCursor:
        last === undefined
          ? null
          : writeOpenScopesCursor(query.sort, { value: sortValue(query.sort, last), id: last.id }),
    };
  }

  /** Own bids are the office's business, not the field's. */
  private async ownBids(actor: Actor, companyId: string, rows: readonly CardRow[]) {
    const ids = may(actor, 'bid.read') ? rows.map((row) => row.id) : [];
    return this.marks.of(companyId, ids);
  }
}

function requireYard(yard: Yard, query: OpenScopesQuery): void {
  const asksDistance = query.withinMiles !== undefined || query.sort === 'nearest';
  if (!asksDistance || yard.place !== null) return;
  throw new AppError('profile_incomplete', {
    fields: [{ path: 'yard', message: 'Say where your trucks start to measure distances' }],
  });
}

function sortValue(sort: OpenScopesQuery['sort'], row: CardRow): number {
  const values: Record<OpenScopesQuery['sort'], () => number | undefined | null> = {
    newest: () => row.published_at?.getTime(),
    due: () => row.due_at?.getTime(),
    nearest: () => row.chord,
    largest: () => row.inch_feet,
  };
  return values[sort]() ?? 0;
}

function toSortParameter(sort: OpenScopesQuery['sort'], value: number): Date | number {
  return sort === 'newest' || sort === 'due' ? new Date(value) : value;
}
