import { bootstrap } from './bootstrap.ts';
import { readConfig, type Config } from './platform/config/config.ts';
import { safeError } from './platform/logging/safe-error.ts';

const SHUTDOWN_LIMIT_MS = 15_000;

async function serve(config: Config): Promise<void> {
  const app = await bootstrap(config);
  let isStopping = false;
  const stop = (): void => {
    if (isStopping) return;
    isStopping = true;
    // A connection that never ends must not keep the process for ever.
    setTimeout(() => process.exit(1), SHUTDOWN_LIMIT_MS + config.drainMs).unref();
    app.close().then(
      () => process.exit(0),
      () => process.exit(1),
    );
  };
  process.on('SIGTERM', stop);
  process.on('SIGINT', stop);
  await app.listen(config.port, config.host);
}

try {
  await serve(readConfig());
} catch (error) {
  const { message, stack } = safeError(error);
  console.error(String(message).startsWith('The settings') ? message : stack);
  process.exit(1);
}
