import { Inject, Injectable, type OnModuleInit } from '@nestjs/common';
import type { SignUp } from '@kerfyard/common/people';
import type { Origin } from '../platform/auth/access.decorators.ts';
import { demandUnguessable } from '../platform/auth/unguessable.ts';
import { Passwords } from '../platform/auth/passwords.ts';
import { Audit } from '../platform/audit/audit.ts';
import { CONFIG, type Config } from '../platform/config/config.ts';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { newId } from '../platform/ids/ids.ts';
import { Sweeps } from '../platform/jobs/sweeps.ts';
import { RateLimits, type Window } from '../platform/limits/rate-limits.ts';
import { Mailer } from '../platform/mail/mailer.ts';
import { Accounts } from './accounts.ts';
import { SIGN_UP_MAIL } from './sign-up.mail.ts';
import {
  CLOSE_SIGN_UPS,
  DELETE_OLD_SIGN_UPS,
  INSERT_SIGN_UP,
  USE_SIGN_UP,
  type SignUpRow,
} from './people.queries.ts';
import { hashToken, verifyToken } from './verify-token.ts';

/** A link in a mail that may take its time; OWASP's Forgot Password cheat sheet asks for a short life. */
export const LINK_SECONDS = 3_600;

const perAddress: readonly Window[] = [
  { hits: 10, seconds: 600 },
  { hits: 40, seconds: 86_400 },
];
const perEmail: readonly Window[] = [
  { hits: 3, seconds: 600 },
  { hits: 8, seconds: 86_400 },
];

/**
 * Sign-up in two steps. The first does exactly the same for an address with and without an account; what differs is
 * only the e-mail, decided when it is written. The second makes the account.
 */
@Injectable()
export class SignUpService implements OnModuleInit {
  constructor(
    @Inject(CONFIG) private readonly config: Config,
    private readonly uow: UnitOfWork,
    private readonly passwords: Passwords,
    private readonly limits: RateLimits,
    private readonly mailer: Mailer,
    private readonly accounts: Accounts,
    private readonly audit: Audit,
    private readonly sweeps: Sweeps,
  ) {}

  onModuleInit(): void {
    this.sweeps.register('old sign-ups', async () => void (await this.uow.rows(null, DELETE_OLD_SIGN_UPS)));
  }

  async signUp(input: SignUp, origin: Origin): Promise<void> {
    demandUnguessable(input.password, [input.name, input.email, input.company.name]);
    await this.limits.take([
      { parts: ['sign-up', 'address', origin.ip], windows: perAddress },
      { parts: ['sign-up', 'e-mail', input.email], windows: perEmail },
    ]);
    const passwordHash = await this.passwords.hash(input.password);
    const id = newId();
    await this.uow.run(async (tx) => {
      await this.uow.rows(tx, INSERT_SIGN_UP, [
        id,
        input.email,
        input.name,
        passwordHash,
        input.company.kind,
        input.company.name,
        input.company.phone,
        hashToken(verifyToken(this.config.signingSecret, id)),
        LINK_SECONDS,
      ]);
      await this.mailer.toUsers(tx, SIGN_UP_MAIL, [id], {});
      await this.audit.write(tx, {
        actor: null,
        action: 'sign_up.asked',
        subject: { type: 'sign_up', id },
        origin,
      });
    });
  }

  /** The link was opened: make the company and its owner. Does not sign in. */
  async verify(token: string, origin: Origin): Promise<void> {
    await this.limits.take([{ parts: ['verify', 'address', origin.ip], windows: perAddress }]);
    await this.uow.run(async (tx) => {
      const signUp = await this.uow.row<SignUpRow>(tx, USE_SIGN_UP, [hashToken(token)]);
      if (signUp === null) throw linkIsDead();
      const userId = await this.accounts.createPerson(tx, {
        name: signUp.name,
        email: signUp.email,
        passwordHash: signUp.password_hash,
      });
      if (userId === null) throw linkIsDead();
      const companyId = await this.accounts.createCompany(tx, {
        kind: signUp.company_kind,
        name: signUp.company_name,
        phone: signUp.company_phone,
      });
      await this.accounts.addMember(tx, userId, { companyId, role: 'owner' });
      await this.uow.rows(tx, CLOSE_SIGN_UPS, [signUp.email]);
      await this.audit.write(tx, {
        actor: null,
        action: 'account.made',
        subject: { type: 'user', id: userId },
        detail: { companyId, role: 'owner', signUpId: signUp.id },
        origin,
      });
    });
  }
}

/** Used, run out, unknown and belonging to an address that has its account by now read the same. */
const linkIsDead = () =>
  AppError.field('token', 'This link has been used or has run out. Sign in, or sign up again for a new one.');
