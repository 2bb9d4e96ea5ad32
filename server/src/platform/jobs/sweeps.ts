import { Injectable, Logger, type OnApplicationBootstrap } from '@nestjs/common';
import { JobQueue } from './job-queue.ts';

/**
 * Work done every minute by one server: features register what may have been missed. One failing sweep does not
 * stop the others; the next minute tries again.
 */
@Injectable()
export class Sweeps implements OnApplicationBootstrap {
  private readonly logger = new Logger(Sweeps.name);
  private readonly sweeps = new Map<string, () => Promise<void>>();

  constructor(private readonly jobs: JobQueue) {}

  register(name: string, sweep: () => Promise<void>): void {
    this.sweeps.set(name, sweep);
  }

  async onApplicationBootstrap(): Promise<void> {
    await this.jobs.work('sweep', () => this.runAll());
    await this.jobs.every('sweep', '* * * * *');
  }

  async runAll(): Promise<void> {
    for (const [name, sweep] of this.sweeps) {
      try {
        await sweep();
      } catch (error) {
        this.logger.error(`sweep "${name}" failed`, error instanceof Error ? error.stack : String(error));
      }
    }
  }
}
