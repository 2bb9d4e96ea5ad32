import { applyDecorators, SetMetadata, UseInterceptors } from '@nestjs/common';
import { IdempotencyInterceptor } from './idempotency.interceptor.ts';
import { IDEMPOTENT, type IdempotentOptions } from './idempotent-options.ts';

/**
 * The same request sent twice does one thing. The caller sends `Idempotency-Key` (a UUID made when its form opened);
 * a second request under the key gets the first one's answer, another input under it is refused. Put it beside the
 * access decorator of a POST that makes something.
 *
 * With `keepsReply: false` (replies that could carry an amount of a sealed bid) only the status is kept: the second
 * answer has no body and the header `Idempotency-Replayed: true`; the caller reads what it made.
 */
export const Idempotent = (options: IdempotentOptions = { keepsReply: true }) =>
  applyDecorators(SetMetadata(IDEMPOTENT, options), UseInterceptors(IdempotencyInterceptor));
