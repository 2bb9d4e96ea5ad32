import { Injectable } from '@nestjs/common';
import type { AcceptedFileType, FileKind, FileView } from '@kerfyard/common/files';
import { toInstant, toNumber } from '../platform/database/codecs.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { newId } from '../platform/ids/ids.ts';
import { COMPANY_BYTES, FILES_BY_ID, INSERT_FILE, LOCK_COMPANY_SPACE } from './file.queries.ts';

export interface FileRow {
  id: string;
  company_id: string;
  kind: FileKind;
  name: string;
  type: AcceptedFileType;
  bytes: string;
  sha256: string;
  thumbnail_sha256: string | null;
  width: number | null;
  height: number | null;
  pages: number | null;
  taken_at: Date | null;
  created_at: Date;
}

/** What is known of stored bytes; those that `Storage.put` has answered for. */
export interface NewFile {
  companyId: string;
  userId: string;
  kind: FileKind;
  name: string;
  type: AcceptedFileType;
  bytes: number;
  sha256: string;
  /** Of what was sent; the same as `sha256` for what the server made itself. */
  originalSha256: string;
  thumbnailSha256?: string | null;
  width?: number | null;
  height?: number | null;
  pages?: number | null;
  takenAt?: Date | null;
}

/** The rows of files: registering stored bytes, showing them, and checking whose they are. */
@Injectable()
export class FilesService {
  constructor(private readonly uow: UnitOfWork) {}

  /** Make stored bytes a file of a company. */
  async register(tx: Tx, file: NewFile): Promise<string> {
    const id = newId();
    await this.uow.rows(tx, INSERT_FILE, [
      id,
      file.companyId,
      file.userId,
      file.kind,
      file.name,
      file.type,
      file.bytes,
      file.sha256,
      file.originalSha256,
      file.thumbnailSha256 ?? null,
      file.width ?? null,
      file.height ?? null,
      file.pages ?? null,
      file.takenAt ?? null,
    ]);
    return id;
  }

  /** Bytes this company holds; later uploads of it wait until this transaction ends. */
  async lockedCompanyBytes(tx: Tx, companyId: string): Promise<number> {
    await this.uow.rows(tx, LOCK_COMPANY_SPACE, [companyId]);
    const row = await this.uow.row<{ bytes: string }>(tx, COMPANY_BYTES, [companyId]);
    return toNumber(row?.bytes ?? 0);
  }

  /** Rows by id, in one statement; unknown ids are left out. */
  async rows(tx: Tx | null, fileIds: readonly string[]): Promise<Map<string, FileRow>> {
    if (fileIds.length === 0) return new Map();
    const rows = await this.uow.rows<FileRow>(tx, FILES_BY_ID, [fileIds]);
    return new Map(rows.map((row) => [row.id, row]));
  }

  /** What people see of files, by id. Who may see them is the caller's question. Captions belong to where a file hangs. */
  async views(fileIds: readonly string[], tx: Tx | null = null): Promise<Map<string, FileView>> {
    const rows = await this.rows(tx, fileIds);
    return new Map([...rows].map(([id, row]) => [id, toView(row)]));
  }

  /**
   * Demand that files are the company's own before they are shown to others.
   * @throws AppError 422 naming each `<field>.<index>` that is unknown, foreign or of another kind
   */
  async requireOwn(
    tx: Tx,
    wanted: { companyId: string; fileIds: readonly string[]; field: string; kinds?: readonly FileKind[] },
  ): Promise<void> {
    const rows = await this.rows(tx, wanted.fileIds);
    const fields = wanted.fileIds.flatMap((id, index) => {
      const row = rows.get(id);
      const isFine =
        row?.company_id === wanted.companyId &&
        (wanted.kinds === undefined || wanted.kinds.includes(row.kind));
      return isFine
        ? []
        : [{ path: `${wanted.field}.${index}`, message: 'This file is not there. Add it again.' }];
    });
    if (fields.length > 0) throw new AppError('invalid_input', { fields });
  }
}

function toView(row: FileRow): FileView {
  return {
    id: row.id,
    kind: row.kind,
    name: row.name,
    caption: '',
    type: row.type,
    bytes: toNumber(row.bytes),
    sha256: row.sha256,
    width: row.width,
    height: row.height,
    pages: row.pages,
    takenAt: toInstant(row.taken_at),
    uploadedAt: toInstant(row.created_at),
  };
}
