import type { IncomingMessage, ServerResponse } from 'node:http';
import { readBody, sendPage, sendStyle } from '../../shared/http.ts';
import type { StandIn } from '../stand-in.ts';
import { answerConfirmation, payCheckout, showCheckout, showConfirmation } from './checkout-routes.ts';
import { missingPage } from './missing-page.ts';
import { openLink, saveOnboarding, showOnboarding } from './onboarding-page.ts';
import { moveClock, pressOutcome, showOverview } from './overview-routes.ts';
import { PAGE_STYLE } from './style.ts';

/** Answers everything that is neither the API nor the control API. */
export async function handlePage(
  standIn: StandIn,
  request: IncomingMessage,
  response: ServerResponse,
): Promise<void> {
  const { pathname } = new URL(request.url ?? '/', 'http://localhost');
  const [, area = '', first = '', second = ''] = pathname.split('/');
  standIn.runDueTimers();
  if (request.method === 'POST') {
    const values = Object.fromEntries(new URLSearchParams(await readBody(request)));
    if (area === 'pay') return payCheckout(standIn, first, values, response);
    if (area === 'confirm') return answerConfirmation(standIn, first, values, response);
    if (area === 'onboarding') return saveOnboarding(standIn, first, values, response);
    if (area === 'outcome') return pressOutcome(standIn, values, response);
    if (area === 'clock') return moveClock(standIn, values, response);
  } else {
    if (area === '') return showOverview(standIn, response);
    if (area === 'style.css') return sendStyle(response, PAGE_STYLE);
    if (area === 'pay') return showCheckout(standIn, first, response);
    if (area === 'confirm') return showConfirmation(standIn, first, response);
    if (area === 'onboard') return openLink(standIn, second, response);
    if (area === 'onboarding') return showOnboarding(standIn, first, response);
  }
  sendPage(response, missingPage(), { status: 404 });
}
