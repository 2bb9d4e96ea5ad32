import { Injectable } from '@nestjs/common';
import { splitRelease } from '@kerfyard/common/money';
import type { Release, ReleaseView } from '@kerfyard/common/payments';
import type { Actor } from '@kerfyard/common/people';
import { CompletionStates } from '../completions/completion-states.ts';
import { accounts, credit, debit } from '../ledger/accounts.ts';
import { Ledger } from '../ledger/ledger.service.ts';
import { Audit } from '../platform/audit/audit.ts';
import type { Origin } from '../platform/auth/access.decorators.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { Mailer } from '../platform/mail/mailer.ts';
import { LiveHints, rooms } from '../platform/realtime/live-hints.ts';
import { LOCK_SUBCONTRACT, SOV_LINES } from './fundings.queries.ts';
import { HELD_ON_LINES, INSERT_RELEASE, RELEASE_BY_ID } from './releases.queries.ts';
import { presentRelease, type ReleaseRow } from './release-views.ts';
import { Transfers } from './transfers.ts';

interface SubcontractRow {
  id: string;
  number: string;
  gc_company_id: string;
  crew_company_id: string;
  retainage_basis_points: number;
  fee_basis_points: number;
}

interface SovRow {
  id: string;
  amount_cents: string;
}

/** Held money becomes the crew's (event E07), in one transaction with the operations that will move it. */
@Injectable()
export class ReleaseService {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly ledger: Ledger,
    private readonly completions: CompletionStates,
    private readonly transfers: Transfers,
    private readonly audit: Audit,
    private readonly mailer: Mailer,
    private readonly live: LiveHints,
  ) {}

  /** Release what an accepted completion lists. The same id again answers with the same release. */
  async release(actor: Actor, origin: Origin, input: Release): Promise<ReleaseView> {
    const { row, subcontract } = await this.uow.run(async (tx) => {
      const completion = await this.completions.find(tx, input.completionId);
      const found =
        completion && (await this.uow.row<SubcontractRow>(tx, LOCK_SUBCONTRACT, [completion.subcontractId]));
      if (!completion || !found || found.gc_company_id !== actor.company?.id) throw new AppError('not_found');
      const existing = await this.uow.row<ReleaseRow>(tx, RELEASE_BY_ID, [input.id]);
      if (existing !== null) {
        if (existing.completion_id !== input.completionId) throw new AppError('key_reused');
        return { row: existing, subcontract: found };
      }
      // Read again under the subcontract's lock: a parallel release of the same completion has finished by now.
      const current = await this.completions.find(tx, input.completionId);
      if (current?.status === 'released') throw new AppError('already_released');
      if (current?.status !== 'accepted') throw new AppError('illegal_move');
      return {
        row: await this.post(tx, actor, origin, found, input, current.sovLineIds),
        subcontract: found,
      };
    });
    this.live.emit([rooms.company(subcontract.gc_company_id), rooms.company(subcontract.crew_company_id)], {
      topic: 'money',
      subcontractId: subcontract.id,
    });
    return presentRelease(row);
  }

  private async post(
    tx: Tx,
    actor: Actor,
    origin: Origin,
    subcontract: SubcontractRow,
    input: Release,
    sovLineIds: string[],
  ): Promise<ReleaseRow> {
    const lines = await this.uow.rows<SovRow>(tx, SOV_LINES, [subcontract.id, sovLineIds]);
    await this.requireHeld(tx, subcontract.id, lines);
    const grossCents = lines.reduce((sum, line) => sum + Number(line.amount_cents), 0);
    if (actor.limits.setAsideCents !== null && grossCents > actor.limits.setAsideCents)
      throw new AppError('over_limit');
    const split = splitRelease(grossCents, {
      retainageBasisPoints: subcontract.retainage_basis_points,
      feeBasisPoints: subcontract.fee_basis_points,
    });
    const { entryId } = await this.ledger.post(tx, {
      book: 'platform',
      event: 'E07',
      key: `E07:${input.completionId}`,
      subcontractId: subcontract.id,
      lines: [
        ...lines.map((line) => debit(accounts.held(subcontract.id, line.id), Number(line.amount_cents))),
        credit(accounts.retainageHeld(subcontract.id), split.retainageCents),
        credit(accounts.platformFee(), split.feeCents),
        credit(accounts.crewPayable(subcontract.crew_company_id, subcontract.id), split.crewCents),
      ],
    });
    const row = await this.uow.row<ReleaseRow>(tx, INSERT_RELEASE, [
      input.id,
      subcontract.id,
      input.completionId,
      split.grossCents,
      split.retainageCents,
      split.feeCents,
      split.crewCents,
      entryId,
      actor.userId,
    ]);
    if (row === null) throw new Error('the release was not written');
    await this.completions.markReleased(tx, input.completionId);
    await this.transfers.request(tx, {
      releaseId: row.id,
      subcontractId: subcontract.id,
      crewCompanyId: subcontract.crew_company_id,
      cents: split.crewCents,
    });
    await this.audit.write(tx, {
      actor,
      origin,
      action: 'money.released',
      subject: { type: 'release', id: row.id },
      detail: { subcontractId: subcontract.id, completionId: input.completionId, ...split },
    });
    await this.mailer.toCompany(tx, 'released', subcontract.crew_company_id, 'money.read', {
      releaseId: row.id,
    });
    return row;
  }

  private async requireHeld(tx: Tx, subcontractId: string, lines: SovRow[]): Promise<void> {
    const held = await this.uow.rows<{ sov_line_id: string; cents: string }>(tx, HELD_ON_LINES, [
      subcontractId,
      lines.map((l) => l.id),
    ]);
    const byLine = new Map(held.map((row) => [row.sov_line_id, Number(row.cents)]));
    if (lines.some((line) => (byLine.get(line.id) ?? 0) < Number(line.amount_cents)))
      throw new AppError('lines_not_set_aside');
  }
}
