import { Injectable } from '@nestjs/common';
import type { SignIn } from '@kerfyard/common/people';
import type { Origin } from '../platform/auth/access.decorators.ts';
import type { SessionTokens } from '../platform/auth/cookies.ts';
import { Passwords } from '../platform/auth/passwords.ts';
import { parseRefreshToken } from '../platform/auth/refresh-token.ts';
import { SecondFactors } from '../platform/auth/second-factors.ts';
import { Sessions } from '../platform/auth/sessions.ts';
import { Audit } from '../platform/audit/audit.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { RateLimits, type LimitedSubject, type Window } from '../platform/limits/rate-limits.ts';
import { Mailer } from '../platform/mail/mailer.ts';
import { LiveHints } from '../platform/realtime/live-hints.ts';
import { ACCOUNT_NOTICE } from './account-notice.ts';
import { SELECT_CREDENTIALS, type CredentialsRow } from './people.queries.ts';

/** Longer and longer waits for one account from one address. */
const perPair: readonly Window[] = [
  { hits: 5, seconds: 60 },
  { hits: 12, seconds: 900 },
  { hits: 40, seconds: 86_400 },
];
/** An office shares one address. */
const perAddress: readonly Window[] = [
  { hits: 40, seconds: 300 },
  { hits: 400, seconds: 86_400 },
];
/** From everywhere together: stops a spread-out attack, but not the owner at an address used before. */
const perAccount: readonly Window[] = [{ hits: 60, seconds: 3_600 }];
/** Codes of one person, from everywhere: only those who know the password get to try one. */
const perCodeHolder: readonly Window[] = [
  { hits: 6, seconds: 60 },
  { hits: 20, seconds: 900 },
  { hits: 60, seconds: 86_400 },
];

@Injectable()
export class SignInService {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly passwords: Passwords,
    private readonly limits: RateLimits,
    private readonly sessions: Sessions,
    private readonly secondFactors: SecondFactors,
    private readonly audit: Audit,
    private readonly hints: LiveHints,
    private readonly mailer: Mailer,
  ) {}

  /**
   * A new session for the right password, and the right code where there is a second factor. One answer for an unknown
   * address, a wrong password and an account that may not sign in, after exactly one argon2 verification.
   * @throws AppError second_factor_needed when the password was right and a code is still to come; wrong_code
   */
  async signIn(input: SignIn, refreshCookie: string | null, origin: Origin): Promise<SessionTokens> {
    const pair: LimitedSubject = { parts: ['sign-in', 'pair', input.email, origin.ip], windows: perPair };
    await this.limits.take([pair, { parts: ['sign-in', 'address', origin.ip], windows: perAddress }]);
    const account = await this.uow.row<CredentialsRow>(null, SELECT_CREDENTIALS, [input.email, origin.ip]);
    await this.limitAccount(input.email, account?.is_known_address ?? false);
    const isRight = await this.passwords.verify(account?.password_hash ?? null, input.password);
    if (account === null || !isRight || !account.may_sign_in) {
      await this.recordFailure(account?.id ?? null, origin);
      throw new AppError('wrong_credentials');
    }
    const tokens = account.has_second_factor
      ? await this.openByCode(account.id, { code: input.code, refreshCookie, origin })
      : await this.open(account.id, refreshCookie, origin);
    await this.limits.forget(pair);
    return tokens;
  }

  private async openByCode(
    userId: string,
    {
      code,
      refreshCookie,
      origin,
    }: { code: string | undefined; refreshCookie: string | null; origin: Origin },
  ): Promise<SessionTokens> {
    if (code === undefined) throw new AppError('second_factor_needed');
    await this.limits.take([{ parts: ['sign-in', 'code', userId], windows: perCodeHolder }]);
    try {
      return await this.open(userId, refreshCookie, origin, (tx) => this.takeCode(tx, userId, code));
    } catch (error) {
      if (error instanceof AppError && error.code === 'wrong_code') await this.recordFailure(userId, origin);
      throw error;
    }
  }

  private async takeCode(tx: Tx, userId: string, code: string): Promise<'code' | 'recovery_code'> {
    const taken = await this.secondFactors.take(tx, userId, code);
    if (taken === null) throw new AppError('wrong_code');
    if (taken === 'recovery_code') {
      await this.mailer.toUsers(tx, ACCOUNT_NOTICE, [userId], { what: 'recovery_code_used' });
    }
    return taken;
  }

  /** After a reset by mail: what a stranger tried does not keep the owner out. */
  async forgetTries({ id, email }: { id: string; email: string }, origin: Origin): Promise<void> {
    await this.limits.forget({ parts: ['sign-in', 'account', email], windows: perAccount });
    await this.limits.forget({ parts: ['sign-in', 'pair', email, origin.ip], windows: perPair });
    await this.limits.forget({ parts: ['sign-in', 'code', id], windows: perCodeHolder });
  }

  /** Unknown accounts are counted as well: the wait must not tell which exist. */
  private async limitAccount(email: string, isKnownAddress: boolean): Promise<void> {
    const wait = await this.limits.count([{ parts: ['sign-in', 'account', email], windows: perAccount }]);
    if (wait > 0 && !isKnownAddress) throw new AppError('too_many_requests', { retryAfterSeconds: wait });
  }

  /**
   * Opens a session of its own and ends the one that the browser held before.
   * @param prove takes a code in the same transaction, and throws when it does not fit
   */
  async open(
    userId: string,
    refreshCookie: string | null,
    origin: Origin,
    prove?: (tx: Tx) => Promise<'code' | 'recovery_code'>,
  ): Promise<SessionTokens> {
    const former = parseRefreshToken(refreshCookie);
    let isFormerEnded = false;
    const tokens = await this.uow.run(async (tx) => {
      const secondFactor = prove === undefined ? null : await prove(tx);
      isFormerEnded =
        former !== null && (await this.sessions.endHeldBy(tx, former, 'signed_in_again', origin));
      const opened = await this.sessions.open(tx, userId, origin);
      await this.audit.write(tx, {
        actor: null,
        action: 'session.opened',
        subject: { type: 'user', id: userId },
        ...(secondFactor === null ? {} : { detail: { secondFactor } }),
        origin,
      });
      return opened;
    });
    if (former !== null && isFormerEnded) this.hints.endSession(former.sessionId);
    return tokens;
  }

  private recordFailure(userId: string | null, origin: Origin): Promise<void> {
    return this.uow.run((tx) =>
      this.audit.write(tx, {
        actor: null,
        action: 'session.refused',
        subject: { type: 'user', id: userId ?? 'unknown' },
        origin,
      }),
    );
  }
}
