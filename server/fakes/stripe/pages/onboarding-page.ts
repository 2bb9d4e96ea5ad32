import type { ServerResponse } from 'node:http';
import { html } from '../../shared/html.ts';
import type { SafeHtml } from '../../shared/html.ts';
import { seeOther, sendPage } from '../../shared/http.ts';
import type { Kinds } from '../records.ts';
import { submitOnboarding } from '../resources/onboarding.ts';
import type { StandIn } from '../stand-in.ts';
import { findBankByNumber, TEST_BANKS, TEST_ROUTING_NUMBER } from '../test-values.ts';
import { alertBox, layout, textField } from './layout.ts';
import { missingPage } from './missing-page.ts';
import { originsOf } from './origins.ts';

type LinkRecord = Kinds['account_link'];

/** How long a person may take on the page once the link was opened. */
const VISIT_SECONDS = 3600;

interface Form {
  values: Record<string, string>;
  errors: Record<string, string>;
}

/** GET /onboard/:account/:link. A link works once and for five minutes; then it leads to the app's refresh address. */
export function openLink(standIn: StandIn, linkId: string, response: ServerResponse): void {
  const target = standIn.transact((work) => {
    const link = work.get('account_link', linkId);
    if (!link) return null;
    if (link.notes.usedAt !== null || link.api.expires_at <= work.now()) return link.notes.refreshUrl;
    work.edit('account_link', linkId).notes.usedAt = work.now();
    return `/onboarding/${link.notes.token}`;
  });
  if (target === null) return sendPage(response, missingPage(), { status: 404 });
  seeOther(response, target);
}

function findVisit(standIn: StandIn, token: string): LinkRecord | undefined {
  const work = standIn.read();
  return work
    .list('account_link', null)
    .find(
      ({ notes }) =>
        notes.token === token && notes.usedAt !== null && notes.usedAt + VISIT_SECONDS > work.now(),
    );
}

function onboardingPage(link: LinkRecord, form: Form): SafeHtml {
  const field = (name: string) => ({ name, value: form.values[name] ?? '', error: form.errors[name] });
  const hasErrors = Object.keys(form.errors).length > 0;
  return layout(
    'Get ready to be paid',
    html`<h1>Get ready to be paid</h1>
      <p>Say who you are and where your money should go.</p>
      ${alertBox(hasErrors ? 'Please look at the marked fields.' : undefined)}
      <form class="sheet" method="post" action="/onboarding/${link.notes.token}" novalidate>
        ${textField({ ...field('business_name'), label: 'Business name', autocomplete: 'organization' })}
        ${textField({ ...field('routing_number'), label: 'Routing number', hint: `Test: ${TEST_ROUTING_NUMBER}`, inputMode: 'numeric' })}
        ${textField({ ...field('account_number'), label: 'Account number', hint: 'Test: 000123456789', inputMode: 'numeric' })}
        <div class="bar">
          <button name="step" value="complete">Save and finish</button>
          <button class="quiet" name="step" value="later">Save the name, finish later</button>
        </div>
      </form>
      <details>
        <summary>Test account numbers for payouts</summary>
        <ul>
          ${TEST_BANKS.map((bank) => html`<li><code>${bank.accountNumber}</code> ${bank.hint}</li>`)}
        </ul>
      </details>
      <p><a href="${link.notes.returnUrl}">Go back without saving</a></p>`,
  );
}

/** GET /onboarding/:token */
export function showOnboarding(standIn: StandIn, token: string, response: ServerResponse): void {
  const link = findVisit(standIn, token);
  if (!link) return sendPage(response, missingPage(), { status: 404 });
  const account = standIn.read().get('account', link.notes.account);
  const values = { business_name: account?.api.company?.name ?? account?.api.business_profile?.name ?? '' };
  sendPage(response, onboardingPage(link, { values, errors: {} }), {
    formTargets: originsOf(link.notes.returnUrl),
  });
}

function check(values: Record<string, string>): Record<string, string> {
  const errors: Record<string, string> = {};
  if ((values['business_name'] ?? '').trim() === '')
    errors['business_name'] = 'Enter the name of the business.';
  if (values['step'] === 'later') return errors;
  if ((values['routing_number'] ?? '').trim() !== TEST_ROUTING_NUMBER) {
    errors['routing_number'] = `Only ${TEST_ROUTING_NUMBER} works here.`;
  }
  if (!findBankByNumber((values['account_number'] ?? '').trim())) {
    errors['account_number'] = 'Only test account numbers work here. They are listed below.';
  }
  return errors;
}

/** POST /onboarding/:token. Coming back does not mean complete: the app reads the account. */
export function saveOnboarding(
  standIn: StandIn,
  token: string,
  values: Record<string, string>,
  response: ServerResponse,
): void {
  const link = findVisit(standIn, token);
  if (!link) return sendPage(response, missingPage(), { status: 404 });
  const errors = check(values);
  if (Object.keys(errors).length > 0) {
    const page = onboardingPage(link, { values, errors });
    return sendPage(response, page, { formTargets: originsOf(link.notes.returnUrl) });
  }
  const bank = values['step'] === 'later' ? undefined : findBankByNumber(values['account_number']!.trim());
  standIn.transact((work) =>
    submitOnboarding(work, link.notes.account, {
      businessName: values['business_name']!.trim(),
      ...(bank && { bank }),
    }),
  );
  seeOther(response, link.notes.returnUrl);
}
