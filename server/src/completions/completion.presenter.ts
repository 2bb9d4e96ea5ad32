import type { AsCut, CompletionStatus, CompletionView } from '@kerfyard/common/completions';
import type { FileView } from '@kerfyard/common/files';
import { toInstant, toNumber } from '../platform/database/codecs.ts';

/** A completion's row with what hangs on it, as the driver gives it. */
export interface CompletionRow {
  id: string;
  subcontract_id: string;
  visit_id: string;
  status: CompletionStatus;
  as_cut: AsCut[];
  note: string;
  submitted_at: Date;
  accepted_at: Date | null;
  answer_by: Date;
  submitted_by_name: string;
  accepted_by_name: string | null;
  sov_line_ids: string[] | null;
  amount_cents: string;
  photo_ids: string[];
}

/** What both sides see of a completion; a whitelist. */
export function presentCompletion(row: CompletionRow, files: ReadonlyMap<string, FileView>): CompletionView {
  return {
    id: row.id,
    subcontractId: row.subcontract_id,
    visitId: row.visit_id,
    status: row.status,
    sovLineIds: row.sov_line_ids ?? [],
    amountCents: toNumber(row.amount_cents),
    asCut: row.as_cut,
    photos: row.photo_ids.flatMap((id) => files.get(id) ?? []),
    note: row.note,
    submittedBy: row.submitted_by_name,
    submittedAt: toInstant(row.submitted_at),
    acceptedBy: row.accepted_by_name,
    acceptedAt: toInstant(row.accepted_at),
    answerBy: toInstant(row.answer_by),
  };
}
