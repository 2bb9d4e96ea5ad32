import type { ChildProcess } from 'node:child_process';

/** What stack.mjs tells when it is ready. Parts that were left out are null. */
export interface StackInfo {
  url: string | null;
  stripeUrl: string | null;
  mailUrl: string | null;
  smtpUrl: string | null;
  pgUrl: string;
  pgOwnerUrl: string;
  pgSuperUrl: string;
  filesDir: string;
  masterKeyFile: string;
  signInsFile: string;
  logsDir: string;
  controlUrl: string | null;
  stripeSecretKey: string;
  stripeWebhookSecret: string;
  stripeConnectWebhookSecret: string;
  signingSecret: string;
}

export interface Stack {
  info: StackInfo;
  child: ChildProcess;
  stop(): Promise<void>;
}

export function startStack(options?: string[], env?: NodeJS.ProcessEnv): Promise<Stack>;
export function stackVariables(info: StackInfo): Record<string, string>;
export function setUpStack(workspaces: string[]): Promise<() => Promise<void>>;
