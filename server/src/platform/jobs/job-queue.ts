import { Inject, Injectable, Logger, type OnApplicationShutdown } from '@nestjs/common';
import PgBoss from 'pg-boss';
import { Sequelize } from 'sequelize';
import { CONFIG, type Config } from '../config/config.ts';
import { UnitOfWork, type Tx } from '../database/unit-of-work.ts';
import type { JobName, Jobs } from './queues.ts';

interface SendOptions {
  startAfter?: Date;
  /** Higher goes first; 0 unless given. */
  priority?: number;
  singletonKey?: string;
}

/**
 * The one runner of later work (pg-boss). `send` writes the job's row in the caller's transaction, so a job exists
 * exactly when the change it follows does. Delivery is at least once: handlers are idempotent by row id.
 */
@Injectable()
export class JobQueue implements OnApplicationShutdown {
  private readonly logger = new Logger(JobQueue.name);
  private readonly boss: PgBoss;
  private readonly workers = new Map<JobName, string[]>();
  private started: Promise<unknown> | null = null;

  constructor(
    @Inject(CONFIG) config: Config,
    @Inject(Sequelize) private readonly sequelize: Sequelize,
    private readonly uow: UnitOfWork,
  ) {
    this.boss = new PgBoss({
      connectionString: config.databaseUrl,
      migrate: false,
      max: 4,
      application_name: 'kerfyard-jobs',
    });
    this.boss.on('error', (error) => this.logger.error(error));
  }

  async start(): Promise<void> {
    this.started ??= this.boss.start();
    await this.started;
  }

  /** Put a job into the transaction. */
  async send<Name extends JobName>(
    tx: Tx,
    name: Name,
    data: Jobs[Name],
    options: SendOptions = {},
  ): Promise<void> {
    const db = {
      executeSql: async (text: string, values: unknown[]) => {
        // The driver takes undefined for null; Sequelize takes it for a missing parameter.
        const bind = values.map((value) => value ?? null);
        const [rows] = await this.sequelize.query(text, { bind, transaction: tx });
        return { rows: rows as unknown[] };
      },
    };
    await this.boss.send(name, data, { ...options, db });
    if (options.startAfter === undefined) this.uow.afterCommit(tx, () => this.wake(name));
  }

  /** Workers look by themselves every second; those of this process need not wait that long. */
  private wake(name: JobName): void {
    for (const id of this.workers.get(name) ?? []) this.boss.notifyWorker(id);
  }

  /** Handle jobs of one kind, one at a time per worker; a throw retries with back-off. */
  async work<Name extends JobName>(
    name: Name,
    handle: (data: Jobs[Name]) => Promise<void>,
    workers = 1,
  ): Promise<void> {
    await this.start();
    for (let n = 0; n < workers; n += 1) {
      const id = await this.boss.work<Jobs[Name]>(name, { pollingIntervalSeconds: 1 }, async ([job]) => {
        if (job !== undefined) await handle(job.data);
        // Where one waited there may be more: a backlog is worked off without a pause between its jobs.
        this.boss.notifyWorker(id);
      });
      this.workers.set(name, [...(this.workers.get(name) ?? []), id]);
    }
  }

  /** Run a kind of job by the clock (cron, UTC); one run whatever the number of servers. */
  async every(name: JobName, cron: string): Promise<void> {
    await this.start();
    await this.boss.schedule(name, cron, {});
  }

  async onApplicationShutdown(): Promise<void> {
    if (this.started !== null) await this.boss.stop({ graceful: true, timeout: 8_000 });
  }
}
