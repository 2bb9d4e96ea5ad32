import { accountLinkRoutes } from './resources/account-links.ts';
import { accountRoutes } from './resources/accounts.ts';
import { balanceRoutes } from './resources/balance.ts';
import { balanceTransactionRoutes } from './resources/balance-transactions.ts';
import { capabilityRoutes } from './resources/capabilities.ts';
import { chargeRoutes } from './resources/charges.ts';
import { checkoutSessionRoutes } from './resources/checkout-sessions.ts';
import { customerRoutes } from './resources/customers.ts';
import { disputeRoutes } from './resources/disputes.ts';
import { eventRoutes } from './resources/events.ts';
import { paymentIntentRoutes } from './resources/payment-intents.ts';
import { payoutRoutes } from './resources/payouts.ts';
import { refundRoutes } from './resources/refunds.ts';
import { topupRoutes } from './resources/topups.ts';
import { transferReversalRoutes } from './resources/transfer-reversals.ts';
import { transferRoutes } from './resources/transfers.ts';
import { webhookEndpointRoutes } from './resources/webhook-endpoints.ts';
import type { Route } from './router.ts';

/** Every call of the API the stand-in knows. */
export const API_ROUTES: readonly Route[] = [
  ...accountRoutes,
  ...accountLinkRoutes,
  ...balanceRoutes,
  ...balanceTransactionRoutes,
  ...capabilityRoutes,
  ...chargeRoutes,
  ...checkoutSessionRoutes,
  ...customerRoutes,
  ...disputeRoutes,
  ...eventRoutes,
  ...paymentIntentRoutes,
  ...payoutRoutes,
  ...refundRoutes,
  ...topupRoutes,
  ...transferRoutes,
  ...transferReversalRoutes,
  ...webhookEndpointRoutes,
];
