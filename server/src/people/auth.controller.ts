import { Body, Controller, Get, HttpCode, HttpStatus, Inject, Post, Req, Res } from '@nestjs/common';
import type { Request, Response } from 'express';
import {
  signInSchema,
  signUpSchema,
  verifyEmailSchema,
  type Actor,
  type MeView,
  type SignIn,
  type SignUp,
  type VerifyEmail,
} from '@kerfyard/common/people';
import {
  CurrentActor,
  Public,
  RequestOrigin,
  SignedIn,
  type Origin,
} from '../platform/auth/access.decorators.ts';
import { clearSessionCookies, readCookie, setSessionCookies } from '../platform/auth/cookies.ts';
import { Sessions } from '../platform/auth/sessions.ts';
import { CONFIG, type Config } from '../platform/config/config.ts';
import { AppError } from '../platform/http/app-error.ts';
import { Me } from './me.ts';
import { SignInService } from './sign-in.ts';
import { SignUpService } from './sign-up.ts';

@Controller('auth')
export class AuthController {
  constructor(
    @Inject(CONFIG) private readonly config: Config,
    private readonly signUps: SignUpService,
    private readonly signIns: SignInService,
    private readonly sessions: Sessions,
    private readonly people: Me,
  ) {}

  @Post('sign-up')
  @Public()
  @HttpCode(HttpStatus.ACCEPTED)
  async signUp(
    @Body({ schema: signUpSchema }) input: SignUp,
    @RequestOrigin() origin: Origin,
  ): Promise<void> {
    await this.signUps.signUp(input, origin);
  }

  @Post('verify')
  @Public()
  @HttpCode(HttpStatus.NO_CONTENT)
  async verify(
    @Body({ schema: verifyEmailSchema }) { token }: VerifyEmail,
    @RequestOrigin() origin: Origin,
  ): Promise<void> {
    await this.signUps.verify(token, origin);
  }

  @Post('sign-in')
  @Public()
  @HttpCode(HttpStatus.OK)
  async signIn(
    @Body({ schema: signInSchema }) input: SignIn,
    @RequestOrigin() origin: Origin,
    @Req() request: Request,
    @Res({ passthrough: true }) response: Response,
  ): Promise<MeView> {
    const tokens = await this.signIns.signIn(input, readCookie(this.config, request, 'refresh'), origin);
    setSessionCookies(this.config, response, tokens);
    return this.people.viewOf(tokens.access);
  }

  @Post('refresh')
  @Public()
  @HttpCode(HttpStatus.NO_CONTENT)
  async refresh(
    @RequestOrigin() origin: Origin,
    @Req() request: Request,
    @Res({ passthrough: true }) response: Response,
  ): Promise<void> {
    const tokens = await this.sessions.refresh(readCookie(this.config, request, 'refresh'), origin);
    if (tokens === null) {
      clearSessionCookies(this.config, response);
      throw new AppError('unauthenticated');
    }
    setSessionCookies(this.config, response, tokens);
  }

  @Post('sign-out')
  @Public()
  @HttpCode(HttpStatus.NO_CONTENT)
  async signOut(
    @RequestOrigin() origin: Origin,
    @Req() request: Request,
    @Res({ passthrough: true }) response: Response,
  ): Promise<void> {
    clearSessionCookies(this.config, response);
    await this.sessions.signOut(readCookie(this.config, request, 'refresh'), origin);
  }

  @Get('me')
  @SignedIn()
  me(@CurrentActor() actor: Actor): Promise<MeView> {
    return this.people.view(actor);
  }
}
