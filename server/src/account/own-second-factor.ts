import { Injectable } from '@nestjs/common';
import type { Actor, NewSecondFactorView, RecoveryCodesView } from '@kerfyard/common/people';
import { Audit } from '../platform/audit/audit.ts';
import type { Origin } from '../platform/auth/access.decorators.ts';
import { SecondFactors } from '../platform/auth/second-factors.ts';
import { Sessions } from '../platform/auth/sessions.ts';
import { toBase32, totpAddress } from '../platform/auth/totp.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { RateLimits } from '../platform/limits/rate-limits.ts';
import { AccountMail } from './account.mail.ts';
import { SELECT_ACCOUNT, type AccountRow } from './account.queries.ts';
import type { AccountNotice } from './account.words.en.ts';
import { proofLimits } from './link-limits.ts';

/** One's own second factor: set up in two steps, taken away, its recovery codes made anew. */
@Injectable()
export class OwnSecondFactor {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly limits: RateLimits,
    private readonly secondFactors: SecondFactors,
    private readonly sessions: Sessions,
    private readonly mail: AccountMail,
    private readonly audit: Audit,
  ) {}

  /** What an authenticator app needs. Nothing is asked for until its first code has come back. */
  async begin(actor: Actor): Promise<NewSecondFactorView> {
    return this.uow.run(async (tx) => {
      const account = await this.uow.row<AccountRow>(tx, SELECT_ACCOUNT, [actor.userId]);
      const secret = await this.secondFactors.begin(tx, actor.userId);
      return { secret: toBase32(secret), address: totpAddress(secret, account?.email ?? actor.name) };
    });
  }

  /** @throws AppError invalid_input for a code that does not fit; illegal_move when nothing waits for one */
  async confirm(actor: Actor, code: string, origin: Origin): Promise<RecoveryCodesView> {
    await this.limits.take(proofLimits(actor.userId));
    return this.uow.run(async (tx) => {
      const codes = await this.secondFactors.confirm(tx, actor.userId, code);
      await this.sessions.prove(tx, actor.sessionId);
      await this.record(tx, { actor, action: 'second_factor.set', notice: 'second_factor_set', origin });
      return { codes };
    });
  }

  async remove(actor: Actor, origin: Origin): Promise<void> {
    await this.uow.run(async (tx) => {
      if (!(await this.secondFactors.remove(tx, actor.userId))) throw new AppError('illegal_move');
      const record = { action: 'second_factor.removed', notice: 'second_factor_removed' } as const;
      await this.record(tx, { actor, origin, ...record });
    });
  }

  async renewRecoveryCodes(actor: Actor, origin: Origin): Promise<RecoveryCodesView> {
    const { isSet } = await this.secondFactors.state(actor.userId);
    if (!isSet) throw new AppError('illegal_move');
    return this.uow.run(async (tx) => {
      const codes = await this.secondFactors.renewRecoveryCodes(tx, actor.userId);
      const record = { action: 'recovery_codes.renewed', notice: 'recovery_codes_renewed' } as const;
      await this.record(tx, { actor, origin, ...record });
      return { codes };
    });
  }

  private async record(
    tx: Tx,
    {
      actor,
      action,
      notice,
      origin,
    }: { actor: Actor; action: string; notice: AccountNotice; origin: Origin },
  ): Promise<void> {
    await this.mail.sendNotice(tx, actor.userId, notice);
    await this.audit.write(tx, { actor, action, subject: { type: 'user', id: actor.userId }, origin });
  }
}
