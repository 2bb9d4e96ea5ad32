import { Injectable } from '@nestjs/common';
import { readFile } from 'node:fs/promises';
import type { FileKind, UploadResult } from '@kerfyard/common/files';
import type { Actor } from '@kerfyard/common/people';
import type { Origin } from '../platform/auth/access.decorators.ts';
import { Audit } from '../platform/audit/audit.ts';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { Storage } from '../platform/storage/storage.ts';
import { cleanFileName } from './file-name.ts';
import { FilesService } from './files.service.ts';
import { refusalWords } from './files.words.en.ts';
import type { IncomingFile } from './incoming-files.ts';
import { prepareFile, type Incoming, type PreparedFile } from './prepare-file.ts';
import { Refusal } from './refusal.ts';
import { uploadLimits } from './upload.limits.ts';

/** Takes the files of one request: each is checked, stored and registered by itself, or refused with its reason. */
@Injectable()
export class UploadFiles {
  /** Decoding takes much memory, so that requests take turns. */
  private turn: Promise<unknown> = Promise.resolve();

  constructor(
    private readonly uow: UnitOfWork,
    private readonly storage: Storage,
    private readonly files: FilesService,
    private readonly audit: Audit,
  ) {}

  async run(
    actor: Actor,
    upload: { kind: FileKind; files: readonly IncomingFile[] },
    origin: Origin,
  ): Promise<UploadResult> {
    const ids: string[] = [];
    const refused: UploadResult['refused'] = [];
    for (const file of upload.files) {
      const name = cleanFileName(file.originalname);
      try {
        ids.push(await this.take(actor, { kind: upload.kind, name, file }, origin));
      } catch (error) {
        if (!(error instanceof Refusal)) throw error;
        refused.push({ name, code: error.code, message: error.message });
      }
    }
    const views = await this.files.views(ids);
    return { files: ids.flatMap((id) => views.get(id) ?? []), refused };
  }

  private async take(
    actor: Actor,
    { kind, name, file }: { kind: FileKind; name: string; file: IncomingFile },
    origin: Origin,
  ): Promise<string> {
    if (file.overLimit === 'too_many') throw new Refusal('too_many', refusalWords.tooMany);
    const { path } = file;
    if (path === null) throw new Refusal('too_large', refusalWords.tooLarge);
    return this.keep(actor, { kind, name, declaredType: file.mimetype, read: () => readFile(path) }, origin);
  }

  /**
   * Check, store and register one file.
   * @returns its id
   * @throws Refusal
   */
  async keep(
    actor: Actor,
    { kind, name, declaredType, read }: Omit<Incoming, 'bytes'> & { read: () => Promise<Buffer> },
    origin: Origin,
  ): Promise<string> {
    const prepared = await this.inTurn(async () =>
      prepareFile({ kind, name, declaredType, bytes: await read() }),
    );
    const { sha256 } = await this.storage.put(prepared.bytes);
    const thumbnail = prepared.thumbnail === null ? null : await this.storage.put(prepared.thumbnail);
    const thumbnailSha256 = thumbnail?.sha256 ?? null;
    return this.register(actor, { kind, name, sha256, thumbnailSha256, prepared }, origin);
  }

  private inTurn(prepare: () => Promise<PreparedFile>): Promise<PreparedFile> {
    const result = this.turn.then(prepare);
    this.turn = result.catch(() => undefined);
    return result;
  }

  private async register(
    actor: Actor,
    file: {
      kind: FileKind;
      name: string;
      sha256: string;
      thumbnailSha256: string | null;
      prepared: PreparedFile;
    },
    origin: Origin,
  ): Promise<string> {
    const companyId = actor.company?.id;
    if (companyId === undefined) throw new AppError('forbidden');
    const { bytes, ...known } = file.prepared;
    return this.uow.run(async (tx) => {
      const held = await this.files.lockedCompanyBytes(tx, companyId);
      if (held + bytes.length > uploadLimits.companyBytes)
        throw new Refusal('too_large', refusalWords.noRoom);
      const id = await this.files.register(tx, {
        ...known,
        companyId,
        userId: actor.userId,
        kind: file.kind,
        name: file.name,
        bytes: bytes.length,
        sha256: file.sha256,
        thumbnailSha256: file.thumbnailSha256,
      });
      const detail = { kind: file.kind, type: known.type, bytes: bytes.length, sha256: file.sha256 };
      await this.audit.write(tx, {
        actor,
        action: 'file.upload',
        subject: { type: 'file', id },
        detail,
        origin,
      });
      return id;
    });
  }
}
