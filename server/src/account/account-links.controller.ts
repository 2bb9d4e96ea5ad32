import { Body, Controller, HttpCode, HttpStatus, Post } from '@nestjs/common';
import {
  askResetSchema,
  linkSchema,
  resetPasswordSchema,
  type AskReset,
  type LinkUse,
  type ResetPassword,
} from '@kerfyard/common/people';
import { Public, RequestOrigin, type Origin } from '../platform/auth/access.decorators.ts';
import { EmailChange } from './change-email.ts';
import { PasswordResets } from './reset-password.ts';

/** What a link in a mail leads to; whoever holds it need not be signed in, and is not signed in by it. */
@Controller('auth')
@Public()
export class AccountLinksController {
  constructor(
    private readonly resets: PasswordResets,
    private readonly emails: EmailChange,
  ) {}

  @Post('reset')
  @HttpCode(HttpStatus.ACCEPTED)
  askReset(
    @Body({ schema: askResetSchema }) { email }: AskReset,
    @RequestOrigin() origin: Origin,
  ): Promise<void> {
    return this.resets.ask(email, origin);
  }

  @Post('reset/use')
  @HttpCode(HttpStatus.NO_CONTENT)
  useReset(
    @Body({ schema: resetPasswordSchema }) input: ResetPassword,
    @RequestOrigin() origin: Origin,
  ): Promise<void> {
    return this.resets.use(input, origin);
  }

  @Post('email/confirm')
  @HttpCode(HttpStatus.NO_CONTENT)
  confirmEmail(
    @Body({ schema: linkSchema }) { token }: LinkUse,
    @RequestOrigin() origin: Origin,
  ): Promise<void> {
    return this.emails.confirm(token, origin);
  }
}
