import type { ReleaseStatus, ReleaseView } from '@kerfyard/common/payments';

export interface ReleaseRow {
  id: string;
  subcontract_id: string;
  completion_id: string;
  status: ReleaseStatus;
  blocked_because: 'capability' | 'balance' | null;
  gross_cents: string;
  retainage_cents: string;
  fee_cents: string;
  crew_cents: string;
  posted_at: Date;
  transferred_at: Date | null;
}

/** What both sides see of a release, in cents. */
export function presentRelease(row: ReleaseRow): ReleaseView {
  return {
    id: row.id,
    completionId: row.completion_id,
    status: row.status,
    blockedBecause: row.blocked_because,
    grossCents: Number(row.gross_cents),
    retainageCents: Number(row.retainage_cents),
    feeCents: Number(row.fee_cents),
    crewCents: Number(row.crew_cents),
    postedAt: row.posted_at.toISOString(),
    transferredAt: row.transferred_at?.toISOString() ?? null,
  };
}
