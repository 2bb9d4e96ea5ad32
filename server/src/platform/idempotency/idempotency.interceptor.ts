import { Injectable, type CallHandler, type ExecutionContext, type NestInterceptor } from '@nestjs/common';
import { Reflector } from '@nestjs/core';
import type { Response } from 'express';
import { lastValueFrom, of, type Observable } from 'rxjs';
import { z } from 'zod';
import type { RequestWithActor } from '../auth/access.decorators.ts';
import { AppError } from '../http/app-error.ts';
import { IDEMPOTENT, type IdempotentOptions } from './idempotent-options.ts';
import { IdempotencyKeys, type Claim } from './idempotency-keys.ts';

const HEADER = 'Idempotency-Key';

@Injectable()
export class IdempotencyInterceptor implements NestInterceptor {
  constructor(
    private readonly reflector: Reflector,
    private readonly keys: IdempotencyKeys,
  ) {}

  async intercept(context: ExecutionContext, next: CallHandler): Promise<Observable<unknown>> {
    const http = context.switchToHttp();
    const request = http.getRequest<RequestWithActor>();
    const response = http.getResponse<Response>();
    const { keepsReply } = this.reflector.get<IdempotentOptions>(IDEMPOTENT, context.getHandler());
    const claim = readClaim(request);
    const earlier = await this.keys.claim(claim);
    if (earlier !== null) {
      response.status(earlier.status).setHeader('Idempotency-Replayed', 'true');
      return of(earlier.response ?? undefined);
    }
    const reply = await this.runOnce(claim, next);
    await this.keys.finish(claim, response.statusCode, keepsReply ? reply : undefined);
    return of(reply);
  }

  /** A refused or failed request did nothing (its transaction rolled back), so its key is free again. */
  private async runOnce(claim: Claim, next: CallHandler): Promise<unknown> {
    try {
      return await lastValueFrom(next.handle(), { defaultValue: undefined });
    } catch (error) {
      await this.keys.release(claim);
      throw error;
    }
  }
}

function readClaim(request: RequestWithActor): Claim {
  const { actor } = request;
  if (actor === undefined) throw new AppError('unauthenticated');
  const key = z.uuid().safeParse(request.get(HEADER));
  if (!key.success) throw AppError.field(HEADER, 'A UUID in this header, made once per form');
  return {
    ownerId: actor.company?.id ?? actor.userId,
    key: key.data,
    route: `${request.method} ${request.path}`,
    input: JSON.stringify([actor.userId, request.body ?? null]),
  };
}
