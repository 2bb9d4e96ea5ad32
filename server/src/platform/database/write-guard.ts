import type { Options } from 'sequelize';

interface WriteOptions {
  transaction?: unknown;
}

/** A write that forgets its transaction survives the rollback of all the others, so it must not pass a test. */
function demandTransaction(options: WriteOptions | null | undefined): void {
  if (!options?.transaction) throw new Error('A model was written without { transaction }');
}

const ofOne = (_: unknown, options: WriteOptions): void => demandTransaction(options);

/**
 * Hooks for development and test. Sequelize runs none for `increment`, `findOrCreate` and raw SQL: those stay out of
 * services and live in `*.queries.ts`, which demand the transaction by their signature.
 */
export const refuseWritesOutsideTransactions: NonNullable<Options['hooks']> = {
  beforeCreate: ofOne,
  beforeUpdate: ofOne,
  beforeSave: ofOne,
  beforeUpsert: ofOne,
  beforeDestroy: ofOne,
  beforeRestore: ofOne,
  beforeBulkCreate: ofOne,
  beforeBulkUpdate: demandTransaction,
  beforeBulkDestroy: demandTransaction,
  beforeBulkRestore: demandTransaction,
};
