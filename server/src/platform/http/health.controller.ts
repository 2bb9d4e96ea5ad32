import {
  Controller,
  Get,
  HttpStatus,
  Inject,
  Injectable,
  Res,
  type BeforeApplicationShutdown,
} from '@nestjs/common';
import type { Response } from 'express';
import { setTimeout as sleep } from 'node:timers/promises';
import { Public } from '../auth/access.decorators.ts';
import { Clock } from '../clock/clock.ts';
import { CONFIG, type Config } from '../config/config.ts';

/** Knows whether the server wants more requests: not while it is being stopped. */
@Injectable()
export class Readiness implements BeforeApplicationShutdown {
  isStopping = false;

  constructor(@Inject(CONFIG) private readonly config: Config) {}

  /** Says "not ready" for a while before the port closes, so that a proxy looks elsewhere in time. */
  async beforeApplicationShutdown(): Promise<void> {
    this.isStopping = true;
    await sleep(this.config.drainMs);
  }
}

@Controller('health')
export class HealthController {
  constructor(
    private readonly readiness: Readiness,
    private readonly clock: Clock,
  ) {}

  @Get()
  @Public()
  async health(
    @Res({ passthrough: true }) response: Response,
  ): Promise<{ status: 'ok' | 'stopping' | 'no_database' }> {
    const status = this.readiness.isStopping ? 'stopping' : await this.databaseStatus();
    if (status !== 'ok') response.status(HttpStatus.SERVICE_UNAVAILABLE);
    return { status };
  }

  private databaseStatus(): Promise<'ok' | 'no_database'> {
    return this.clock.now().then(
      () => 'ok',
      () => 'no_database',
    );
  }
}
