import { Injectable } from '@nestjs/common';
import type { Actor } from '@kerfyard/common/people';
import {
  checkDraft,
  methodsOfCuts,
  type ScopeBody,
  type ScopeDraft,
  type ScopeStatus,
  type ScopeTotals,
} from '@kerfyard/common/scopes';
import { newScopeKeyPair } from '../bids/scope-keys.ts';
import { Audit } from '../platform/audit/audit.ts';
import type { Origin } from '../platform/auth/access.decorators.ts';
import { Clock } from '../platform/clock/clock.ts';
import { KeyVault } from '../platform/crypto/key-vault.ts';
import { toNumber } from '../platform/database/codecs.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { JobQueue } from '../platform/jobs/job-queue.ts';
import { ComeDueJobs } from './come-due-jobs.ts';
import { SKETCH_LINES } from './draft-face.ts';
import { requireCompany } from './require-company.ts';
import { INSERT_REVISION, INSERT_SCOPE_KEY, LOCK_DRAFT, PUBLISH } from './scope-draft.queries.ts';
import { ScopeEvents } from './scope-events.ts';
import { scopeKeyContext } from './scope-key-context.ts';

interface DraftRow {
  status: ScopeStatus;
  draft: ScopeDraft;
  draft_version: number;
}

/** Publishing makes revision 1, which never changes afterwards, and the key pair that its sealed bids need. */
@Injectable()
export class PublishScope {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly clock: Clock,
    private readonly keys: KeyVault,
    private readonly jobs: JobQueue,
    private readonly comeDue: ComeDueJobs,
    private readonly events: ScopeEvents,
    private readonly audit: Audit,
  ) {}

  /**
   * @throws AppError 422 with every fault of the draft; stale_version; illegal_move when it is no draft any more
   */
  async publish(actor: Actor, origin: Origin, scopeId: string, version: number): Promise<void> {
    const company = requireCompany(actor, 'general_contractor');
    const seq = await this.uow.run(async (tx) => {
      const row = await this.uow.row<DraftRow>(tx, LOCK_DRAFT, [scopeId, company.id]);
      if (row === null || row.status === 'discarded') throw new AppError('not_found');
      if (row.status !== 'draft') throw new AppError('illegal_move');
      if (row.draft_version !== version) throw new AppError('stale_version');
      const now = await this.clock.now(tx);
      const reading = checkDraft(row.draft, now);
      if (!reading.ok) throw new AppError('invalid_input', { fields: reading.issues });
      const written = await this.write(tx, { actor, scopeId, now, ...reading });
      await this.audit.write(tx, {
        actor,
        action: 'scope.published',
        subject: { type: 'scope', id: scopeId },
        detail: { revision: 1, mode: reading.body.bidding.mode, dueAt: reading.body.bidding.dueAt },
        origin,
      });
      return written;
    });
    this.events.changed({ id: scopeId, companyId: company.id }, seq);
    this.events.listChanged();
  }

  private async write(
    tx: Tx,
    made: { actor: Actor; scopeId: string; now: Date; body: ScopeBody; totals: ScopeTotals },
  ): Promise<number> {
    const { actor, scopeId, now, body, totals } = made;
    const { site, bidding, cuts } = body;
    const totalsJson = JSON.stringify(totals);
    await this.uow.rows(tx, INSERT_REVISION, [scopeId, JSON.stringify(body), totalsJson, actor.userId, now]);
    const pair = newScopeKeyPair();
    const wrapped = this.keys.wrapKey(pair.privateKey, scopeKeyContext(scopeId));
    await this.uow.rows(tx, INSERT_SCOPE_KEY, [scopeId, pair.publicKey, wrapped]);
    const dueAt = new Date(bidding.dueAt);
    const row = await this.uow.row<{ seq: string }>(tx, PUBLISH, [
      scopeId,
      body.title,
      bidding.mode,
      dueAt,
      site.timeZone,
      site.city,
      site.state,
      site.lat,
      site.lon,
      methodsOfCuts(
        cuts.map((line) => line.cut),
        body.conditions,
      ),
      totals.inchFeet,
      totalsJson,
      JSON.stringify(cuts.slice(0, SKETCH_LINES)),
      cuts.length,
      now,
      body.conditions.indoors,
    ]);
    await this.comeDue.send(tx, { scopeId, dueAt, now });
    await this.jobs.send(tx, 'tell_crews', { scopeId, after: null });
    return toNumber(row?.seq ?? '0');
  }
}
