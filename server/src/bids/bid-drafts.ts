import { Injectable } from '@nestjs/common';
import type { Actor } from '@kerfyard/common/people';
import { toInstant } from '../platform/database/codecs.ts';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { requireCompany } from '../scopes/require-company.ts';
import { ScopeAccess } from '../scopes/scope-access.ts';
import { readDraft, sealDraft } from './bid-envelope.ts';
import { CompanyKeys } from './company-keys.ts';
import { READ_BID_DRAFT, SAVE_BID_DRAFT } from './own-bid.queries.ts';

/** A draft of 500 lines with everything filled in stays well below. */
const MAX_DRAFT_BYTES = 256 * 1024;

export interface BidDraftView {
  draft: Record<string, unknown> | null;
  updatedAt: string | null;
}

/** What a crew has typed of a bid so far, encrypted for its company alone: not even the opening reads it. */
@Injectable()
export class BidDrafts {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly access: ScopeAccess,
    private readonly keys: CompanyKeys,
  ) {}

  async read(actor: Actor, scopeId: string): Promise<BidDraftView> {
    const companyId = await this.requireSight(actor, scopeId);
    const row = await this.uow.row<{ ciphertext: Buffer; key_for_bidder: Buffer; updated_at: Date }>(
      null,
      READ_BID_DRAFT,
      [scopeId, companyId],
    );
    if (row === null) return { draft: null, updatedAt: null };
    const key = await this.keys.of(null, companyId);
    const parts = { ciphertext: row.ciphertext, keyForBidder: row.key_for_bidder };
    return { draft: readDraft(parts, { scopeId, companyId }, key), updatedAt: toInstant(row.updated_at) };
  }

  /** Keep a draft; the last save wins. @throws AppError too_large */
  async save(actor: Actor, scopeId: string, draft: Record<string, unknown>): Promise<{ updatedAt: string }> {
    const companyId = await this.requireSight(actor, scopeId);
    if (Buffer.byteLength(JSON.stringify(draft)) > MAX_DRAFT_BYTES) throw new AppError('too_large');
    const updatedAt = await this.uow.run(async (tx) => {
      const sealed = sealDraft(draft, { scopeId, companyId }, await this.keys.of(tx, companyId));
      const row = await this.uow.row<{ updated_at: Date }>(tx, SAVE_BID_DRAFT, [
        scopeId,
        companyId,
        sealed.ciphertext,
        sealed.keyForBidder,
      ]);
      return row?.updated_at ?? null;
    });
    if (updatedAt === null) throw new Error('A draft was not kept');
    return { updatedAt: toInstant(updatedAt) };
  }

  private async requireSight(actor: Actor, scopeId: string): Promise<string> {
    const company = requireCompany(actor, 'cutting_contractor');
    if ((await this.access.sight(actor, scopeId)) === 'nothing') throw new AppError('not_found');
    return company.id;
  }
}
