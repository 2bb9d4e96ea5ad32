import type { LoggerService } from '@nestjs/common';
import { pino, type Logger } from 'pino';
import { pinoHttp, type HttpLogger } from 'pino-http';
import type { IncomingMessage } from 'node:http';
import type { Config } from '../config/config.ts';
import { requestId } from '../http/request-id.ts';
import { safeError } from './safe-error.ts';

/** One logger: lines of JSON on standard output. */
export function createLogger(config: Config): Logger {
  return pino({ level: config.logLevel, base: null, timestamp: pino.stdTimeFunctions.isoTime });
}

/**
 * One line a request: method, path, status, time. No query (links carry tokens), no headers (cookies), no bodies.
 */
export function requestLog(logger: Logger): HttpLogger {
  return pinoHttp({
    logger,
    genReqId: requestId,
    quietReqLogger: true,
    serializers: {
      req: (request: { id: string; method: string; url: string }) => ({
        id: request.id,
        method: request.method,
        path: pathOf(request.url),
      }),
      res: (response: { statusCode: number }) => ({ status: response.statusCode }),
      err: safeError,
    },
    autoLogging: { ignore: (request: IncomingMessage) => request.url === '/api/health' },
    customLogLevel: (_request, response) => (response.statusCode >= 500 ? 'error' : 'info'),
    customSuccessMessage: () => 'request',
    customErrorMessage: () => 'request',
  });
}

const pathOf = (url: string) => url.split('?', 1)[0] ?? '';

/** Nest's own lines through the same logger. */
export class NestLog implements LoggerService {
  constructor(private readonly logger: Logger) {}

  log(message: unknown, ...rest: unknown[]): void {
    this.logger.debug(line(message, rest));
  }
  error(message: unknown, ...rest: unknown[]): void {
    this.logger.error(line(message, rest));
  }
  warn(message: unknown, ...rest: unknown[]): void {
    this.logger.warn(line(message, rest));
  }
  debug(message: unknown, ...rest: unknown[]): void {
    this.logger.debug(line(message, rest));
  }
  verbose(message: unknown, ...rest: unknown[]): void {
    this.logger.trace(line(message, rest));
  }
  fatal(message: unknown, ...rest: unknown[]): void {
    this.logger.fatal(line(message, rest));
  }
}

/** Nest gives its context last; an object stays an object, an error only its safe part. */
function line(message: unknown, rest: unknown[]): Record<string, unknown> {
  const context = rest.at(-1);
  const where = typeof context === 'string' ? { context } : {};
  if (message instanceof Error) return { ...where, fault: safeError(message) };
  if (typeof message === 'object' && message !== null) return { ...where, ...message };
  const fault = rest.find((part): part is Error => part instanceof Error);
  return { ...where, msg: String(message), ...(fault === undefined ? {} : { fault: safeError(fault) }) };
}
