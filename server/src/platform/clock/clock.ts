import { Injectable } from '@nestjs/common';
import { UnitOfWork, type Tx } from '../database/unit-of-work.ts';
import { NOW } from './clock.queries.ts';

/** The server's only clock: the database's `app_now()`, which tests and the seeder may move. */
@Injectable()
export class Clock {
  constructor(private readonly uow: UnitOfWork) {}

  /** Now, by a statement of its own: after a lock wait this is later than the lock's statement. */
  async now(tx: Tx | null = null): Promise<Date> {
    const row = await this.uow.row<{ now: Date }>(tx, NOW);
    if (row === null) throw new Error('app_now() gave no row');
    return row.now;
  }

  /** Wall time, for what the world outside measures by: a webhook's signature, a token's expiry. */
  wallMs(): number {
    return Date.now();
  }
}
