import { grantAppRole } from './database/grants.ts';
import { migrate } from './database/migrator.ts';
import { prepareQueues } from './platform/jobs/prepare-queues.ts';
import { readOwnerUrl } from './platform/config/config.ts';

const ownerUrl = readOwnerUrl();
await migrate(ownerUrl, (line) => console.log(line));
await prepareQueues(ownerUrl);
await grantAppRole(ownerUrl);
