import { Body, Controller, Get, HttpCode, HttpStatus, Inject, Post, Req, Res } from '@nestjs/common';
import type { Request, Response } from 'express';
import { z } from 'zod';
import type { DemoPersonView, MeView } from '@kerfyard/common/people';
import { Public, RequestOrigin, type Origin } from '../platform/auth/access.decorators.ts';
import { readCookie, setSessionCookies } from '../platform/auth/cookies.ts';
import { CONFIG, type Config } from '../platform/config/config.ts';
import { Me } from '../people/me.ts';
import { DemoPeople } from './demo-people.ts';

const demoSignInSchema = z.strictObject({ key: z.string().min(1).max(80) });

/** One press into the demo. Where there is no demo it has nobody, and nobody can be entered. */
@Controller('demo')
export class DemoController {
  constructor(
    @Inject(CONFIG) private readonly config: Config,
    private readonly demo: DemoPeople,
    private readonly people: Me,
  ) {}

  @Get('people')
  @Public()
  list(): Promise<DemoPersonView[]> {
    return this.demo.list();
  }

  @Post('sign-in')
  @Public()
  @HttpCode(HttpStatus.OK)
  async signIn(
    @Body({ schema: demoSignInSchema }) { key }: z.infer<typeof demoSignInSchema>,
    @RequestOrigin() origin: Origin,
    @Req() request: Request,
    @Res({ passthrough: true }) response: Response,
  ): Promise<MeView> {
    const tokens = await this.demo.signIn(key, readCookie(this.config, request, 'refresh'), origin);
    setSessionCookies(this.config, response, tokens);
    return this.people.viewOf(tokens.access);
  }
}
