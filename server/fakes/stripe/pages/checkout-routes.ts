import type { ServerResponse } from 'node:http';
import { seeOther, sendPage } from '../../shared/http.ts';
import { StripeError } from '../errors.ts';
import { PLATFORM } from '../records.ts';
import type { Kinds } from '../records.ts';
import { paySession, successUrlOf } from '../resources/checkout-sessions.ts';
import { attemptPayment, failAuthentication } from '../resources/payment-attempt.ts';
import { createBankMethod, createCardMethod } from '../resources/payment-methods.ts';
import type { StandIn } from '../stand-in.ts';
import { idOf } from '../work.ts';
import type { Work } from '../work.ts';
import {
  checkoutPage,
  confirmPage,
  EMPTY_FORM,
  endedPage,
  readBankForm,
  readCardForm,
} from './checkout-page.ts';
import type { Checked } from './checkout-page.ts';
import { missingPage } from './missing-page.ts';
import { originsOf } from './origins.ts';

type SessionRecord = Kinds['checkout_session'];
type MethodRecord = Kinds['payment_method'];

function show(response: ServerResponse, session: SessionRecord, form = EMPTY_FORM): void {
  // A form with errors is answered with 200: browsers report any other status of a page as an error of the site.
  sendPage(response, checkoutPage(session, form), { formTargets: originsOf(session.api.success_url) });
}

/** GET /pay/:session */
export function showCheckout(standIn: StandIn, sessionId: string, response: ServerResponse): void {
  const session = standIn.read().get('checkout_session', sessionId);
  if (!session) return sendPage(response, missingPage(), { status: 404 });
  if (session.api.status !== 'open') return sendPage(response, endedPage(session));
  show(response, session);
}

/** Reads whichever of the two forms was sent; `entry` then makes the payment method. */
function readMethod(
  values: Record<string, string>,
  nowSeconds: number,
): Checked<(work: Work) => MethodRecord> {
  if (values['method'] === 'us_bank_account') {
    const bank = readBankForm(values);
    if ('errors' in bank) return bank;
    return { entry: (work) => createBankMethod(work, { owner: PLATFORM, ...bank.entry }) };
  }
  const card = readCardForm(values, nowSeconds);
  if ('errors' in card) return card;
  return { entry: (work) => createCardMethod(work, { owner: PLATFORM, ...card.entry }) };
}

/** POST /pay/:session */
export function payCheckout(
  standIn: StandIn,
  sessionId: string,
  values: Record<string, string>,
  response: ServerResponse,
): void {
  const session = standIn.read().get('checkout_session', sessionId);
  if (!session) return sendPage(response, missingPage(), { status: 404 });
  if (session.api.status !== 'open') return sendPage(response, endedPage(session));
  const entered = readMethod(values, standIn.clock.seconds());
  if ('errors' in entered) {
    return show(response, session, {
      values,
      errors: entered.errors,
      problem: 'Please look at the marked fields.',
    });
  }
  try {
    const { needsConfirmation, intentId } = standIn.transact((work) => ({
      ...paySession(work, sessionId, entered.entry(work)),
      intentId: idOf(work.edit('checkout_session', sessionId).api.payment_intent),
    }));
    seeOther(response, needsConfirmation ? `/confirm/${intentId}` : successUrlOf(session));
  } catch (error) {
    if (!(error instanceof StripeError)) throw error;
    const now = standIn.read().get('checkout_session', sessionId)!;
    show(response, now, { values, errors: {}, problem: `${error.message} Try another way to pay.` });
  }
}

function awaitingConfirmation(standIn: StandIn, intentId: string): Kinds['payment_intent'] | null {
  const intent = standIn.read().get('payment_intent', intentId);
  return intent?.api.status === 'requires_action' ? intent : null;
}

function sessionOf(standIn: StandIn, intent: Kinds['payment_intent']): SessionRecord | undefined {
  return intent.notes.sessionId ? standIn.read().get('checkout_session', intent.notes.sessionId) : undefined;
}

/** GET /confirm/:intent */
export function showConfirmation(standIn: StandIn, intentId: string, response: ServerResponse): void {
  const intent = awaitingConfirmation(standIn, intentId);
  if (!intent) return sendPage(response, missingPage(), { status: 404 });
  const session = sessionOf(standIn, intent);
  const targets = originsOf(session?.api.success_url, intent.notes.returnUrl);
  sendPage(response, confirmPage(intentId, intent.api.amount), { formTargets: targets });
}

/** POST /confirm/:intent */
export function answerConfirmation(
  standIn: StandIn,
  intentId: string,
  values: Record<string, string>,
  response: ServerResponse,
): void {
  const intent = awaitingConfirmation(standIn, intentId);
  if (!intent) return sendPage(response, missingPage(), { status: 404 });
  const session = sessionOf(standIn, intent);
  const isConfirmed = values['answer'] === 'yes';
  standIn.transact((work) => {
    if (isConfirmed) attemptPayment(work, intentId, idOf(intent.api.payment_method), { isConfirmed: true });
    else failAuthentication(work, intentId);
  });
  if (!session) return seeOther(response, intent.notes.returnUrl ?? '/');
  if (isConfirmed) return seeOther(response, successUrlOf(session));
  const problem = 'The payment was not confirmed. Try another way to pay.';
  show(response, session, { values: {}, errors: {}, problem });
}
