import { Global, Module } from '@nestjs/common';
import { APP_GUARD } from '@nestjs/core';
import { JwtModule } from '@nestjs/jwt';
import { PassportModule } from '@nestjs/passport';
import { AccessGuard } from './access.guard.ts';
import { AccessTokenStrategy } from './access-token.strategy.ts';
import { AccessTokens } from './access-tokens.ts';
import { Sessions } from './sessions.ts';

/** Sessions, and the guard before every route. */
@Global()
@Module({
  imports: [PassportModule, JwtModule.register({})],
  providers: [Sessions, AccessTokens, AccessTokenStrategy, { provide: APP_GUARD, useClass: AccessGuard }],
  exports: [Sessions, AccessTokens],
})
export class AuthModule {}
