/** Reads a port from the environment; 0 asks the system for a free one. Throws on anything else than a port. */
export function portFrom(name: string, fallback: number): number {
  const text = process.env[name];
  if (text === undefined || text === '') return fallback;
  const port = Number(text);
  if (!Number.isInteger(port) || port < 0 || port > 65_535) throw new Error(`${name} is not a port: ${text}`);
  return port;
}

/** Stops the program on SIGTERM, SIGINT and when a parent that forked it goes away. */
export function stopOnSignal(stop: () => Promise<void>): void {
  let isStopping = false;
  const end = (): void => {
    if (isStopping) return;
    isStopping = true;
    void stop().finally(() => process.exit(0));
    setTimeout(() => process.exit(0), 2_000).unref();
  };
  process.on('SIGTERM', end);
  process.on('SIGINT', end);
  process.on('disconnect', end);
}
