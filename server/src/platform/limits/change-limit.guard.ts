import { Injectable, type CanActivate, type ExecutionContext } from '@nestjs/common';
import type { RequestWithActor } from '../auth/access.decorators.ts';
import { isWebhookPath } from '../http/webhook-paths.ts';
import { RateLimits, type Window } from './rate-limits.ts';

/** Far above what a person does by hand; drafts are saved as typed, so it is not low. */
const perPerson: readonly Window[] = [
  { hits: 240, seconds: 60 },
  { hits: 5_000, seconds: 3_600 },
];
const perAddress: readonly Window[] = [{ hits: 60, seconds: 60 }];

/** Limits changes: per person, or per address where nobody is signed in. Runs after the access guard. */
@Injectable()
export class ChangeLimitGuard implements CanActivate {
  constructor(private readonly limits: RateLimits) {}

  async canActivate(context: ExecutionContext): Promise<boolean> {
    if (context.getType() !== 'http') return true;
    const request = context.switchToHttp().getRequest<RequestWithActor>();
    if (request.method === 'GET' || request.method === 'HEAD' || isWebhookPath(request.path)) return true;
    const { actor } = request;
    await this.limits.take([
      actor === undefined
        ? { parts: ['change', 'address', request.ip ?? ''], windows: perAddress }
        : { parts: ['change', 'person', actor.userId], windows: perPerson },
    ]);
    return true;
  }
}
