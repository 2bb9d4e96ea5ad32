import { Injectable } from '@nestjs/common';
import type { Actor, ChangePassword } from '@kerfyard/common/people';
import { Audit } from '../platform/audit/audit.ts';
import type { Origin } from '../platform/auth/access.decorators.ts';
import { Passwords } from '../platform/auth/passwords.ts';
import { Sessions } from '../platform/auth/sessions.ts';
import { demandUnguessable } from '../platform/auth/unguessable.ts';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { RateLimits } from '../platform/limits/rate-limits.ts';
import { AccountMail } from './account.mail.ts';
import { CLOSE_RESETS, SELECT_PASSWORD, SET_PASSWORD, type PasswordRow } from './account.queries.ts';
import { proofLimits } from './link-limits.ts';

@Injectable()
export class PasswordChange {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly limits: RateLimits,
    private readonly passwords: Passwords,
    private readonly sessions: Sessions,
    private readonly mail: AccountMail,
    private readonly audit: Audit,
  ) {}

  /** The present password is asked for whatever the session's age (ASVS 6.2.3). Every other session ends. */
  async change(actor: Actor, input: ChangePassword, origin: Origin): Promise<void> {
    await this.limits.take(proofLimits(actor.userId));
    const person = await this.uow.row<PasswordRow>(null, SELECT_PASSWORD, [actor.userId]);
    if (!(await this.passwords.verify(person?.password_hash ?? null, input.current)) || person === null) {
      throw AppError.field('current', 'That is not your password');
    }
    demandUnguessable(input.password, [person.name, person.email, actor.company?.name ?? '']);
    const passwordHash = await this.passwords.hash(input.password);
    await this.uow.run(async (tx) => {
      await this.uow.rows(tx, SET_PASSWORD, [actor.userId, passwordHash]);
      await this.uow.rows(tx, CLOSE_RESETS, [actor.userId]);
      const ending = { except: actor.sessionId, because: 'password_changed', origin };
      const sessionsEnded = await this.sessions.endAllOf(tx, actor.userId, ending);
      await this.sessions.prove(tx, actor.sessionId);
      await this.mail.sendNotice(tx, actor.userId, 'password_changed');
      await this.audit.write(tx, {
        actor,
        action: 'password.changed',
        subject: { type: 'user', id: actor.userId },
        detail: { sessionsEnded },
        origin,
      });
    });
  }
}
