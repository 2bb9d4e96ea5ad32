import { Injectable } from '@nestjs/common';
import { fileLimits, type FileView } from '@kerfyard/common/files';
import type { Actor } from '@kerfyard/common/people';
import type { ScopeStatus } from '@kerfyard/common/scopes';
import { FilesService } from '../files/files.service.ts';
import { toNumber } from '../platform/database/codecs.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { requireCompany } from './require-company.ts';
import {
  ATTACH_FILE,
  COUNT_OTHER_FILES,
  DETACH_FILE,
  LOCK_DRAFT,
  SCOPE_FILES,
} from './scope-draft.queries.ts';

/** Photos and drawings beside a scope: added and taken off while it is a draft. */
@Injectable()
export class ScopeFiles {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly files: FilesService,
  ) {}

  /**
   * Show one of the company's own files with the draft; again with another caption changes the caption.
   * @throws AppError 422 for an unknown or foreign file or one too many; illegal_move once published
   */
  async attach(
    actor: Actor,
    scopeId: string,
    input: { fileId: string; caption: string },
  ): Promise<FileView[]> {
    const company = requireCompany(actor, 'general_contractor');
    await this.uow.run(async (tx) => {
      await this.lockDraft(tx, scopeId, company.id);
      const own = (await this.files.rows(tx, [input.fileId])).get(input.fileId);
      if (own?.company_id !== company.id || own.kind === 'document') {
        throw AppError.field('fileId', 'This photo or drawing is not there. Add it again.');
      }
      const others = await this.uow.row<{ files: string; last: number }>(tx, COUNT_OTHER_FILES, [
        scopeId,
        input.fileId,
      ]);
      if (toNumber(others?.files ?? '0') >= fileLimits.maxFilesPerScope) {
        throw AppError.field('fileId', `At most ${fileLimits.maxFilesPerScope} photos and drawings`);
      }
      const position = (others?.last ?? 0) + 1;
      await this.uow.rows(tx, ATTACH_FILE, [scopeId, input.fileId, input.caption, position]);
    });
    return this.views(scopeId);
  }

  /** Take a file off the draft; one that is not there is no error. */
  async detach(actor: Actor, scopeId: string, fileId: string): Promise<void> {
    const company = requireCompany(actor, 'general_contractor');
    await this.uow.run(async (tx) => {
      await this.lockDraft(tx, scopeId, company.id);
      await this.uow.rows(tx, DETACH_FILE, [scopeId, fileId]);
    });
  }

  /** The scope's photos and drawings in order, with their captions. Who may see them is the caller's question. */
  async views(scopeId: string): Promise<FileView[]> {
    const links = await this.uow.rows<{ file_id: string; caption: string }>(null, SCOPE_FILES, [scopeId]);
    const views = await this.files.views(links.map((link) => link.file_id));
    return links.flatMap(({ file_id: id, caption }) => {
      const view = views.get(id);
      return view === undefined ? [] : [{ ...view, caption }];
    });
  }

  private async lockDraft(tx: Tx, scopeId: string, companyId: string): Promise<void> {
    const row = await this.uow.row<{ status: ScopeStatus }>(tx, LOCK_DRAFT, [scopeId, companyId]);
    if (row === null || row.status === 'discarded') throw new AppError('not_found');
    if (row.status !== 'draft') throw new AppError('illegal_move');
  }
}
