import { Inject, Injectable, type CanActivate, type ExecutionContext } from '@nestjs/common';
import { Reflector } from '@nestjs/core';
import { CONFIG, type Config } from '../config/config.ts';
import { UnitOfWork } from '../database/unit-of-work.ts';
import { AppError } from '../http/app-error.ts';
import { RECENT_SIGN_IN, type RecentSignInFrom, type RequestWithActor } from './access.decorators.ts';
import { SELECT_PROOF, type ProofRow } from './session.queries.ts';
import { RECENT_SECONDS } from './session-times.ts';

/** Stands behind the access guard on routes that declare `@RecentSignIn()`. */
@Injectable()
export class RecentSignInGuard implements CanActivate {
  constructor(
    @Inject(CONFIG) private readonly config: Config,
    private readonly reflector: Reflector,
    private readonly uow: UnitOfWork,
  ) {}

  async canActivate(context: ExecutionContext): Promise<boolean> {
    const from = this.reflector.getAllAndOverride<RecentSignInFrom | undefined>(RECENT_SIGN_IN, [
      context.getHandler(),
      context.getClass(),
    ]);
    if (from === undefined || context.getType() !== 'http') return true;
    const { actor } = context.switchToHttp().getRequest<RequestWithActor>();
    if (actor === undefined) throw new AppError('unauthenticated');
    const proof = await this.uow.row<ProofRow>(null, SELECT_PROOF, [actor.sessionId, RECENT_SECONDS]);
    if (proof === null) throw new AppError('unauthenticated');
    if (from !== 'everyone' && !proof.has_second_factor) {
      if (from === 'money_movers' && this.config.secondFactor === 'money') {
        throw new AppError('second_factor_required');
      }
      return true;
    }
    if (proof.is_recent) return true;
    throw new AppError(proof.has_second_factor ? 'confirm_with_code' : 'confirm_with_password');
  }
}
