import { Injectable } from '@nestjs/common';
import type { Actor, Confirm } from '@kerfyard/common/people';
import { Audit } from '../platform/audit/audit.ts';
import type { Origin } from '../platform/auth/access.decorators.ts';
import { Passwords } from '../platform/auth/passwords.ts';
import { SecondFactors } from '../platform/auth/second-factors.ts';
import { Sessions } from '../platform/auth/sessions.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { RateLimits } from '../platform/limits/rate-limits.ts';
import { AccountMail } from './account.mail.ts';
import { SELECT_PASSWORD, type PasswordRow } from './account.queries.ts';
import { proofLimits } from './link-limits.ts';

/** Says again who one is, for a sensitive act: by password, or by code where there is a second factor. */
@Injectable()
export class ConfirmSignIn {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly limits: RateLimits,
    private readonly passwords: Passwords,
    private readonly secondFactors: SecondFactors,
    private readonly sessions: Sessions,
    private readonly mail: AccountMail,
    private readonly audit: Audit,
  ) {}

  async confirm(actor: Actor, { password, code }: Confirm, origin: Origin): Promise<void> {
    await this.limits.take(proofLimits(actor.userId));
    const { isSet } = await this.secondFactors.state(actor.userId);
    if (isSet && code === undefined) throw new AppError('confirm_with_code');
    if (!isSet && password === undefined) throw new AppError('confirm_with_password');
    const isPassword = !isSet && (await this.isPassword(actor, password ?? ''));
    const by = await this.uow.run(async (tx) => {
      const proof = isSet ? await this.takeCode(tx, actor, code ?? '') : isPassword ? 'password' : null;
      if (proof !== null) await this.sessions.prove(tx, actor.sessionId);
      await this.audit.write(tx, {
        actor,
        action: proof === null ? 'session.proof_refused' : 'session.proved',
        subject: { type: 'session', id: actor.sessionId },
        ...(proof === null ? {} : { detail: { by: proof } }),
        origin,
      });
      return proof;
    });
    if (by !== null) return;
    throw isSet
      ? AppError.field('code', 'That code does not fit, or was used before. Take the next one')
      : AppError.field('password', 'That is not your password');
  }

  private async isPassword(actor: Actor, password: string): Promise<boolean> {
    const person = await this.uow.row<PasswordRow>(null, SELECT_PASSWORD, [actor.userId]);
    return this.passwords.verify(person?.password_hash ?? null, password);
  }

  private async takeCode(tx: Tx, actor: Actor, code: string): Promise<string | null> {
    const taken = await this.secondFactors.take(tx, actor.userId, code);
    if (taken === 'recovery_code') await this.mail.sendNotice(tx, actor.userId, 'recovery_code_used');
    return taken;
  }
}
