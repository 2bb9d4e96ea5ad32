import { Inject, Injectable } from '@nestjs/common';
import type { Actor } from '@kerfyard/common/people';
import { deadLink, type LinkStateRow } from '../people/link-state.ts';
import { linkToken } from '../people/link-token.ts';
import { hashToken } from '../people/verify-token.ts';
import { Audit } from '../platform/audit/audit.ts';
import type { Origin } from '../platform/auth/access.decorators.ts';
import { CONFIG, type Config } from '../platform/config/config.ts';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { newId } from '../platform/ids/ids.ts';
import { RateLimits } from '../platform/limits/rate-limits.ts';
import { AccountMail } from './account.mail.ts';
import { LINK_SECONDS, linkLimits, perEmail } from './link-limits.ts';
import {
  CLOSE_RESETS,
  DROP_EMAIL_CHANGES,
  INSERT_EMAIL_CHANGE,
  SELECT_ACCOUNT,
  SELECT_EMAIL_CHANGE_STATE,
  SET_EMAIL,
  USE_EMAIL_CHANGE,
  type AccountRow,
  type EmailChangeRow,
} from './account.queries.ts';

/** The new address confirms, the old one hears of it: before, so that it can be stopped, and after. */
@Injectable()
export class EmailChange {
  constructor(
    @Inject(CONFIG) private readonly config: Config,
    private readonly uow: UnitOfWork,
    private readonly limits: RateLimits,
    private readonly mail: AccountMail,
    private readonly audit: Audit,
  ) {}

  /** One answer whether or not the new address has an account; what differs is the mail it gets. */
  async ask(actor: Actor, email: string, origin: Origin): Promise<void> {
    await this.limits.take([
      { parts: ['change-email', actor.userId], windows: perEmail },
      { parts: ['change-email', 'e-mail', email], windows: perEmail },
    ]);
    const id = newId();
    const tokenHash = hashToken(linkToken(this.config.signingSecret, 'email', id));
    await this.uow.run(async (tx) => {
      const account = await this.uow.row<AccountRow>(tx, SELECT_ACCOUNT, [actor.userId]);
      if (account?.email === email) throw AppError.field('email', 'This is your address already');
      await this.uow.rows(tx, DROP_EMAIL_CHANGES, [actor.userId]);
      await this.uow.rows(tx, INSERT_EMAIL_CHANGE, [id, actor.userId, email, tokenHash, LINK_SECONDS]);
      await this.mail.sendEmailChange(tx, id);
      await this.mail.sendEmailNotice(tx, id, 'asked');
      await this.audit.write(tx, {
        actor,
        action: 'email.change_asked',
        subject: { type: 'user', id: actor.userId },
        detail: { before: account?.email, wanted: email },
        origin,
      });
    });
  }

  /** The link in the new address's mail. Signs nobody in. */
  async confirm(token: string, origin: Origin): Promise<void> {
    await this.limits.take(linkLimits('confirm-email', origin));
    const tokenHash = hashToken(token);
    await this.uow.run(async (tx) => {
      const change = await this.uow.row<EmailChangeRow>(tx, USE_EMAIL_CHANGE, [tokenHash]);
      if (change === null) {
        throw deadLink(await this.uow.row<LinkStateRow>(tx, SELECT_EMAIL_CHANGE_STATE, [tokenHash]));
      }
      const set = await this.uow.row(tx, SET_EMAIL, [change.user_id, change.new_email]);
      if (set === null) throw new AppError('has_account');
      await this.uow.rows(tx, CLOSE_RESETS, [change.user_id]);
      await this.mail.sendEmailNotice(tx, change.id, 'changed');
      await this.audit.write(tx, {
        actor: null,
        action: 'email.changed',
        subject: { type: 'user', id: change.user_id },
        detail: { before: change.old_email, after: change.new_email },
        origin,
      });
    });
  }
}
