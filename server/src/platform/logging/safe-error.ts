/**
 * What a log may hold of an error. Sequelize's errors carry the statement and its values (amounts, hashes, addresses),
 * so only name, message, stack, SQLSTATE and constraint are kept.
 */
export function safeError(error: unknown): Record<string, unknown> {
  if (!(error instanceof Error)) return { name: typeof error };
  const original = (error as { original?: { code?: unknown; constraint?: unknown } }).original;
  return {
    name: error.name,
    message: error.message,
    stack: error.stack,
    ...(original === undefined ? {} : { sqlState: original.code, constraint: original.constraint }),
  };
}
