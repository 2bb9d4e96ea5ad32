import { Inject, Injectable, type OnModuleInit } from '@nestjs/common';
import { createHash } from 'node:crypto';
import { CONFIG, type Config } from '../config/config.ts';
import { UnitOfWork } from '../database/unit-of-work.ts';
import { AppError } from '../http/app-error.ts';
import { Sweeps } from '../jobs/sweeps.ts';
import { COUNT_HIT, DELETE_OLD_HITS, FORGET_HITS } from './rate-limit.queries.ts';

/** At most `hits` in each window of `seconds`. Several windows for one subject make the wait grow with the tries. */
export interface Window {
  hits: number;
  seconds: number;
}

export interface LimitedSubject {
  /** What is limited and for whom, for example `['sign-in', email, ip]`. Stored as a hash. */
  parts: readonly string[];
  windows: readonly Window[];
}

interface HitRow {
  key: string;
  hits: number;
  age_seconds: number;
}

/** Counts in PostgreSQL, so that two servers do not double a limit. */
@Injectable()
export class RateLimits implements OnModuleInit {
  constructor(
    @Inject(CONFIG) private readonly config: Config,
    private readonly uow: UnitOfWork,
    private readonly sweeps: Sweeps,
  ) {}

  onModuleInit(): void {
    this.sweeps.register('old rate limits', async () => void (await this.uow.rows(null, DELETE_OLD_HITS)));
  }

  /**
   * Count one try for every subject.
   * @throws AppError too_many_requests, with the seconds until the longest exhausted window ends
   */
  async take(subjects: readonly LimitedSubject[]): Promise<void> {
    const wait = await this.count(subjects);
    if (wait > 0) throw new AppError('too_many_requests', { retryAfterSeconds: wait });
  }

  /** Count one try and give the seconds to wait; 0 when within the limits. */
  async count(subjects: readonly LimitedSubject[]): Promise<number> {
    const windows = new Map(
      subjects.flatMap(({ parts, windows }) => windows.map((window) => [keyOf(parts, window), window])),
    );
    const rows = await this.uow.rows<HitRow>(null, COUNT_HIT, [
      [...windows.keys()],
      [...windows.values()].map((window) => window.seconds),
    ]);
    const waits = rows.map((row) => {
      const { hits, seconds } = windows.get(row.key) as Window;
      return row.hits > hits * this.config.rateLimitFactor ? Math.ceil(seconds - row.age_seconds) : 0;
    });
    return Math.max(0, ...waits);
  }

  /** After a success: the tries before it no longer count. */
  async forget({ parts, windows }: LimitedSubject): Promise<void> {
    await this.uow.rows(null, FORGET_HITS, [windows.map((window) => keyOf(parts, window))]);
  }
}

function keyOf(parts: readonly string[], window: Window): string {
  const hash = createHash('sha256').update(JSON.stringify(parts)).digest('base64url').slice(0, 32);
  return `${parts[0]}:${window.seconds}:${hash}`;
}
