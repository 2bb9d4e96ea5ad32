import { Body, Controller, Delete, Get, HttpCode, HttpStatus, Param, Post, Put } from '@nestjs/common';
import { idSchema } from '@kerfyard/common/api';
import {
  changeEmailSchema,
  changePasswordSchema,
  confirmSchema,
  setSecondFactorSchema,
  type AccountView,
  type Actor,
  type ChangeEmail,
  type ChangePassword,
  type Confirm,
  type NewSecondFactorView,
  type RecoveryCodesView,
  type SessionEndView,
  type SessionView,
  type SetSecondFactor,
} from '@kerfyard/common/people';
import {
  CurrentActor,
  RecentSignIn,
  RequestOrigin,
  SignedIn,
  type Origin,
} from '../platform/auth/access.decorators.ts';
import { EmailChange } from './change-email.ts';
import { PasswordChange } from './change-password.ts';
import { ConfirmSignIn } from './confirm-sign-in.ts';
import { OwnAccount } from './own-account.ts';
import { OwnSecondFactor } from './own-second-factor.ts';
import { OwnSessions } from './own-sessions.ts';

/** One's own account: always the actor's. */
@Controller('account')
@SignedIn()
export class AccountController {
  constructor(
    private readonly account: OwnAccount,
    private readonly passwords: PasswordChange,
    private readonly emails: EmailChange,
    private readonly confirmation: ConfirmSignIn,
    private readonly secondFactor: OwnSecondFactor,
    private readonly sessions: OwnSessions,
  ) {}

  @Get()
  view(@CurrentActor() actor: Actor): Promise<AccountView> {
    return this.account.view(actor);
  }

  @Post('confirm')
  @HttpCode(HttpStatus.NO_CONTENT)
  confirm(
    @CurrentActor() actor: Actor,
    @Body({ schema: confirmSchema }) input: Confirm,
    @RequestOrigin() origin: Origin,
  ): Promise<void> {
    return this.confirmation.confirm(actor, input, origin);
  }

  // The present password is in the request, so only holders of a second factor are asked for more.
  @Put('password')
  @RecentSignIn('second_factor_holders')
  @HttpCode(HttpStatus.NO_CONTENT)
  changePassword(
    @CurrentActor() actor: Actor,
    @Body({ schema: changePasswordSchema }) input: ChangePassword,
    @RequestOrigin() origin: Origin,
  ): Promise<void> {
    return this.passwords.change(actor, input, origin);
  }

  @Post('email')
  @RecentSignIn()
  @HttpCode(HttpStatus.ACCEPTED)
  changeEmail(
    @CurrentActor() actor: Actor,
    @Body({ schema: changeEmailSchema }) { email }: ChangeEmail,
    @RequestOrigin() origin: Origin,
  ): Promise<void> {
    return this.emails.ask(actor, email, origin);
  }

  @Post('second-factor')
  @RecentSignIn()
  beginSecondFactor(@CurrentActor() actor: Actor): Promise<NewSecondFactorView> {
    return this.secondFactor.begin(actor);
  }

  @Post('second-factor/confirm')
  @RecentSignIn()
  confirmSecondFactor(
    @CurrentActor() actor: Actor,
    @Body({ schema: setSecondFactorSchema }) { code }: SetSecondFactor,
    @RequestOrigin() origin: Origin,
  ): Promise<RecoveryCodesView> {
    return this.secondFactor.confirm(actor, code, origin);
  }

  @Delete('second-factor')
  @RecentSignIn()
  @HttpCode(HttpStatus.NO_CONTENT)
  removeSecondFactor(@CurrentActor() actor: Actor, @RequestOrigin() origin: Origin): Promise<void> {
    return this.secondFactor.remove(actor, origin);
  }

  @Post('recovery-codes')
  @RecentSignIn()
  renewRecoveryCodes(
    @CurrentActor() actor: Actor,
    @RequestOrigin() origin: Origin,
  ): Promise<RecoveryCodesView> {
    return this.secondFactor.renewRecoveryCodes(actor, origin);
  }

  @Get('session')
  sessionEnd(@CurrentActor() actor: Actor): Promise<SessionEndView> {
    return this.sessions.end(actor);
  }

  @Get('sessions')
  listSessions(@CurrentActor() actor: Actor): Promise<SessionView[]> {
    return this.sessions.list(actor);
  }

  @Delete('sessions')
  @HttpCode(HttpStatus.NO_CONTENT)
  endOtherSessions(@CurrentActor() actor: Actor, @RequestOrigin() origin: Origin): Promise<void> {
    return this.sessions.endOthers(actor, origin);
  }

  @Delete('sessions/:id')
  @HttpCode(HttpStatus.NO_CONTENT)
  endSession(
    @CurrentActor() actor: Actor,
    @Param('id', { schema: idSchema }) id: string,
    @RequestOrigin() origin: Origin,
  ): Promise<void> {
    return this.sessions.endOne(actor, id, origin);
  }
}
