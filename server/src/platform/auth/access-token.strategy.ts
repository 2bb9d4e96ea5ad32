import { Inject, Injectable } from '@nestjs/common';
import { PassportStrategy } from '@nestjs/passport';
import type { Request } from 'express';
import { Strategy } from 'passport-jwt';
import type { Actor } from '@kerfyard/common/people';
import { CONFIG, type Config } from '../config/config.ts';
import { ACCESS_AUDIENCE, accessClaimsSchema, accessTokenKey } from './access-tokens.ts';
import { Actors } from './actors.ts';
import { readCookie } from './cookies.ts';

export const ACCESS_STRATEGY = 'access-token';

/** Who sends the access cookie: the token proves which session, its row (read each time) who and whether still. */
@Injectable()
export class AccessTokenStrategy extends PassportStrategy(Strategy, ACCESS_STRATEGY) {
  constructor(
    @Inject(CONFIG) config: Config,
    private readonly actors: Actors,
  ) {
    super({
      jwtFromRequest: (request: Request) => readCookie(config, request, 'access'),
      secretOrKey: accessTokenKey(config),
      algorithms: ['HS256'],
      audience: ACCESS_AUDIENCE,
      ignoreExpiration: false,
    });
  }

  async validate(claims: unknown): Promise<Actor | false> {
    const parsed = accessClaimsSchema.safeParse(claims);
    if (!parsed.success) return false;
    return (await this.actors.ofSession(parsed.data)) ?? false;
  }
}
