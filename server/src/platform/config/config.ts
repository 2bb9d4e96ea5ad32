import { readFileSync } from 'node:fs';
import { z } from 'zod';

export const modes = ['demo', 'development', 'test', 'production'] as const;
export type Mode = (typeof modes)[number];

const environmentSchema = z.object({
  KERFYARD_MODE: z.enum(modes),
  HOST: z.string().min(1).default('127.0.0.1'),
  PORT: z.coerce.number().int().min(1).max(65_535),
  APP_URL: z.url(),
  DATABASE_URL: z.string().startsWith('postgres'),
  KERFYARD_MASTER_KEY_FILE: z.string().min(1),
  KERFYARD_SIGNING_SECRET: z.string().min(32, 'at least 32 characters'),
  FILES_DIR: z.string().min(1),
  CLIENT_DIST: z.string().optional(),
  STRIPE_SECRET_KEY: z.string().regex(/^sk_(test|live)_/),
  STRIPE_API_URL: z.url().optional(),
  STRIPE_WEBHOOK_SECRET: z.string().startsWith('whsec_'),
  STRIPE_CONNECT_WEBHOOK_SECRET: z.string().startsWith('whsec_'),
  SMTP_URL: z.string().startsWith('smtp'),
  MAIL_FROM: z.string().min(3),
  STRIPE_PAGE_URL: z.url().optional(),
  LOG_LEVEL: z.enum(['silent', 'error', 'warn', 'info', 'debug']).default('info'),
  RATE_LIMIT_FACTOR: z.coerce.number().min(1).default(1),
  TRUST_PROXY: z.coerce.number().int().min(0).default(0),
  SECOND_FACTOR: z.enum(['optional', 'money']).optional(),
  DRAIN_MS: z.coerce.number().int().min(0).max(60_000).default(0),
});

/** Everything the server is told from outside, read once at start. */
export interface Config {
  mode: Mode;
  host: string;
  port: number;
  appUrl: string;
  databaseUrl: string;
  masterKey: Buffer;
  signingSecret: string;
  filesDir: string;
  clientDist: string | null;
  stripe: {
    secretKey: string;
    apiUrl: string | null;
    webhookSecret: string;
    connectWebhookSecret: string;
    pageUrl: string | null;
  };
  mail: { smtpUrl: string; from: string };
  logLevel: 'silent' | 'error' | 'warn' | 'info' | 'debug';
  rateLimitFactor: number;
  /** How many proxies stand before the server; 0 believes no forwarded address. */
  trustProxy: number;
  /** `money`: who sets aside, releases or takes payouts must have a second factor. The default in production. */
  secondFactor: 'optional' | 'money';
  /** How long a stopping server still answers while it says it is not ready. */
  drainMs: number;
}

/** Injection token of the one Config. */
export const CONFIG = Symbol('config');

/**
 * Read and check the environment.
 * @throws Error that lists every fault at once, so that one start tells all there is to mend
 */
export function readConfig(env: NodeJS.ProcessEnv = process.env): Config {
  const parsed = environmentSchema.safeParse(env);
  if (!parsed.success)
    throw new Error(faults(parsed.error.issues.map((i) => `${i.path.join('.')}: ${i.message}`)));
  const e = parsed.data;
  const problems: string[] = [];
  const live = e.STRIPE_SECRET_KEY.startsWith('sk_live_');
  if (live && e.STRIPE_API_URL !== undefined)
    problems.push('STRIPE_SECRET_KEY: a live key with STRIPE_API_URL, a stand-in');
  if (e.KERFYARD_MODE === 'production' && !live && e.STRIPE_API_URL === undefined) {
    problems.push('STRIPE_SECRET_KEY: a test key in production');
  }
  if (e.KERFYARD_MODE === 'production' && new Set(e.KERFYARD_SIGNING_SECRET).size < 12) {
    problems.push('KERFYARD_SIGNING_SECRET: too weak for production');
  }
  const masterKey = readMasterKey(e.KERFYARD_MASTER_KEY_FILE, problems);
  if (problems.length > 0) throw new Error(faults(problems));
  return {
    mode: e.KERFYARD_MODE,
    host: e.HOST,
    port: e.PORT,
    appUrl: e.APP_URL.replace(/\/$/, ''),
    databaseUrl: e.DATABASE_URL,
    masterKey,
    signingSecret: e.KERFYARD_SIGNING_SECRET,
    filesDir: e.FILES_DIR,
    clientDist: e.CLIENT_DIST ?? null,
    stripe: {
      secretKey: e.STRIPE_SECRET_KEY,
      apiUrl: e.STRIPE_API_URL ?? null,
      webhookSecret: e.STRIPE_WEBHOOK_SECRET,
      connectWebhookSecret: e.STRIPE_CONNECT_WEBHOOK_SECRET,
      pageUrl: e.STRIPE_PAGE_URL ?? null,
    },
    mail: { smtpUrl: e.SMTP_URL, from: e.MAIL_FROM },
    logLevel: e.LOG_LEVEL,
    rateLimitFactor: e.RATE_LIMIT_FACTOR,
    trustProxy: e.TRUST_PROXY,
    secondFactor: e.SECOND_FACTOR ?? (e.KERFYARD_MODE === 'production' ? 'money' : 'optional'),
    drainMs: e.DRAIN_MS,
  };
}

/** The owner role's address, for migrations and the seeder only; the server never holds it. */
export function readOwnerUrl(env: NodeJS.ProcessEnv = process.env): string {
  const url = env.DATABASE_OWNER_URL;
  if (url === undefined || url === '') throw new Error('DATABASE_OWNER_URL is not set');
  return url;
}

function readMasterKey(file: string, problems: string[]): Buffer {
  try {
    const key = Buffer.from(readFileSync(file, 'utf8').trim(), 'base64');
    if (key.length === 32) return key;
    problems.push('KERFYARD_MASTER_KEY_FILE: must hold 32 bytes as base64');
  } catch {
    problems.push('KERFYARD_MASTER_KEY_FILE: cannot be read');
  }
  return Buffer.alloc(32);
}

function faults(lines: string[]): string {
  return ['The settings have faults:', ...lines.map((line) => `  ${line}`)].join('\n');
}

/** Where the seeder writes the demo's sign-ins for the start command to print, or null. */
export function readSignInsFile(env: NodeJS.ProcessEnv = process.env): string | null {
  return env.DEMO_SIGN_INS_FILE ?? null;
}
