import 'reflect-metadata';
import cookieParser from 'cookie-parser';
import { NestFactory } from '@nestjs/core';
import type { NestExpressApplication } from '@nestjs/platform-express';
import { AppModule } from './app.module.ts';
import type { Config } from './platform/config/config.ts';
import { serveApiDocs } from './platform/http/api-docs.ts';
import { JSON_LIMIT_BYTES, limitBody } from './platform/http/body-limits.ts';
import { demandJson } from './platform/http/body-types.ts';
import { serveClient } from './platform/http/client-files.ts';
import { fromHere } from './platform/http/from-here.ts';
import { noStore, securityHeaders } from './platform/http/security-headers.ts';
import { LiveAdapter } from './platform/realtime/live.adapter.ts';
import { createLogger, NestLog, requestLog } from './platform/logging/logging.ts';

/**
 * The whole app, ready to listen. Routes lie under `/api` (the prefix is set here: a controller says `scopes`, not
 * `api/scopes`); every other address is the client's.
 */
export async function bootstrap(config: Config): Promise<NestExpressApplication> {
  const logger = createLogger(config);
  const app = await NestFactory.create<NestExpressApplication>(AppModule.register(config), {
    logger: new NestLog(logger),
    bodyParser: false,
    rawBody: true,
    abortOnError: false,
  });
  app.disable('x-powered-by');
  app.set('trust proxy', config.trustProxy);
  app.setGlobalPrefix('api');
  app.use(requestLog(logger));
  app.use(securityHeaders(config));
  app.use(noStore);
  if (config.clientDist !== null) serveClient(app, config.clientDist);
  app.use(fromHere(config));
  app.use(cookieParser());
  app.use(demandJson);
  app.useBodyParser('json', { limit: JSON_LIMIT_BYTES, strict: true });
  app.use(limitBody);
  app.useWebSocketAdapter(new LiveAdapter(app, config));
  if (config.mode === 'development') await serveApiDocs(app);
  return app;
}
