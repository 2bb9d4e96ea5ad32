import { createParamDecorator, SetMetadata, type ExecutionContext } from '@nestjs/common';
import type { Request } from 'express';
import type { Actor, PermissionName } from '@kerfyard/common/people';
import { AppError } from '../http/app-error.ts';

export const ACCESS = 'kerfyard:access';
export type Access =
  { kind: 'public' } | { kind: 'signed_in' } | { kind: 'permission'; name: PermissionName };

/** No sign-in needed. A route without this, `@SignedIn()` or `@Needs()` fails the walk of all routes and answers 403. */
export const Public = () => SetMetadata(ACCESS, { kind: 'public' } satisfies Access);
/** Any signed-in person, whatever the role. */
export const SignedIn = () => SetMetadata(ACCESS, { kind: 'signed_in' } satisfies Access);
/** A permission of `common/people/permissions`. Whose thing it is, the service checks first. */
export const Needs = (name: PermissionName) =>
  SetMetadata(ACCESS, { kind: 'permission', name } satisfies Access);

export const RECENT_SIGN_IN = 'kerfyard:recent-sign-in';
export type RecentSignInFrom = 'everyone' | 'second_factor_holders' | 'money_movers';

/**
 * For sensitive acts: the session's holder gave a password or a code within ten minutes; else 403 with the code that
 * says which to ask for, and the page goes on with the same request afterwards. `second_factor_holders`: asked only of
 * those who have one. `money_movers`: so too, but whoever has none is refused where the settings demand one.
 * Beside `@SignedIn()` or `@Needs()`.
 */
export const RecentSignIn = (from: RecentSignInFrom = 'everyone') => SetMetadata(RECENT_SIGN_IN, from);

export interface RequestWithActor extends Request {
  actor?: Actor;
  id: string;
}

/** The person asking. Only on routes that need sign-in. */
export const CurrentActor = createParamDecorator((_: unknown, context: ExecutionContext): Actor => {
  const { actor } = context.switchToHttp().getRequest<RequestWithActor>();
  if (actor === undefined) throw new AppError('unauthenticated');
  return actor;
});

/** Where a request comes from, for audit rows and signatures. */
export interface Origin {
  ip: string;
  requestId: string;
  userAgent: string;
}
export const RequestOrigin = createParamDecorator((_: unknown, context: ExecutionContext): Origin => {
  const request = context.switchToHttp().getRequest<RequestWithActor>();
  return {
    ip: request.ip ?? '',
    requestId: request.id,
    userAgent: (request.get('user-agent') ?? '').slice(0, 300),
  };
});
