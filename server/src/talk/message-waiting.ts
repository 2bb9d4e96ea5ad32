import { Injectable, type OnModuleInit } from '@nestjs/common';
import { Clock } from '../platform/clock/clock.ts';
import { toNumber } from '../platform/database/codecs.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import type { MailContent } from '../platform/mail/mail-content.ts';
import { Mailer } from '../platform/mail/mailer.ts';
import {
  ASK_FOR_NOTICE,
  LOCK_NOTICE,
  NOTICE_DROPPED,
  NOTICE_MAILED,
  NOTICE_PUT_OFF,
  PEOPLE_CONCERNED,
  WAITING_THREADS,
} from './message-waiting.queries.ts';
import { messageWaitingWords as words } from './talk.words.en.ts';

interface WaitingRow {
  id: string;
  title: string;
  company: string;
  count: string;
  oldest: Date;
}

const KIND = 'message_waiting';
const UNSEEN_MS = 15 * 60_000;
const BETWEEN_MS = 60 * 60_000;
const MAX_LINES = 10;

/**
 * Tells people by e-mail of messages that they have not seen for a quarter of an hour and that nobody of their company
 * has answered; at most once an hour each, about all their threads together.
 */
@Injectable()
export class MessageWaiting implements OnModuleInit {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly clock: Clock,
    private readonly mailer: Mailer,
  ) {}

  onModuleInit(): void {
    this.mailer.register(KIND, (data) => this.build(String(data['userId']), String(data['mailId'])));
  }

  /** Something was written to this company: look again later, unless that is planned already. */
  async ask(tx: Tx, { threadId, companyId }: { threadId: string; companyId: string }): Promise<void> {
    const people = await this.uow.rows<{ user_id: string }>(tx, PEOPLE_CONCERNED, [threadId, companyId]);
    for (const { user_id: userId } of people) {
      const asked = await this.uow.row<{ wait_ms: string }>(tx, ASK_FOR_NOTICE, [
        userId,
        UNSEEN_MS,
        BETWEEN_MS,
      ]);
      if (asked !== null) await this.plan(tx, userId, Number(asked.wait_ms));
    }
  }

  private async plan(tx: Tx, userId: string, waitMs: number): Promise<void> {
    const startAfter = new Date(this.clock.wallMs() + Math.max(0, waitMs));
    await this.mailer.toUsers(tx, KIND, [userId], {}, { startAfter });
  }

  private async build(userId: string, mailId: string): Promise<MailContent | null> {
    return this.uow.run(async (tx) => {
      const notice = await this.uow.row<{ mail_id: string | null }>(tx, LOCK_NOTICE, [userId]);
      if (notice === null) return null;
      const waiting = await this.uow.rows<WaitingRow>(tx, WAITING_THREADS, [userId]);
      const [oldest] = waiting;
      if (oldest === undefined) {
        await this.uow.rows(tx, NOTICE_DROPPED, [userId]);
        return null;
      }
      // Sent before but not taken by the mail server: the same mail again.
      if (notice.mail_id === mailId) return toContent(waiting);
      const ageMs = (await this.clock.now(tx)).getTime() - oldest.oldest.getTime();
      if (ageMs < UNSEEN_MS) {
        await this.uow.rows(tx, NOTICE_PUT_OFF, [userId, new Date(oldest.oldest.getTime() + UNSEEN_MS)]);
        await this.plan(tx, userId, UNSEEN_MS - ageMs);
        return null;
      }
      await this.uow.rows(tx, NOTICE_MAILED, [userId, mailId]);
      return toContent(waiting);
    });
  }
}

function toContent(waiting: readonly WaitingRow[]): MailContent {
  const lines = waiting.slice(0, MAX_LINES).map((row) => words.line({ ...row, count: toNumber(row.count) }));
  const [only] = waiting;
  if (only !== undefined && waiting.length === 1) {
    return { subject: words.subject(only), lines, action: { label: words.open, path: `/talk/${only.id}` } };
  }
  return {
    subject: words.subjectOfMany(waiting.length),
    lines,
    action: { label: words.openAll, path: '/talk' },
  };
}
