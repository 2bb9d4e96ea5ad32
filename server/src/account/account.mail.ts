import { Inject, Injectable, type OnModuleInit } from '@nestjs/common';
import { CONFIG, type Config } from '../platform/config/config.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import type { MailContent } from '../platform/mail/mail-content.ts';
import { Mailer } from '../platform/mail/mailer.ts';
import { ACCOUNT_NOTICE } from '../people/account-notice.ts';
import { linkToken } from '../people/link-token.ts';
import {
  SELECT_EMAIL_CHANGE,
  SELECT_RESET_ADDRESSEE,
  type EmailChangeRow,
  type ResetPersonRow,
} from './account.queries.ts';
import { accountMailWords, type AccountNotice } from './account.words.en.ts';

/** The e-mails about one's own account. Their jobs carry ids; links are made when the mail is written. */
@Injectable()
export class AccountMail implements OnModuleInit {
  constructor(
    @Inject(CONFIG) private readonly config: Config,
    private readonly uow: UnitOfWork,
    private readonly mailer: Mailer,
  ) {}

  onModuleInit(): void {
    this.mailer.register(
      'password_reset',
      ({ userId }) => Promise.resolve(this.reset(String(userId))),
      (resetId) => this.uow.row<ResetPersonRow>(null, SELECT_RESET_ADDRESSEE, [resetId]),
    );
    this.mailer.register(
      'email_change',
      ({ userId }) => this.emailChange(String(userId)),
      (changeId) => this.addressee(changeId, 'new_email'),
    );
    this.mailer.register(
      'email_change_notice',
      ({ userId, stage }) => this.emailNotice(String(userId), stage === 'changed'),
      (changeId) => this.addressee(changeId, 'old_email'),
    );
    this.mailer.register(ACCOUNT_NOTICE, ({ what }) => Promise.resolve(notice(what as AccountNotice)));
  }

  sendReset = (tx: Tx, resetId: string) => this.mailer.toUsers(tx, 'password_reset', [resetId], {});
  sendEmailChange = (tx: Tx, changeId: string) => this.mailer.toUsers(tx, 'email_change', [changeId], {});

  /** To the address that is, or was, the account's. */
  sendEmailNotice = (tx: Tx, changeId: string, stage: 'asked' | 'changed') =>
    this.mailer.toUsers(tx, 'email_change_notice', [changeId], { stage });

  /** That something about the account's safety has changed. */
  sendNotice = (tx: Tx, userId: string, what: AccountNotice) =>
    this.mailer.toUsers(tx, ACCOUNT_NOTICE, [userId], { what });

  private change(changeId: string): Promise<EmailChangeRow | null> {
    return this.uow.row<EmailChangeRow>(null, SELECT_EMAIL_CHANGE, [changeId]);
  }

  private async addressee(changeId: string, which: 'old_email' | 'new_email') {
    const change = await this.change(changeId);
    return change === null ? null : { name: change.name, email: change[which] };
  }

  private reset(resetId: string): MailContent {
    const { subject, lines, action } = accountMailWords.reset;
    const token = linkToken(this.config.signingSecret, 'reset', resetId);
    return { subject, lines: [...lines], action: { label: action, path: `/reset?token=${token}` } };
  }

  private async emailChange(changeId: string): Promise<MailContent | null> {
    const change = await this.change(changeId);
    if (change === null || !change.is_open) return null;
    if (change.is_taken) {
      const { subject, lines, action } = accountMailWords.emailTaken;
      return { subject, lines: [...lines], action: { label: action, path: '/sign-in' } };
    }
    const { subject, lines, action } = accountMailWords.confirmEmail;
    const token = linkToken(this.config.signingSecret, 'email', changeId);
    return {
      subject,
      lines: lines(change.old_email),
      action: { label: action, path: `/confirm-email?token=${token}` },
    };
  }

  private async emailNotice(changeId: string, isChanged: boolean): Promise<MailContent | null> {
    const change = await this.change(changeId);
    if (change === null) return null;
    if (isChanged) {
      const { subject, lines } = accountMailWords.emailChanged;
      return { subject, lines: lines(change.new_email) };
    }
    const { subject, lines, action } = accountMailWords.emailAsked;
    return { subject, lines: lines(change.new_email), action: { label: action, path: '/reset' } };
  }
}

function notice(what: AccountNotice): MailContent {
  const { subject, line } = accountMailWords.notices[what];
  return {
    subject,
    lines: [line, accountMailWords.noticeAdvice],
    action: { label: accountMailWords.noticeAction, path: '/account' },
  };
}
