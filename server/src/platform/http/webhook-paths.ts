const PREFIX = '/api/payments/webhooks/';

/** Routes that other servers call: proved by signature over the raw body, no browser headers asked. */
export const isWebhookPath = (path: string): boolean => path.startsWith(PREFIX);
