import type { CompanyView } from '@kerfyard/common/api';
import type { SubcontractStatus } from '@kerfyard/common/subcontracts';
import { toNumber } from '../platform/database/codecs.ts';

/** A subcontract's row with the names beside it, as the driver gives it. */
export interface SubcontractRow {
  id: string;
  number: string;
  scope_id: string;
  revision: number;
  bid_id: string;
  award_id: string;
  status: SubcontractStatus;
  total_cents: string;
  retainage_basis_points: number;
  fee_basis_points: number;
  answer_days: number;
  sign_by: Date;
  seq: string;
  created_at: Date;
  gc_company_id: string;
  gc_name: string;
  crew_company_id: string;
  crew_name: string;
  payouts_ready: boolean;
  document_file_id: string;
  document_sha256: string;
  signed_document_file_id: string | null;
  signed_document_sha256: string | null;
  title: string;
  city: string;
  state: string;
  time_zone: string;
}

export interface StoredFile {
  fileId: string;
  sha256: string;
}

/** A subcontract as features work with it. */
export interface Subcontract {
  id: string;
  /** "S-1007": the platform-wide human number. */
  number: string;
  scopeId: string;
  revision: number;
  bidId: string;
  awardId: string;
  status: SubcontractStatus;
  totalCents: number;
  retainageBasisPoints: number;
  feeBasisPoints: number;
  answerDays: number;
  signBy: Date;
  seq: number;
  gc: CompanyView;
  crew: CompanyView;
  payoutsReady: boolean;
  document: StoredFile;
  signedDocument: StoredFile | null;
  title: string;
  city: string;
  state: string;
  timeZone: string;
}

/** "S-1042": the number people say. */
export function subcontractNumber(number: string | number): string {
  return `S-${number}`;
}

export function toSubcontract(row: SubcontractRow): Subcontract {
  return {
    id: row.id,
    number: subcontractNumber(row.number),
    scopeId: row.scope_id,
    revision: row.revision,
    bidId: row.bid_id,
    awardId: row.award_id,
    status: row.status,
    totalCents: toNumber(row.total_cents),
    retainageBasisPoints: row.retainage_basis_points,
    feeBasisPoints: row.fee_basis_points,
    answerDays: row.answer_days,
    signBy: row.sign_by,
    seq: toNumber(row.seq),
    gc: { id: row.gc_company_id, name: row.gc_name },
    crew: { id: row.crew_company_id, name: row.crew_name },
    payoutsReady: row.payouts_ready,
    document: { fileId: row.document_file_id, sha256: row.document_sha256 },
    signedDocument:
      row.signed_document_file_id === null || row.signed_document_sha256 === null
        ? null
        : { fileId: row.signed_document_file_id, sha256: row.signed_document_sha256 },
    title: row.title,
    city: row.city,
    state: row.state,
    timeZone: row.time_zone,
  };
}

export interface SovRow {
  id: string;
  position: number;
  description: string;
  cut_ids: string[];
  amount_cents: string;
}

/** One line of the schedule of values. */
export interface SovLine {
  id: string;
  position: number;
  description: string;
  cutIds: string[];
  amountCents: number;
}

export function toSovLine(row: SovRow): SovLine {
  return {
    id: row.id,
    position: row.position,
    description: row.description,
    cutIds: row.cut_ids,
    amountCents: toNumber(row.amount_cents),
  };
}
