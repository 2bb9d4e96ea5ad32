import { Catch, HttpException, Logger, type ArgumentsHost, type ExceptionFilter } from '@nestjs/common';
import type { Response } from 'express';
import { errorCatalogue, type ErrorBody, type ErrorCode } from '@kerfyard/common/errors';
import type { RequestWithActor } from '../auth/access.decorators.ts';
import { databaseErrorToAppError } from '../database/constraint-codes.ts';
import { safeError } from '../logging/safe-error.ts';
import { AppError } from './app-error.ts';

/** What frameworks answer by themselves, in the catalogue's words. */
const codesByStatus: Record<number, ErrorCode> = {
  400: 'unreadable_body',
  401: 'unauthenticated',
  403: 'forbidden',
  404: 'not_found',
  413: 'too_large',
  415: 'wrong_type',
  422: 'invalid_input',
  429: 'too_many_requests',
};

/** The one place where an error becomes an answer. What is not in the catalogue is a fault: 500 with the request's id. */
@Catch()
export class ErrorFilter implements ExceptionFilter {
  private readonly logger = new Logger('Fault');

  catch(error: unknown, host: ArgumentsHost): void {
    if (host.getType() !== 'http') {
      this.logger.error({ fault: safeError(error) });
      return;
    }
    const http = host.switchToHttp();
    const request = http.getRequest<RequestWithActor>();
    const response = http.getResponse<Response>();
    const answer = toAppError(error);
    if (answer.status >= 500) this.logger.error({ requestId: request.id, fault: safeError(error) });
    if (response.headersSent) {
      response.destroy();
      return;
    }
    const { retryAfterSeconds } = answer.details;
    if (retryAfterSeconds !== undefined) response.setHeader('Retry-After', String(retryAfterSeconds));
    response.setHeader('Cache-Control', 'no-store');
    response.status(answer.status).json(toErrorBody(answer, request.id));
  }
}

export function toErrorBody(error: AppError, requestId: string): ErrorBody {
  const { fields } = error.details;
  return {
    error: {
      code: error.code,
      message: error.message,
      ...(fields === undefined ? {} : { fields }),
      requestId,
    },
  };
}

function toAppError(error: unknown): AppError {
  if (error instanceof AppError) return error;
  const fromDatabase = databaseErrorToAppError(error);
  if (fromDatabase !== null) return fromDatabase;
  const status = statusOf(error);
  // A status below 500 comes from the framework reading the request; its own message may repeat what was sent.
  const code = status >= 400 && status < 500 ? (codesByStatus[status] ?? 'unreadable_body') : 'internal';
  return new AppError(code, { message: errorCatalogue[code].message });
}

function statusOf(error: unknown): number {
  if (error instanceof HttpException) return error.getStatus();
  const status = (error as { status?: unknown } | null)?.status;
  return typeof status === 'number' ? status : 500;
}
