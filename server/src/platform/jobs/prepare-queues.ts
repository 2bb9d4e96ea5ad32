import PgBoss from 'pg-boss';
import { queues, type JobName } from './queues.ts';

/** Make the job runner's schema and queues as the owner role: the app's role may not create tables. */
export async function prepareQueues(ownerUrl: string): Promise<void> {
  const boss = new PgBoss({ connectionString: ownerUrl, supervise: false, schedule: false });
  await boss.start();
  try {
    for (const name of Object.keys(queues) as JobName[]) {
      const existing = await boss.getQueue(name);
      if (existing === null) await boss.createQueue(name, { name, ...queues[name] });
      else await boss.updateQueue(name, { name, ...queues[name] });
    }
  } finally {
    await boss.stop({ graceful: false });
  }
}
