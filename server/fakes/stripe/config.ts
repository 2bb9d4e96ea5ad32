import { portFrom } from '../shared/process.ts';

/** A webhook endpoint that exists from the start, so that an app needs no set-up call. */
export interface SeededWebhook {
  url: string;
  secret: string;
  /** true: events of connected accounts; false: events of the platform itself. */
  connect: boolean;
}

export interface StandInConfig {
  host: string;
  /** 0 takes a free port. */
  port: number;
  dataDir: string;
  secretKey: string;
  webhooks: SeededWebhook[];
}

const LOOPBACK_HOSTS = new Set(['localhost', '127.0.0.1', '[::1]']);

/** Whether an address points at this machine: the stand-in never sends anything further. */
export function isLoopbackUrl(text: string): boolean {
  try {
    const url = new URL(text);
    return (url.protocol === 'http:' || url.protocol === 'https:') && LOOPBACK_HOSTS.has(url.hostname);
  } catch {
    return false;
  }
}

/** Throws unless the key is a test key: a live key must never reach a stand-in. */
export function assertTestKey(key: string): void {
  if (key.startsWith('sk_live_') || key.startsWith('rk_live_')) {
    throw new Error('a live key was given to the stand-in; use a test key (sk_test_...)');
  }
  if (!/^sk_test_\w{8,}$/.test(key))
    throw new Error('the secret key must look like sk_test_ and 8 or more characters');
}

/** Checks the JSON list of endpoints from the environment. */
export function parseWebhooks(text: string): SeededWebhook[] {
  const list: unknown = JSON.parse(text || '[]');
  if (!Array.isArray(list)) throw new Error('FAKE_STRIPE_WEBHOOKS must be a JSON list');
  return list.map((entry: Partial<SeededWebhook>) => {
    const { url = '', secret = '', connect = false } = entry;
    if (!isLoopbackUrl(url)) throw new Error(`a webhook must stay on this machine: ${url}`);
    if (!secret.startsWith('whsec_')) throw new Error('a webhook secret starts with whsec_');
    return { url, secret, connect };
  });
}

/** Reads the program's settings from the environment. Throws with one line that says what is wrong. */
export function configFromEnvironment(): StandInConfig {
  const secretKey = process.env['FAKE_STRIPE_SECRET_KEY'] || 'sk_test_local_stand_in';
  assertTestKey(secretKey);
  return {
    host: process.env['FAKE_STRIPE_HOST'] || 'localhost',
    port: portFrom('FAKE_STRIPE_PORT', 12111),
    dataDir: process.env['FAKE_STRIPE_DATA_DIR'] || '.data/stripe',
    secretKey,
    webhooks: parseWebhooks(process.env['FAKE_STRIPE_WEBHOOKS'] ?? ''),
  };
}
