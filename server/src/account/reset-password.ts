import { Inject, Injectable, type OnModuleInit } from '@nestjs/common';
import type { ResetPassword } from '@kerfyard/common/people';
import { deadLink, type LinkStateRow } from '../people/link-state.ts';
import { linkToken } from '../people/link-token.ts';
import { SignInService } from '../people/sign-in.ts';
import { hashToken } from '../people/verify-token.ts';
import { Audit } from '../platform/audit/audit.ts';
import type { Origin } from '../platform/auth/access.decorators.ts';
import { Passwords } from '../platform/auth/passwords.ts';
import { Sessions } from '../platform/auth/sessions.ts';
import { demandUnguessable } from '../platform/auth/unguessable.ts';
import { CONFIG, type Config } from '../platform/config/config.ts';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { newId } from '../platform/ids/ids.ts';
import { Sweeps } from '../platform/jobs/sweeps.ts';
import { RateLimits } from '../platform/limits/rate-limits.ts';
import { AccountMail } from './account.mail.ts';
import { LINK_SECONDS, linkLimits, perEmail } from './link-limits.ts';
import {
  CLOSE_RESETS,
  DELETE_OLD_LINKS,
  DROP_EMAIL_CHANGES,
  INSERT_RESET,
  SELECT_RESET_STATE,
  SET_PASSWORD,
  USE_RESET,
  type ResetPersonRow,
} from './account.queries.ts';

/** A forgotten password: a link by mail, then a new one. Never signs in, and leaves a second factor in place. */
@Injectable()
export class PasswordResets implements OnModuleInit {
  constructor(
    @Inject(CONFIG) private readonly config: Config,
    private readonly uow: UnitOfWork,
    private readonly limits: RateLimits,
    private readonly passwords: Passwords,
    private readonly sessions: Sessions,
    private readonly signIns: SignInService,
    private readonly mail: AccountMail,
    private readonly audit: Audit,
    private readonly sweeps: Sweeps,
  ) {}

  onModuleInit(): void {
    this.sweeps.register('old account links', async () => void (await this.uow.rows(null, DELETE_OLD_LINKS)));
  }

  /** The same work and the same answer for an address with and without an account; only the mail differs. */
  async ask(email: string, origin: Origin): Promise<void> {
    await this.limits.take([
      ...linkLimits('reset', origin),
      { parts: ['reset', 'e-mail', email], windows: perEmail },
    ]);
    const id = newId();
    const tokenHash = hashToken(linkToken(this.config.signingSecret, 'reset', id));
    await this.uow.run(async (tx) => {
      await this.uow.rows(tx, INSERT_RESET, [id, email, tokenHash, LINK_SECONDS]);
      await this.mail.sendReset(tx, id);
      await this.audit.write(tx, {
        actor: null,
        action: 'password.reset_asked',
        subject: { type: 'password_reset', id },
        origin,
      });
    });
  }

  /** @throws AppError link_unknown, link_used, link_expired; invalid_input for a password that is easily guessed */
  async use(input: ResetPassword, origin: Origin): Promise<void> {
    await this.limits.take(linkLimits('use-reset', origin));
    const passwordHash = await this.passwords.hash(input.password);
    const tokenHash = hashToken(input.token);
    const owner = await this.uow.run(async (tx) => {
      const person = await this.uow.row<ResetPersonRow>(tx, USE_RESET, [tokenHash]);
      if (person === null) {
        throw deadLink(await this.uow.row<LinkStateRow>(tx, SELECT_RESET_STATE, [tokenHash]));
      }
      // Refused here, the link stays good for a better one.
      demandUnguessable(input.password, [person.name, person.email]);
      await this.uow.rows(tx, SET_PASSWORD, [person.id, passwordHash]);
      await this.uow.rows(tx, CLOSE_RESETS, [person.id]);
      await this.uow.rows(tx, DROP_EMAIL_CHANGES, [person.id]);
      await this.sessions.endAllOf(tx, person.id, { except: null, because: 'password_reset', origin });
      await this.mail.sendNotice(tx, person.id, 'password_changed');
      await this.audit.write(tx, {
        actor: null,
        action: 'password.reset',
        subject: { type: 'user', id: person.id },
        origin,
      });
      return person;
    });
    await this.signIns.forgetTries(owner, origin);
  }
}
