import type { NextFunction, Request, Response } from 'express';
import type { Config } from '../config/config.ts';
import { AppError } from './app-error.ts';
import { allowedOrigins, isFromOurPages } from './origins.ts';
import { isWebhookPath } from './webhook-paths.ts';

const READS = new Set(['GET', 'HEAD', 'OPTIONS']);

/**
 * Guards every change against requests that another site makes a browser send: a header that a form cannot set and a
 * browser sends across origins only after asking, and an origin that is ours. Webhooks prove themselves by signature.
 */
export function fromHere(config: Config) {
  const origins = allowedOrigins(config);
  return (request: Request, _response: Response, next: NextFunction): void => {
    if (READS.has(request.method) || isWebhookPath(request.path)) {
      next();
      return;
    }
    const isOurs = isFromOurPages(origins, request.headers);
    next(isOurs && request.get('x-kerfyard') === '1' ? undefined : new AppError('not_from_here'));
  };
}
