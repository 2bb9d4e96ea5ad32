import { defineMachine } from '../state/index.ts';

/** Money on its way in: a checkout page, then the provider's word. A bank debit stays `processing` for days. */
export const fundingMachine = defineMachine({
  name: 'funding',
  initial: 'requested',
  moves: {
    requested: { open: 'awaiting_payment', refuse: 'failed', expire: 'expired' },
    awaiting_payment: { process: 'processing', succeed: 'succeeded', fail: 'failed', expire: 'expired' },
    processing: { succeed: 'succeeded', fail: 'failed' },
    succeeded: {},
    failed: {},
    expired: {},
  },
});
export type FundingStatus = keyof typeof fundingMachine.moves;

/** Money on its way out: posted in the ledger first; the transfer follows. */
export const releaseMachine = defineMachine({
  name: 'release',
  initial: 'posted',
  moves: {
    posted: { transfer: 'transferred', block: 'blocked' },
    blocked: { retry: 'posted' },
    transferred: {},
  },
});
export type ReleaseStatus = keyof typeof releaseMachine.moves;

/** One call to the provider; its row id is the idempotency key. `unknown` is looked up, never repeated under a new key. */
export const operationMachine = defineMachine({
  name: 'provider operation',
  initial: 'requested',
  moves: {
    requested: { succeed: 'succeeded', refuse: 'refused', lose: 'unknown' },
    unknown: { succeed: 'succeeded', refuse: 'refused' },
    succeeded: {},
    refused: {},
  },
});
export type OperationStatus = keyof typeof operationMachine.moves;
