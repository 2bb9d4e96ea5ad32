import { Injectable } from '@nestjs/common';
import {
  may,
  type Actor,
  type PermissionName,
  type RateCardView,
  type SaveRateCard,
} from '@kerfyard/common/people';
import { Audit } from '../platform/audit/audit.ts';
import type { Origin } from '../platform/auth/access.decorators.ts';
import { KeyVault } from '../platform/crypto/key-vault.ts';
import { toInstant } from '../platform/database/codecs.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { openRateCard, sealRateCard } from './rate-card-seal.ts';
import {
  COMPANY_KEY,
  INSERT_RATE_CARD,
  RATE_CARD,
  UPDATE_RATE_CARD,
  type RateCardRow,
} from './rate-card.queries.ts';

/** A crew's own rate card: always the actor's company's, so no id is ever asked for and no other card can be. */
@Injectable()
export class RateCards {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly vault: KeyVault,
    private readonly audit: Audit,
  ) {}

  /** @throws AppError not_found for a general contractor, forbidden for a role that does not see bids */
  async view(actor: Actor): Promise<RateCardView> {
    const companyId = crewOf(actor, 'bid.read');
    const row = await this.uow.row<RateCardRow>(null, RATE_CARD, [companyId]);
    if (row === null) return { card: null, version: 0, updatedAt: null };
    return this.toView(row, companyId, await this.keyOf(null, companyId));
  }

  /** Save the whole card. @throws AppError stale_version when someone saved one meanwhile */
  async save(actor: Actor, { version, card }: SaveRateCard, origin: Origin): Promise<RateCardView> {
    const companyId = crewOf(actor, 'bid.write');
    return this.uow.run(async (tx) => {
      const key = await this.keyOf(tx, companyId);
      const sealed = sealRateCard(card, companyId, key);
      const row =
        version === 0
          ? await this.uow.row<RateCardRow>(tx, INSERT_RATE_CARD, [companyId, sealed, actor.userId])
          : await this.uow.row<RateCardRow>(tx, UPDATE_RATE_CARD, [companyId, sealed, actor.userId, version]);
      if (row === null) throw new AppError('stale_version');
      await this.audit.write(tx, {
        actor,
        action: 'rate_card.saved',
        subject: { type: 'company', id: companyId },
        // No amount: with a scope's quantities it would tell a sealed bid.
        detail: { version: row.version, rates: card.rates.length },
        origin,
      });
      return this.toView(row, companyId, key);
    });
  }

  private toView(row: RateCardRow, companyId: string, key: Buffer): RateCardView {
    return {
      card: openRateCard(row.ciphertext, companyId, key),
      version: row.version,
      updatedAt: toInstant(row.updated_at),
    };
  }

  private async keyOf(tx: Tx | null, companyId: string): Promise<Buffer> {
    const row = await this.uow.row<{ wrapped_key: Buffer }>(tx, COMPANY_KEY, [companyId]);
    if (row === null) throw new AppError('not_found');
    return this.vault.companyKey(row.wrapped_key, companyId);
  }
}

/** General contractors have no such thing; of a crew, those who see bids see it and those who hand them in edit it. */
function crewOf(actor: Actor, permission: PermissionName): string {
  if (actor.company?.kind !== 'cutting_contractor') throw new AppError('not_found');
  if (!may(actor, permission)) throw new AppError('forbidden');
  return actor.company.id;
}
