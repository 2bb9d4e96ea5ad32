import { Injectable } from '@nestjs/common';
import type { Actor } from '@kerfyard/common/people';
import type { ScopeDetailView } from '@kerfyard/common/scopes';
import { OpenBids } from '../bids/open-bids.ts';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { ScopeAccess } from './scope-access.ts';
import { ScopeFiles } from './scope-files.ts';
import { toDetail, type DetailRow } from './scope-presenter.ts';
import { ScopeReader } from './scope-reader.ts';
import { SCOPE_DETAIL } from './scope-views.queries.ts';

/** One scope as this person may see it. */
@Injectable()
export class ScopeDetail {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly access: ScopeAccess,
    private readonly reader: ScopeReader,
    private readonly files: ScopeFiles,
    private readonly opening: OpenBids,
  ) {}

  /** @throws AppError not_found for what does not exist and for what this person may not know of */
  async view(actor: Actor, scopeId: string): Promise<ScopeDetailView> {
    const sight = await this.access.sight(actor, scopeId);
    if (sight === 'nothing' || actor.company === null) throw new AppError('not_found');
    if (sight === 'own') await this.opening.openIfOverdue(scopeId);
    const place = sight === 'own' ? null : (await this.access.yard(actor.company.id)).place;
    const [row, files] = await Promise.all([
      this.uow.row<DetailRow>(null, SCOPE_DETAIL, [scopeId, place, actor.company.id]),
      sight === 'card' ? [] : this.files.views(scopeId),
    ]);
    if (row === null) throw new AppError('not_found');
    const record = (await this.reader.records([row.company_id])).get(row.company_id);
    return toDetail(row, sight, { files, record });
  }
}
