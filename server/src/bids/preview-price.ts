import { Injectable } from '@nestjs/common';
import { readPrice, type BidPricePreview, type BidPriceInput } from '@kerfyard/common/bids';
import type { Actor } from '@kerfyard/common/people';
import { AppError } from '../platform/http/app-error.ts';
import { requireCompany } from '../scopes/require-company.ts';
import { ScopeAccess } from '../scopes/scope-access.ts';
import { ScopeReader } from '../scopes/scope-reader.ts';

/** The price of a bid as typed so far; nothing of it is kept. */
@Injectable()
export class PreviewPrice {
  constructor(
    private readonly access: ScopeAccess,
    private readonly reader: ScopeReader,
  ) {}

  /** @throws AppError 422 with everything wrong with the price; stale_revision */
  async preview(actor: Actor, scopeId: string, input: BidPriceInput): Promise<BidPricePreview> {
    requireCompany(actor, 'cutting_contractor');
    if ((await this.access.sight(actor, scopeId)) === 'nothing') throw new AppError('not_found');
    const { scope, body } = await this.reader.published(scopeId);
    if (scope.revision !== input.revision) throw new AppError('stale_revision');
    const reading = readPrice(body, input.price);
    if (!reading.ok) throw new AppError('invalid_input', { fields: reading.issues });
    return { priced: reading.priced };
  }
}
