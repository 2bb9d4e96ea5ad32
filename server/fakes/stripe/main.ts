import { stopOnSignal } from '../shared/process.ts';
import { configFromEnvironment } from './config.ts';
import { startPaymentStandIn } from './server.ts';

async function main(): Promise<void> {
  const standIn = await startPaymentStandIn(configFromEnvironment());
  stopOnSignal(() => standIn.close());
  console.log(`payment stand-in ready: ${standIn.url}`);
}

main().catch((error: Error) => {
  console.error(`payment stand-in: ${error.message}`);
  process.exit(1);
});
