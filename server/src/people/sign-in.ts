import { Injectable } from '@nestjs/common';
import type { SignIn } from '@kerfyard/common/people';
import type { Origin } from '../platform/auth/access.decorators.ts';
import type { SessionTokens } from '../platform/auth/cookies.ts';
import { Passwords } from '../platform/auth/passwords.ts';
import { parseRefreshToken } from '../platform/auth/refresh-token.ts';
import { Sessions } from '../platform/auth/sessions.ts';
import { Audit } from '../platform/audit/audit.ts';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { RateLimits, type LimitedSubject, type Window } from '../platform/limits/rate-limits.ts';
import { LiveHints } from '../platform/realtime/live-hints.ts';
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

@Injectable()
export class SignInService {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly passwords: Passwords,
    private readonly limits: RateLimits,
    private readonly sessions: Sessions,
    private readonly audit: Audit,
    private readonly hints: LiveHints,
  ) {}

  /**
   * A new session for the right password. One answer for an unknown address, a wrong password and an account that may
   * not sign in, after exactly one argon2 verification.
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
    await this.limits.forget(pair);
    return this.open(account.id, refreshCookie, origin);
  }

  /** Unknown accounts are counted as well: the wait must not tell which exist. */
  private async limitAccount(email: string, isKnownAddress: boolean): Promise<void> {
    const wait = await this.limits.count([{ parts: ['sign-in', 'account', email], windows: perAccount }]);
    if (wait > 0 && !isKnownAddress) throw new AppError('too_many_requests', { retryAfterSeconds: wait });
  }

  /** Opens a session of its own and ends the one that the browser held before. */
  async open(userId: string, refreshCookie: string | null, origin: Origin): Promise<SessionTokens> {
    const former = parseRefreshToken(refreshCookie);
    let isFormerEnded = false;
    const tokens = await this.uow.run(async (tx) => {
      isFormerEnded =
        former !== null && (await this.sessions.endHeldBy(tx, former, 'signed_in_again', origin));
      const opened = await this.sessions.open(tx, userId, origin);
      await this.audit.write(tx, {
        actor: null,
        action: 'session.opened',
        subject: { type: 'user', id: userId },
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
