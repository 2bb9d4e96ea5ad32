import { Module } from '@nestjs/common';
import { PeopleModule } from '../people/people.module.ts';
import { AccountController } from './account.controller.ts';
import { AccountLinksController } from './account-links.controller.ts';
import { AccountMail } from './account.mail.ts';
import { EmailChange } from './change-email.ts';
import { PasswordChange } from './change-password.ts';
import { ConfirmSignIn } from './confirm-sign-in.ts';
import { OwnAccount } from './own-account.ts';
import { OwnSecondFactor } from './own-second-factor.ts';
import { OwnSessions } from './own-sessions.ts';
import { PasswordResets } from './reset-password.ts';

@Module({
  imports: [PeopleModule],
  controllers: [AccountController, AccountLinksController],
  providers: [
    AccountMail,
    ConfirmSignIn,
    EmailChange,
    OwnAccount,
    OwnSecondFactor,
    OwnSessions,
    PasswordChange,
    PasswordResets,
  ],
})
export class AccountModule {}
