import { Inject, Injectable } from '@nestjs/common';
import { JwtService } from '@nestjs/jwt';
import { z } from 'zod';
import { CONFIG, type Config } from '../config/config.ts';
import { deriveKey } from '../crypto/sealing.ts';

export const ACCESS_AUDIENCE = 'kerfyard';
export const ACCESS_MINUTES = 10;

export const accessClaimsSchema = z.object({
  sub: z.uuid(),
  sid: z.uuid(),
  typ: z.literal('access'),
  aud: z.literal(ACCESS_AUDIENCE),
  exp: z.number(),
});
export type AccessClaims = z.infer<typeof accessClaimsSchema>;

/** The key that signs access tokens, and nothing else. */
export const accessTokenKey = (config: Config): Buffer =>
  deriveKey(config.signingSecret, 'kerfyard access token');

/** Short-lived proof of a session (JWT, RFC 7519, HS256). The session's row decides; the token only names it. */
@Injectable()
export class AccessTokens {
  private readonly key: Buffer;

  constructor(
    @Inject(CONFIG) config: Config,
    private readonly jwt: JwtService,
  ) {
    this.key = accessTokenKey(config);
  }

  sign(userId: string, sessionId: string): string {
    return this.jwt.sign(
      { typ: 'access', sid: sessionId },
      {
        secret: this.key,
        algorithm: 'HS256',
        subject: userId,
        audience: ACCESS_AUDIENCE,
        expiresIn: ACCESS_MINUTES * 60,
      },
    );
  }

  /** The claims, or null when anything about the token is not as it must be. For sockets; routes use passport. */
  read(token: string): AccessClaims | null {
    try {
      const claims: unknown = this.jwt.verify(token, {
        secret: this.key,
        algorithms: ['HS256'],
        audience: ACCESS_AUDIENCE,
      });
      return accessClaimsSchema.safeParse(claims).data ?? null;
    } catch {
      return null;
    }
  }
}
