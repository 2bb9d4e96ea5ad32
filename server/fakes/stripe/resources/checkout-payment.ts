import type { Kinds } from '../records.ts';
import type { Work } from '../work.ts';
import { idOf } from '../work.ts';

/** Marks a session as done. A bank debit completes it unpaid; the payment follows as an asynchronous one. */
export function completeSession(work: Work, sessionId: string, paymentStatus: 'paid' | 'unpaid'): void {
  const session = work.edit('checkout_session', sessionId);
  session.api.status = 'complete';
  session.api.payment_status = paymentStatus;
  session.api.url = null;
  work.unschedule('session_expiry', sessionId);
  work.emit('checkout.session.completed', session.api, session.owner);
}

/** Called when any payment succeeds: completes its open session, or reports the late success of a bank debit. */
export function onSessionPaymentSucceeded(work: Work, intent: Kinds['payment_intent']): void {
  const { sessionId } = intent.notes;
  if (sessionId === null) return;
  const session = work.get('checkout_session', sessionId);
  if (session?.api.status === 'open') return completeSession(work, sessionId, 'paid');
  const late = work.edit('checkout_session', sessionId);
  late.api.payment_status = 'paid';
  work.emit('checkout.session.async_payment_succeeded', late.api, late.owner);
}

/** Called when a bank debit fails after its session was completed. */
export function onSessionPaymentFailed(work: Work, intent: Kinds['payment_intent']): void {
  const { sessionId } = intent.notes;
  if (sessionId === null) return;
  const session = work.edit('checkout_session', sessionId);
  if (session.api.status !== 'complete') return;
  work.emit('checkout.session.async_payment_failed', session.api, session.owner);
}

/** Ends an open session; a payment it had begun is canceled with it. */
export function expireSession(work: Work, sessionId: string): void {
  const session = work.edit('checkout_session', sessionId);
  if (session.api.status !== 'open') return;
  session.api.status = 'expired';
  session.api.url = null;
  work.unschedule('session_expiry', sessionId);
  if (session.api.payment_intent) {
    const intent = work.edit('payment_intent', idOf(session.api.payment_intent));
    intent.api.status = 'canceled';
    intent.api.canceled_at = work.now();
    intent.api.cancellation_reason = 'expired';
    intent.api.next_action = null;
    work.emit('payment_intent.canceled', intent.api, intent.owner);
  }
  work.emit('checkout.session.expired', session.api, session.owner);
}
