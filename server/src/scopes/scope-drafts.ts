import { Injectable } from '@nestjs/common';
import type { Actor } from '@kerfyard/common/people';
import type { ScopeDraft, ScopeStatus } from '@kerfyard/common/scopes';
import { Audit } from '../platform/audit/audit.ts';
import type { Origin } from '../platform/auth/access.decorators.ts';
import { toNumber } from '../platform/database/codecs.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { requireCompany } from './require-company.ts';
import { faceColumns, readDraftFace } from './draft-face.ts';
import {
  DISCARD_DRAFT,
  DRAFT_STATE,
  INSERT_DRAFT,
  NEXT_NUMBER,
  SAVE_DRAFT,
  SCOPE_OWNER,
} from './scope-draft.queries.ts';

/** A general contractor's drafts: kept as typed, checked for sense only when published. */
@Injectable()
export class ScopeDrafts {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly audit: Audit,
  ) {}

  /**
   * Begin a draft under an id the client made. The same id again changes nothing: it is the same press sent twice.
   * @throws AppError not_found when the id is another company's
   */
  async create(actor: Actor, origin: Origin, input: { id: string; draft: ScopeDraft }): Promise<void> {
    const company = requireCompany(actor, 'general_contractor');
    await this.uow.run(async (tx) => {
      if (await this.isThere(tx, input.id, company.id)) return;
      const number = await this.uow.row<{ value: string }>(tx, NEXT_NUMBER);
      const inserted = await this.uow.row(tx, INSERT_DRAFT, [
        input.id,
        company.id,
        toNumber(number?.value ?? '0'),
        actor.userId,
        JSON.stringify(input.draft),
        ...faceColumns(readDraftFace(input.draft)),
      ]);
      if (inserted === null) {
        // Two presses at once: the other one made it meanwhile.
        await this.isThere(tx, input.id, company.id);
        return;
      }
      const subject = { type: 'scope', id: input.id };
      await this.audit.write(tx, { actor, action: 'scope.drafted', subject, origin });
    });
  }

  /**
   * Keep what has been typed. A save sent again after a lost answer is taken as the same one.
   * @returns the new version
   * @throws AppError stale_version when someone saved meanwhile; illegal_move when it is no draft any more
   */
  async save(
    actor: Actor,
    scopeId: string,
    input: { version: number; draft: ScopeDraft },
  ): Promise<{ version: number }> {
    const company = requireCompany(actor, 'general_contractor');
    const draft = JSON.stringify(input.draft);
    return this.uow.run(async (tx) => {
      const saved = await this.uow.row<{ draft_version: number }>(tx, SAVE_DRAFT, [
        scopeId,
        company.id,
        input.version,
        draft,
        ...faceColumns(readDraftFace(input.draft)),
      ]);
      if (saved !== null) return { version: saved.draft_version };
      const state = await this.uow.row<{ status: ScopeStatus; draft_version: number; same: boolean | null }>(
        tx,
        DRAFT_STATE,
        [scopeId, draft, company.id],
      );
      if (state === null || state.status === 'discarded') throw new AppError('not_found');
      if (state.status !== 'draft') throw new AppError('illegal_move');
      const isSameAgain = state.same === true && state.draft_version === input.version + 1;
      if (isSameAgain) return { version: state.draft_version };
      throw new AppError('stale_version');
    });
  }

  /** Throw a draft away. @throws AppError illegal_move once it has been published */
  async discard(actor: Actor, origin: Origin, scopeId: string): Promise<void> {
    const company = requireCompany(actor, 'general_contractor');
    await this.uow.run(async (tx) => {
      const gone = await this.uow.row(tx, DISCARD_DRAFT, [scopeId, company.id]);
      if (gone === null) {
        const row = await this.uow.row<{ company_id: string; status: ScopeStatus }>(tx, SCOPE_OWNER, [
          scopeId,
        ]);
        const isOwn = row?.company_id === company.id && row.status !== 'discarded';
        throw new AppError(isOwn ? 'illegal_move' : 'not_found');
      }
      const subject = { type: 'scope', id: scopeId };
      await this.audit.write(tx, { actor, action: 'scope.discarded', subject, origin });
    });
  }

  private async isThere(tx: Tx, id: string, companyId: string): Promise<boolean> {
    const row = await this.uow.row<{ company_id: string }>(tx, SCOPE_OWNER, [id]);
    if (row !== null && row.company_id !== companyId) throw new AppError('not_found');
    return row !== null;
  }
}
