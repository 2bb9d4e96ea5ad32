/** Every kind of job, with what its row carries (ids only: never an amount of a sealed bid, never a token). */
export interface Jobs {
  /** Send one e-mail; the message is built from the row when the job runs. */
  send_mail: { kind: string; to: string; [key: string]: unknown };
  /** A scope comes due: opened (sealed) or closed to bids (ranked), by the database's clock. */
  come_due: { scopeId: string };
  /** Tell matching crews of a new scope, a page at a time. */
  tell_crews: { scopeId: string; after: string | null };
  /** Call the provider for one operation row. */
  provider_operation: { operationId: string };
  /** Handle one stored event of the provider. */
  stripe_event: { eventId: string };
  /** Timed: due scopes missed by their own job, events missed by the webhook, awards not signed, settled charges. */
  sweep: Record<string, never>;
}
export type JobName = keyof Jobs;

interface QueueOptions {
  retryLimit: number;
  retryDelay: number;
  retryBackoff: boolean;
  expireInSeconds: number;
}

const usual: QueueOptions = { retryLimit: 8, retryDelay: 1, retryBackoff: true, expireInSeconds: 60 };

export const queues: Record<JobName, QueueOptions> = {
  send_mail: usual,
  come_due: { ...usual, retryLimit: 20 },
  tell_crews: usual,
  provider_operation: { ...usual, retryLimit: 50 },
  stripe_event: { ...usual, retryLimit: 20 },
  sweep: { ...usual, retryLimit: 0 },
};
