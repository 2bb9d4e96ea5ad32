import { Inject, Injectable, type OnModuleInit } from '@nestjs/common';
import { CONFIG, type Config } from '../platform/config/config.ts';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import type { MailContent } from '../platform/mail/mail-content.ts';
import { Mailer } from '../platform/mail/mailer.ts';
import { SELECT_WAITING_SIGN_UP, type WaitingSignUpRow } from './people.queries.ts';
import { signUpMailWords } from './people.words.en.ts';
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
    return signUp.has_account ? accountExists() : this.confirm(signUpId, signUp);
  }

  private confirm(signUpId: string, { name, company_name }: WaitingSignUpRow): MailContent {
    const words = signUpMailWords.confirm;
    const token = verifyToken(this.config.signingSecret, signUpId);
    return {
      subject: words.subject,
      lines: words.lines(name, company_name),
      action: { label: words.action, path: `/verify?token=${token}` },
    };
  }
}

function accountExists(): MailContent {
  const { subject, lines, action } = signUpMailWords.hasAccount;
  return { subject, lines: [...lines], action: { label: action, path: '/sign-in' } };
}
