import { type DynamicModule, Global, Module } from '@nestjs/common';
import { Audit } from './audit/audit.ts';
import { Clock } from './clock/clock.ts';
import { CONFIG, type Config } from './config/config.ts';
import { KeyVault } from './crypto/key-vault.ts';
import { DatabaseModule } from './database/database.module.ts';
import { UnitOfWork } from './database/unit-of-work.ts';
import { IdempotencyKeys } from './idempotency/idempotency-keys.ts';
import { JobQueue } from './jobs/job-queue.ts';
import { Sweeps } from './jobs/sweeps.ts';
import { LiveHints } from './realtime/live-hints.ts';
import { WatchAccess } from './realtime/watch-access.ts';
import { createStripeClient, STRIPE } from './stripe/stripe-client.ts';

const services = [
  UnitOfWork,
  Clock,
  Audit,
  JobQueue,
  Sweeps,
  LiveHints,
  WatchAccess,
  KeyVault,
  IdempotencyKeys,
  { provide: STRIPE, inject: [CONFIG], useFactory: createStripeClient },
];
const exported = services.map((service) => ('provide' in service ? service.provide : service));

@Global()
@Module({})
export class ConfigModule {
  static register(config: Config): DynamicModule {
    return {
      module: ConfigModule,
      providers: [{ provide: CONFIG, useValue: config }],
      exports: [CONFIG],
    };
  }
}

/** What every feature stands on: settings, database, clock, audit, jobs, live hints, keys. */
@Global()
@Module({})
export class PlatformModule {
  static register(config: Config): DynamicModule {
    return {
      module: PlatformModule,
      imports: [ConfigModule.register(config), DatabaseModule],
      providers: services,
      exports: [...exported, DatabaseModule],
    };
  }
}
