import { Injectable, type ExecutionContext } from '@nestjs/common';
import { Reflector } from '@nestjs/core';
import { AuthGuard } from '@nestjs/passport';
import type { Actor } from '@kerfyard/common/people';
import { may } from '@kerfyard/common/people';
import { AppError } from '../http/app-error.ts';
import { ACCESS, type Access, type RequestWithActor } from './access.decorators.ts';
import { ACCESS_STRATEGY } from './access-token.strategy.ts';

/** Stands before every route and socket handler. What declares no access is refused. */
@Injectable()
export class AccessGuard extends AuthGuard(ACCESS_STRATEGY) {
  constructor(private readonly reflector: Reflector) {
    super({ session: false, property: 'actor' });
  }

  override async canActivate(context: ExecutionContext): Promise<boolean> {
    const access = this.reflector.getAllAndOverride<Access | undefined>(ACCESS, [
      context.getHandler(),
      context.getClass(),
    ]);
    if (access === undefined) throw new AppError('forbidden');
    if (access.kind === 'public') return true;
    const actor = await this.authenticate(context);
    if (access.kind === 'permission' && !may(actor, access.name)) throw new AppError('forbidden');
    return true;
  }

  private async authenticate(context: ExecutionContext): Promise<Actor> {
    if (context.getType() === 'ws') {
      // The handshake put it there; see the socket gateway.
      const { actor } = context.switchToWs().getClient<{ data: { actor?: Actor } }>().data;
      if (actor === undefined) throw new AppError('unauthenticated');
      return actor;
    }
    await super.canActivate(context);
    const { actor } = context.switchToHttp().getRequest<RequestWithActor>();
    if (actor === undefined) throw new AppError('unauthenticated');
    return actor;
  }

  /** passport's answer: its own reasons stay inside, a fault of ours is not "please sign in". */
  override handleRequest<Person>(error: unknown, person: Person | false): Person {
    if (error !== null && error !== undefined) throw error;
    if (person === false || person === undefined) throw new AppError('unauthenticated');
    return person;
  }
}
