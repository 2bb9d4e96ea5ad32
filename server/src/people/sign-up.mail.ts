import { Inject, Injectable, type OnModuleInit } from '@nestjs/common';
import { CONFIG, type Config } from '../platform/config/config.ts';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import type { MailContent } from '../platform/mail/mail-content.ts';
import { Mailer } from '../platform/mail/mailer.ts';
import { SELECT_WAITING_SIGN_UP, type WaitingSignUpRow } from './people.queries.ts';
import { verifyToken } from './verify-token.ts';

export const SIGN_UP_MAIL = 'sign_up';

/** The e-mail after a sign-up: the link, or, to an address with an account, that there is one. */
@Injectable()
export class SignUpMail implements OnModuleInit {
  constructor(
    @Inject(CONFIG) private readonly config: Config,
    private readonly uow: UnitOfWork,
    private readonly mailer: Mailer,
  ) {}

  onModuleInit(): void {
    this.mailer.register(
      SIGN_UP_MAIL,
      (data) => this.build(String(data.userId)),
      // Nobody has an account yet: the sign-up itself says whom to write to.
      (signUpId) => this.waiting(signUpId),
    );
  }

  private waiting(signUpId: string): Promise<WaitingSignUpRow | null> {
    return this.uow.row<WaitingSignUpRow>(null, SELECT_WAITING_SIGN_UP, [signUpId]);
  }

  private async build(signUpId: string): Promise<MailContent | null> {
    const signUp = await this.waiting(signUpId);
    if (signUp === null || (!signUp.is_open && !signUp.has_account)) return null;
    if (signUp.has_account) return accountExists;
    return {
      subject: 'Confirm your e-mail address',
      lines: [
        `Someone signed up with this address as ${signUp.name} of ${signUp.company_name}.`,
        'If that was you, confirm the address and then sign in with the password you chose. The link works once, for one hour.',
        'If it was not you, do nothing: without the link no account is made.',
      ],
      action: {
        label: 'Confirm the address',
        path: `/verify?token=${verifyToken(this.config.signingSecret, signUpId)}`,
      },
    };
  }
}

const accountExists: MailContent = {
  subject: 'You already have an account',
  lines: [
    'Someone signed up with this address, which already has an account. Nothing was changed.',
    'If that was you, sign in with the password you have. If it was not you, there is nothing to do.',
  ],
  action: { label: 'Sign in', path: '/sign-in' },
};
