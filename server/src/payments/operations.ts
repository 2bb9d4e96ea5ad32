import { Inject, Injectable, type OnApplicationBootstrap } from '@nestjs/common';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { newId } from '../platform/ids/ids.ts';
import { JobQueue } from '../platform/jobs/job-queue.ts';
import { readStripeError, STRIPE, type StripeClient } from '../platform/stripe/stripe-client.ts';
import { Incidents } from './incidents.ts';
import {
  BEGIN_ATTEMPT,
  INSERT_OPERATION,
  LOCK_OPERATION,
  NOTE_OPERATION_ERROR,
  OPERATION_IS_UNKNOWN,
  SETTLE_OPERATION,
} from './operations.queries.ts';

/** One call to the provider as its row says it. */
export interface Operation {
  id: string;
  kind: string;
  subjectType: string;
  subjectId: string;
  params: Record<string, unknown>;
}

/** How one kind of operation is called, found again, and recorded. */
export interface OperationHandler<Result extends { id: string }> {
  /** The call itself, with the row's id as idempotency key and in the object's metadata. */
  call(stripe: StripeClient, operation: Operation): Promise<Result>;
  /** Look whether the effect exists, by the row's id in its metadata: the only way after the key may be gone. */
  find(stripe: StripeClient, operation: Operation): Promise<Result | null>;
  /** What follows in our books, in the transaction that settles the row. */
  succeed(tx: Tx, operation: Operation, result: Result): Promise<void>;
  refuse(tx: Tx, operation: Operation, error: { code: string; message: string }): Promise<void>;
  /** Live hints and the like, once committed. */
  settled?(operation: Operation): void;
}

/**
 * The outbox towards the provider. A row is committed with the decision it follows; the job runner then calls with the
 * row's id as the key, and records answer and consequence in one transaction. A timeout is `unknown`: the same key is
 * tried again within 24 hours, afterwards the effect is looked for, never repeated blindly.
 */
@Injectable()
export class Operations implements OnApplicationBootstrap {
  private readonly handlers = new Map<string, OperationHandler<{ id: string }>>();

  constructor(
    private readonly uow: UnitOfWork,
    private readonly jobs: JobQueue,
    private readonly incidents: Incidents,
    @Inject(STRIPE) private readonly stripe: StripeClient,
  ) {}

  async onApplicationBootstrap(): Promise<void> {
    await this.jobs.work('provider_operation', ({ operationId }) => this.attempt(operationId), 2);
  }

  register<Result extends { id: string }>(kind: string, handler: OperationHandler<Result>): void {
    this.handlers.set(kind, handler as unknown as OperationHandler<{ id: string }>);
  }

  /** Write the row and its job in the caller's transaction. */
  async request(
    tx: Tx,
    kind: string,
    subject: { type: string; id: string },
    params: Record<string, unknown>,
  ): Promise<string> {
    const id = newId();
    await this.uow.rows(tx, INSERT_OPERATION, [id, kind, subject.type, subject.id, JSON.stringify(params)]);
    await this.jobs.send(tx, 'provider_operation', { operationId: id });
    return id;
  }

  /**
   * Try one operation. Settled rows do nothing.
   * @throws when it must be tried again, so that the runner retries with back-off
   */
  async attempt(operationId: string): Promise<void> {
    const row = await this.uow.run((tx) => this.uow.row<OperationRow>(tx, BEGIN_ATTEMPT, [operationId]));
    if (row === null) return;
    const operation = toOperation(row);
    const handler = this.handlers.get(operation.kind);
    if (handler === undefined) throw new Error(`no handler for operation ${operation.kind}`);
    try {
      const result = await this.effect(handler, operation, row);
      await this.settle(operation, handler, { result });
    } catch (error) {
      await this.fail(operation, handler, error);
    }
  }

  private async effect(
    handler: OperationHandler<{ id: string }>,
    operation: Operation,
    { key_may_be_gone: keyMayBeGone, attempts }: OperationRow,
  ): Promise<{ id: string }> {
    if (keyMayBeGone) {
      const found = await handler.find(this.stripe, operation);
      if (found !== null) return found;
      await this.uow.run((tx) =>
        this.incidents.open(
          tx,
          'operation_retried_late',
          operation.id,
          `${operation.kind}: not found at the provider after 24 hours, tried again`,
        ),
      );
    }
    try {
      return await handler.call(this.stripe, operation);
    } catch (error) {
      // A server error is answered again and again under the same key, though its effect may be there.
      const mayBeThere = attempts > 1 && readStripeError(error).outcome === 'unknown';
      const found = mayBeThere ? await handler.find(this.stripe, operation) : null;
      if (found === null) throw error;
      return found;
    }
  }

  private async fail(
    operation: Operation,
    handler: OperationHandler<{ id: string }>,
    error: unknown,
  ): Promise<void> {
    const { outcome, code, message } = readStripeError(error);
    if (outcome === 'refused') return this.settle(operation, handler, { refusal: { code, message } });
    const sql = outcome === 'unknown' ? OPERATION_IS_UNKNOWN : NOTE_OPERATION_ERROR;
    await this.uow.run((tx) => this.uow.rows(tx, sql, [operation.id, `${code}: ${message}`]));
    throw error;
  }

  /** Record the outcome and what follows from it, once, however many runners got there. */
  async settle(
    operation: Operation,
    handler: OperationHandler<{ id: string }>,
    outcome: { result: { id: string } } | { refusal: { code: string; message: string } },
  ): Promise<void> {
    const settledNow = await this.uow.run(async (tx) => {
      const current = await this.uow.row<{ status: string }>(tx, LOCK_OPERATION, [operation.id]);
      if (current === null || (current.status !== 'requested' && current.status !== 'unknown')) return false;
      if ('result' in outcome) {
        await handler.succeed(tx, operation, outcome.result);
        await this.uow.rows(tx, SETTLE_OPERATION, [operation.id, 'succeeded', outcome.result.id, null]);
      } else {
        const { code, message } = outcome.refusal;
        await handler.refuse(tx, operation, outcome.refusal);
        await this.uow.rows(tx, SETTLE_OPERATION, [operation.id, 'refused', null, `${code}: ${message}`]);
      }
      return true;
    });
    if (settledNow) handler.settled?.(operation);
  }
}

interface OperationRow {
  id: string;
  kind: string;
  subject_type: string;
  subject_id: string;
  params: Record<string, unknown>;
  attempts: number;
  key_may_be_gone: boolean;
}

function toOperation(row: OperationRow): Operation {
  return {
    id: row.id,
    kind: row.kind,
    subjectType: row.subject_type,
    subjectId: row.subject_id,
    params: row.params,
  };
}
