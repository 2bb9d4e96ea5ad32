import { Injectable, type OnModuleInit } from '@nestjs/common';
import type { Award, BidBand } from '@kerfyard/common/bids';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import type { MailContent } from '../platform/mail/mail-content.ts';
import { Mailer } from '../platform/mail/mailer.ts';
import { scopeNumber } from '../scopes/scope-number.ts';
import { instantWords } from '../subcontracts/format.ts';
import { SubcontractReader } from '../subcontracts/subcontract-reader.ts';
import { workPath } from '../subcontracts/work-path.ts';
import { OUTCOME_FOR_MAIL } from './award.queries.ts';
import { awardMailWords as words } from './awards.words.en.ts';

interface OutcomeRow {
  won: boolean;
  rank: number | null;
  out_of: number | null;
  band: BidBand | null;
  reason: Award['reason'] | null;
  note: string;
  scope_id: string;
  scope_number: string;
  title: string;
  gc_name: string;
}

/** Letters about an award: to the winner, to the others, and to both sides when it lapses. */
@Injectable()
export class AwardMails implements OnModuleInit {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly mailer: Mailer,
    private readonly subcontracts: SubcontractReader,
  ) {}

  onModuleInit(): void {
    this.mailer.register('award_won', ({ subcontractId }) => this.won(String(subcontractId)));
    this.mailer.register('award_not_won', ({ bidId, awardId }) => this.notWon(bidId, awardId));
    this.mailer.register('award_lapsed', ({ subcontractId }) => this.lapsed(String(subcontractId)));
  }

  private async won(id: string): Promise<MailContent | null> {
    const subcontract = await this.subcontracts.find(id);
    if (subcontract === null || subcontract.status === 'lapsed') return null;
    const { number, gc, title, signBy, timeZone } = subcontract;
    return {
      subject: words.won.subject(number),
      lines: words.won.lines(gc.name, title, instantWords(signBy, timeZone)),
      action: { label: words.won.action, path: workPath(id) },
    };
  }

  /** Nothing when the award lapsed meanwhile: its outcomes are gone then. */
  private async notWon(bidId: unknown, awardId: unknown): Promise<MailContent | null> {
    const row = await this.uow.row<OutcomeRow>(null, OUTCOME_FOR_MAIL, [bidId, awardId]);
    if (row === null) return null;
    const { rank, out_of: of, band, reason, note } = row;
    return {
      subject: words.notWon.subject(scopeNumber(row.scope_number)),
      lines: [
        ...words.notWon.lines(row.gc_name, row.title),
        ...(rank === null || of === null ? [] : [words.notWon.standing(rank, of, band)]),
        ...(reason === null ? [] : [words.notWon.reason(reason)]),
        ...(note === '' ? [] : [note]),
      ],
      action: { label: words.notWon.action, path: '/bids' },
    };
  }

  private async lapsed(id: string): Promise<MailContent | null> {
    const subcontract = await this.subcontracts.find(id);
    if (subcontract === null) return null;
    return {
      subject: words.lapsed.subject(subcontract.number),
      lines: words.lapsed.lines(subcontract.title),
      action: { label: words.lapsed.action, path: `/scopes/${subcontract.scopeId}` },
    };
  }
}
