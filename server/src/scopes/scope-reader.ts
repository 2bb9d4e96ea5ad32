import { Injectable } from '@nestjs/common';
import type { ScopeBody, ScopeTotals } from '@kerfyard/common/scopes';
import { toNumber } from '../platform/database/codecs.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { GC_RECORDS, LOCK_SCOPE, PUBLISHED } from './scope-core.queries.ts';
import type { PublishedScope, ScopeRow } from './scope.rows.ts';

type PublishedRow = ScopeRow & { read_revision: number; read_body: ScopeBody; read_totals: ScopeTotals };

export interface GcRecord {
  due: number;
  awarded: number;
}

/** Reads scopes for other features. Who may see one is the caller's question. */
@Injectable()
export class ScopeReader {
  constructor(private readonly uow: UnitOfWork) {}

  /**
   * A published revision, the newest unless one is named.
   * @throws AppError not_found when there is no such scope or revision
   */
  async published(
    scopeId: string,
    revision: number | null = null,
    tx: Tx | null = null,
  ): Promise<PublishedScope> {
    const row = await this.uow.row<PublishedRow>(tx, PUBLISHED, [scopeId, revision]);
    if (row === null) throw new AppError('not_found');
    const { read_revision: read, read_body: body, read_totals: totals, ...scope } = row;
    return { scope, revision: read, body, totals };
  }

  /**
   * Lock the scope's row until the transaction ends. A deadline is compared in a statement after this one.
   * @throws AppError not_found when there is no such scope
   */
  async lock(tx: Tx, scopeId: string): Promise<ScopeRow> {
    const row = await this.uow.row<ScopeRow>(tx, LOCK_SCOPE, [scopeId]);
    if (row === null) throw new AppError('not_found');
    return row;
  }

  /** For each general contractor, how many scopes came due and how many it awarded. */
  async records(companyIds: readonly string[]): Promise<Map<string, GcRecord>> {
    const rows = await this.uow.rows<{ company_id: string; due: string; awarded: string }>(null, GC_RECORDS, [
      [...new Set(companyIds)],
    ]);
    return new Map(
      rows.map((row) => [row.company_id, { due: toNumber(row.due), awarded: toNumber(row.awarded) }]),
    );
  }
}
