import { Global, Module } from '@nestjs/common';
import { APP_GUARD } from '@nestjs/core';
import { JwtModule } from '@nestjs/jwt';
import { PassportModule } from '@nestjs/passport';
import { ChangeLimitGuard } from '../limits/change-limit.guard.ts';
import { RateLimits } from '../limits/rate-limits.ts';
import { AccessGuard } from './access.guard.ts';
import { AccessTokenStrategy } from './access-token.strategy.ts';
import { AccessTokens } from './access-tokens.ts';
import { Actors } from './actors.ts';
import { Passwords } from './passwords.ts';
import { RecentSignInGuard } from './recent-sign-in.guard.ts';
import { SecondFactors } from './second-factors.ts';
import { Sessions } from './sessions.ts';

/**
 * Sessions, passwords, second factors, limits, and the guards before every route: access first, then whether its person
 * said lately who they are, then how often.
 */
@Global()
@Module({
  imports: [PassportModule, JwtModule.register({})],
  providers: [
    Sessions,
    Actors,
    AccessTokens,
    AccessTokenStrategy,
    Passwords,
    RateLimits,
    SecondFactors,
    { provide: APP_GUARD, useClass: AccessGuard },
    { provide: APP_GUARD, useClass: RecentSignInGuard },
    { provide: APP_GUARD, useClass: ChangeLimitGuard },
  ],
  exports: [Sessions, Actors, AccessTokens, Passwords, RateLimits, SecondFactors],
})
export class AuthModule {}
