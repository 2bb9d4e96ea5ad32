import Stripe from 'stripe';
import type { Config } from '../config/config.ts';

/** Injection token of the provider's client. */
export const STRIPE = Symbol('stripe');
export type StripeClient = Stripe;

/** The real SDK; only its address differs when a local stand-in takes the provider's place. */
export function createStripeClient(config: Config): StripeClient {
  const address = config.stripe.apiUrl === null ? {} : addressOf(new URL(config.stripe.apiUrl));
  return new Stripe(config.stripe.secretKey, {
    ...address,
    timeout: 10_000,
    maxNetworkRetries: 1,
    telemetry: false,
  });
}

function addressOf(url: URL): { host: string; port: number; protocol: 'http' | 'https' } {
  const protocol = url.protocol === 'https:' ? 'https' : 'http';
  return { host: url.hostname, port: Number(url.port || (protocol === 'https' ? 443 : 80)), protocol };
}

/**
 * What an error of the provider means for the effect that was asked for:
 * `refused` it certainly did not happen, `again` it did not happen yet, `unknown` it may have happened.
 */
export function readStripeError(error: unknown): {
  outcome: 'refused' | 'again' | 'unknown';
  code: string;
  message: string;
} {
  if (!(error instanceof Stripe.errors.StripeError)) throw error;
  const code = error.code ?? error.type;
  const status = error.statusCode ?? 0;
  if (status === 409 || status === 429) return { outcome: 'again', code, message: error.message };
  if (status >= 400 && status < 500) return { outcome: 'refused', code, message: error.message };
  return { outcome: 'unknown', code, message: error.message };
}
