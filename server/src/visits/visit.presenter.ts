import type { VisitStatus, VisitView, VisitWindow } from '@kerfyard/common/visits';
import { toInstant } from '../platform/database/codecs.ts';
import { subcontractNumber } from '../subcontracts/subcontract-row.ts';

/** A visit's row with the names beside it, as the driver gives it. */
export interface VisitRow {
  id: string;
  subcontract_id: string;
  subcontract_number: string;
  title: string;
  status: VisitStatus;
  crew_id: string;
  crew_name: string;
  truck_id: string;
  truck_name: string;
  gc_company_id: string;
  gc_name: string;
  crew_company_id: string;
  crew_company_name: string;
  city: string;
  state: string;
  time_zone: string;
  windows: VisitWindow[];
  starts_at: Date | null;
  ends_at: Date | null;
  note: string;
  started_at: Date | null;
  finished_at: Date | null;
  cancel_reason: string | null;
  sov_line_ids: string[] | null;
}

/** @param paidFor ids of lines whose money is set aside, or was and has been released */
export function presentVisit(row: VisitRow, paidFor: ReadonlySet<string>): VisitView {
  const sovLineIds = row.sov_line_ids ?? [];
  return {
    id: row.id,
    subcontractId: row.subcontract_id,
    subcontractNumber: subcontractNumber(row.subcontract_number),
    title: row.title,
    status: row.status,
    crew: { id: row.crew_id, name: row.crew_name },
    truck: { id: row.truck_id, name: row.truck_name },
    gc: { id: row.gc_company_id, name: row.gc_name },
    cuttingContractor: { id: row.crew_company_id, name: row.crew_company_name },
    city: row.city,
    state: row.state,
    timeZone: row.time_zone,
    sovLineIds,
    windows: row.status === 'proposed' ? row.windows : [],
    window:
      row.starts_at === null || row.ends_at === null
        ? null
        : { startsAt: toInstant(row.starts_at), endsAt: toInstant(row.ends_at) },
    note: row.note,
    linesSetAside: sovLineIds.every((id) => paidFor.has(id)),
    startedAt: toInstant(row.started_at),
    finishedAt: toInstant(row.finished_at),
    cancelReason: row.cancel_reason,
  };
}
