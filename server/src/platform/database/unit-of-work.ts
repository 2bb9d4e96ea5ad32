import { Inject, Injectable } from '@nestjs/common';
import { QueryTypes, Sequelize, Transaction } from 'sequelize';
import { setTimeout as sleep } from 'node:timers/promises';
import { databaseErrorToAppError } from './constraint-codes.ts';

/** An open transaction: the required first parameter of everything that writes or locks. */
export type Tx = Transaction;

const RETRIED = new Set(['40P01', '40001']);
const MAX_TRIES = 3;

/**
 * Opens transactions. What must follow a commit is a job row sent inside; what may follow (a live hint) is emitted
 * after `run` has resolved. No network, mail, file or provider call inside.
 */
@Injectable()
export class UnitOfWork {
  private readonly afterwards = new WeakMap<Tx, (() => void)[]>();

  constructor(@Inject(Sequelize) private readonly sequelize: Sequelize) {}

  /** Run in one READ COMMITTED transaction; deadlocks and serialization failures are tried at most three times. */
  async run<T>(work: (tx: Tx) => Promise<T>): Promise<T> {
    for (let attempt = 1; ; attempt += 1) {
      const deeds: (() => void)[] = [];
      try {
        const result = await this.sequelize.transaction(
          { isolationLevel: Transaction.ISOLATION_LEVELS.READ_COMMITTED },
          (tx) => {
            this.afterwards.set(tx, deeds);
            return work(tx);
          },
        );
        for (const deed of deeds) deed();
        return result;
      } catch (error) {
        if (attempt < MAX_TRIES && RETRIED.has(sqlState(error))) {
          await sleep(Math.random() * 30 * attempt);
          continue;
        }
        throw databaseErrorToAppError(error) ?? error;
      }
    }
  }

  /** Do something once `run` has committed, and not at all when it has not: for hints within this process only. */
  afterCommit(tx: Tx, deed: () => void): void {
    this.afterwards.get(tx)?.push(deed);
  }

  /**
   * Rows of a constant SQL text with `$1…` parameters; outside a transaction when `tx` is null.
   * Statements live in `*.queries.ts`, so that no text is ever put together from input.
   */
  async rows<Row extends object>(tx: Tx | null, sql: string, bind: readonly unknown[] = []): Promise<Row[]> {
    return this.sequelize.query<Row>(sql, {
      bind: bind as unknown[],
      type: QueryTypes.SELECT,
      transaction: tx,
    });
  }

  /** The first row, or null. */
  async row<Row extends object>(
    tx: Tx | null,
    sql: string,
    bind: readonly unknown[] = [],
  ): Promise<Row | null> {
    const [first] = await this.rows<Row>(tx, sql, bind);
    return first ?? null;
  }
}

/** PostgreSQL's SQLSTATE of an error as Sequelize wraps it, or ''. */
export function sqlState(error: unknown): string {
  const original =
    (error as { original?: { code?: unknown } } | null)?.original ?? (error as { code?: unknown } | null);
  return typeof original?.code === 'string' ? original.code : '';
}
