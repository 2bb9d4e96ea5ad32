import type { ServerResponse } from 'node:http';
import { seeOther, sendPage } from '../../shared/http.ts';
import { OUTCOMES } from '../control/outcomes.ts';
import { StripeError } from '../errors.ts';
import type { StandIn } from '../stand-in.ts';
import { overviewPage } from './overview-page.ts';

const LONGEST_STEP_HOURS = 24 * 31;

/** GET / */
export function showOverview(standIn: StandIn, response: ServerResponse): void {
  sendPage(response, overviewPage(standIn.read()));
}

/** POST /outcome */
export function pressOutcome(
  standIn: StandIn,
  values: Record<string, string>,
  response: ServerResponse,
): void {
  const { action = '', id = '' } = values;
  const outcome = OUTCOMES[action];
  if (!outcome) return sendPage(response, overviewPage(standIn.read(), 'There is no such button.'));
  try {
    standIn.transact((work) => outcome.run(work, id));
    standIn.runDueTimers();
    seeOther(response, '/');
  } catch (error) {
    if (!(error instanceof StripeError)) throw error;
    sendPage(response, overviewPage(standIn.read(), error.message));
  }
}

/** POST /clock */
export function moveClock(standIn: StandIn, values: Record<string, string>, response: ServerResponse): void {
  const hours = Number(values['hours']);
  if (!Number.isInteger(hours) || hours < 1 || hours > LONGEST_STEP_HOURS) {
    return sendPage(response, overviewPage(standIn.read(), 'The clock moves by whole hours.'));
  }
  standIn.advance(hours * 3_600_000);
  seeOther(response, '/');
}
