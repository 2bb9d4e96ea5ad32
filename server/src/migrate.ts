import { grantAppRole } from './database/grants.ts';
import { migrate } from './database/migrator.ts';
import { prepareQueues } from './platform/jobs/prepare-queues.ts';
import { readOwnerUrl } from './platform/config/config.ts';

try {
  const ownerUrl = readOwnerUrl();
  await migrate(ownerUrl, (line) => console.log(line));
  await prepareQueues(ownerUrl);
  await grantAppRole(ownerUrl);
} catch (error) {
  // The driver's error object holds whole type tables; its message says what a person needs.
  console.error(error instanceof Error ? error.message : 'The migration failed');
  process.exit(1);
}
