import type { NextFunction, Request, Response } from 'express';
import { AppError } from './app-error.ts';
import { isWebhookPath } from './webhook-paths.ts';

const TAKEN = ['application/json', 'multipart/form-data'];

/** A body is JSON, or parts of an upload; anything else is not even read. */
export function demandJson(request: Request, _response: Response, next: NextFunction): void {
  const hasBody =
    request.headers['transfer-encoding'] !== undefined || Number(request.headers['content-length'] ?? 0) > 0;
  const isTaken = !hasBody || isWebhookPath(request.path) || Boolean(request.is(TAKEN));
  next(isTaken ? undefined : new AppError('wrong_type'));
}
