import { Injectable } from '@nestjs/common';
import { rankedRules } from '@kerfyard/common/bids';
import type { BiddingMode } from '@kerfyard/common/scopes';
import { toNumber } from '../platform/database/codecs.ts';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { OWN_MARKS } from './bid-core.queries.ts';

export interface OwnMark {
  mode: BiddingMode | null;
  status: 'draft' | 'in' | 'withdrawn' | 'opened';
  rank: number | null;
  of: number | null;
}

interface MarkRow {
  scope_id: string;
  mode: BiddingMode | null;
  status: 'in' | 'withdrawn' | 'opened' | null;
  has_draft: boolean;
  rank: string | null;
  out_of: string | null;
}

/** Where a crew's own bids on some scopes stand, in one statement. */
@Injectable()
export class OwnMarks {
  constructor(private readonly uow: UnitOfWork) {}

  async of(companyId: string, scopeIds: readonly string[]): Promise<Map<string, OwnMark>> {
    if (scopeIds.length === 0) return new Map();
    const rows = await this.uow.rows<MarkRow>(null, OWN_MARKS, [companyId, scopeIds]);
    return new Map(
      rows.flatMap((row) => {
        const status = row.status ?? (row.has_draft ? 'draft' : null);
        return status === null
          ? []
          : [[row.scope_id, { mode: row.mode, status, ...shownRank(row) }] as const];
      }),
    );
  }
}

/** With fewer than three bids a rank would give the rival's price away by trying. */
export function shownRank(row: { rank: string | null; out_of: string | null }): {
  rank: number | null;
  of: number | null;
} {
  const of = toNumber(row.out_of);
  if (of === null || of < rankedRules.minBidsForRank) return { rank: null, of: null };
  return { rank: toNumber(row.rank), of };
}
