import { html } from '../../shared/html.ts';
import type { SafeHtml } from '../../shared/html.ts';
import { OUTCOMES } from '../control/outcomes.ts';
import { PLATFORM } from '../records.ts';
import type { Kind, Kinds } from '../records.ts';
import { standingOf } from '../resources/balance.ts';
import type { Work } from '../work.ts';
import { alertBox, dollars, layout, timeOf } from './layout.ts';

const ROWS = 25;

type Cell = SafeHtml | string | number | null;

interface Table {
  title: string;
  heads: string[];
  rows: Cell[][];
  total: number;
  empty: string;
}

function press(action: string, id: string): SafeHtml {
  const { label } = OUTCOMES[action]!;
  return html`<form method="post" action="/outcome">
    <input type="hidden" name="action" value="${action}" /><input type="hidden" name="id" value="${id}" />
    <button class="small" aria-label="${`${label} ${id}`}">${label}</button>
  </form>`;
}

function actions(id: string, names: string[]): SafeHtml {
  return html`<div class="actions">${names.map((name) => press(name, id))}</div>`;
}

function money(amountCents: number): SafeHtml {
  return html`<span class="number">${dollars(amountCents)}</span>`;
}

function code(id: string): SafeHtml {
  return html`<code>${id.length > 30 ? `${id.slice(0, 30)}…` : id}</code>`;
}

function show<K extends Kind>(
  work: Work,
  kind: K,
  options: { title: string; empty: string; heads: string[]; row: (record: Kinds[K]) => Cell[] },
): Table {
  const records = work.list(kind, null);
  return { ...options, total: records.length, rows: records.slice(0, ROWS).map(options.row) };
}

function section(table: Table): SafeHtml {
  const id = table.title.toLowerCase().replaceAll(' ', '-');
  if (table.total === 0)
    return html`<section>
      <h2>${table.title}</h2>
      <p>${table.empty}</p>
    </section>`;
  const shown = table.total > ROWS ? `The newest ${ROWS} of ${table.total}` : `${table.total} in all`;
  return html`<section>
    <h2 id="${id}">${table.title}</h2>
    <div class="scroll" role="region" aria-labelledby="${id}" tabindex="0">
      <table>
        <caption>
          ${shown}
        </caption>
        <thead>
          <tr>
            ${table.heads.map((head) => html`<th scope="col">${head}</th>`)}
          </tr>
        </thead>
        <tbody>
          ${table.rows.map(
            (cells) =>
              html`<tr>
                ${cells.map((cell) => html`<td>${cell}</td>`)}
              </tr>`,
          )}
        </tbody>
      </table>
    </div>
  </section>`;
}

function ownerName(work: Work, owner: string): string {
  if (owner === PLATFORM) return 'platform';
  const account = work.get('account', owner)?.api;
  return account?.company?.name ?? account?.business_profile?.name ?? owner;
}

function balances(work: Work): Table {
  const owners = [PLATFORM, ...work.list('account', PLATFORM).map((account) => account.id)];
  const rows = owners.slice(0, ROWS).map((owner) => {
    const { available, pending } = standingOf(work, owner);
    return [
      ownerName(work, owner),
      owner === PLATFORM ? code(work.settings().platformAccountId) : code(owner),
      money(available.card + available.bank_account),
      money(pending.card + pending.bank_account),
    ];
  });
  const heads = ['Account', 'Id', 'Available', 'Pending'];
  return { title: 'Balances', heads, rows, total: owners.length, empty: '' };
}

function accounts(work: Work): Table {
  return show(work, 'account', {
    title: 'Accounts',
    empty: 'No connected accounts yet.',
    heads: ['Account', 'Id', 'Transfers', 'Payouts', 'Still asked for', 'Press'],
    row: ({ id, owner, api }) => [
      owner === PLATFORM ? ownerName(work, id) : 'platform',
      code(id),
      String(api.capabilities?.transfers ?? 'not requested'),
      api.payouts_enabled ? 'enabled' : 'stopped',
      (api.requirements?.currently_due ?? []).length,
      owner === PLATFORM
        ? actions(id, api.payouts_enabled ? ['account_restricted'] : ['account_verified'])
        : null,
    ],
  });
}

function sessions(work: Work): Table {
  return show(work, 'checkout_session', {
    title: 'Checkout sessions',
    empty: 'No sessions yet.',
    heads: ['Id', 'Created', 'Amount', 'Status', 'Payment', 'Page'],
    row: ({ id, api }) => [
      code(id),
      timeOf(api.created),
      money(api.amount_total ?? 0),
      String(api.status),
      String(api.payment_status),
      api.status === 'open' ? html`<a href="/pay/${id}">Open ${id.slice(-6)}</a>` : null,
    ],
  });
}

function chargeActions({ api }: Kinds['charge']): string[] {
  if (api.status === 'pending') return ['debit_succeeds', 'debit_fails'];
  const canDispute = api.status === 'succeeded' && !api.disputed && api.source_transfer === null;
  return canDispute ? ['dispute_opens', 'inquiry_opens'] : [];
}

function charges(work: Work): Table {
  return show(work, 'charge', {
    title: 'Payments',
    empty: 'No payments yet.',
    heads: ['Id', 'Of', 'Created', 'Amount', 'Refunded', 'Status', 'Press'],
    row: (charge) => [
      code(charge.id),
      ownerName(work, charge.owner),
      timeOf(charge.api.created),
      money(charge.api.amount),
      money(charge.api.amount_refunded),
      charge.api.disputed ? `${String(charge.api.status)}, disputed` : String(charge.api.status),
      actions(charge.id, chargeActions(charge)),
    ],
  });
}

function transfers(work: Work): Table {
  return show(work, 'transfer', {
    title: 'Transfers',
    empty: 'No transfers yet.',
    heads: ['Id', 'Created', 'To', 'Amount', 'Taken back', 'Group'],
    row: ({ id, api }) => [
      code(id),
      timeOf(api.created),
      ownerName(work, String(api.destination)),
      money(api.amount),
      money(api.amount_reversed),
      api.transfer_group,
    ],
  });
}

function refunds(work: Work): Table {
  return show(work, 'refund', {
    title: 'Refunds',
    empty: 'No refunds yet.',
    heads: ['Id', 'Created', 'Amount', 'Status', 'Press'],
    row: ({ id, api }) => [
      code(id),
      timeOf(api.created),
      money(api.amount),
      api.pending_reason ? `${String(api.status)}, ${String(api.pending_reason)}` : String(api.status),
      actions(id, api.status === 'pending' ? ['refund_succeeds', 'refund_fails'] : []),
    ],
  });
}

function disputeActions({ api }: Kinds['dispute']): string[] {
  const status = String(api.status);
  if (status === 'won' || status === 'lost' || status === 'warning_closed') return [];
  const ends = ['dispute_won', 'dispute_lost'];
  return status.startsWith('warning_') ? ['inquiry_escalates', ...ends] : ends;
}

function disputes(work: Work): Table {
  return show(work, 'dispute', {
    title: 'Disputes',
    empty: 'No disputes yet.',
    heads: ['Id', 'Created', 'Payment', 'Amount', 'Status', 'Press'],
    row: (dispute) => [
      code(dispute.id),
      timeOf(dispute.api.created),
      code(String(dispute.api.charge)),
      money(dispute.api.amount),
      String(dispute.api.status),
      actions(dispute.id, disputeActions(dispute)),
    ],
  });
}

function payoutActions({ api }: Kinds['payout']): string[] {
  if (api.status === 'pending') return ['payout_in_transit', 'payout_paid', 'payout_failed'];
  if (api.status === 'in_transit') return ['payout_paid', 'payout_failed'];
  return api.status === 'paid' ? ['payout_failed'] : [];
}

function payouts(work: Work): Table {
  return show(work, 'payout', {
    title: 'Payouts',
    empty: 'No payouts yet.',
    heads: ['Id', 'Of', 'Created', 'Amount', 'Arrives', 'Status', 'Press'],
    row: (payout) => [
      code(payout.id),
      ownerName(work, payout.owner),
      timeOf(payout.api.created),
      money(payout.api.amount),
      timeOf(payout.api.arrival_date),
      payout.api.failure_code ? `failed, ${payout.api.failure_code}` : payout.api.status,
      actions(payout.id, payoutActions(payout)),
    ],
  });
}

function topups(work: Work): Table {
  return show(work, 'topup', {
    title: 'Top-ups',
    empty: 'No top-ups yet.',
    heads: ['Id', 'Created', 'Amount', 'Status', 'Press'],
    row: ({ id, api }) => [
      code(id),
      timeOf(api.created),
      money(api.amount),
      String(api.status),
      actions(id, api.status === 'pending' ? ['topup_succeeds', 'topup_fails'] : []),
    ],
  });
}

function deliveryText(work: Work, eventId: string): string {
  const deliveries = work.list('delivery', eventId);
  if (deliveries.length === 0) return 'nobody listens';
  return deliveries
    .map((one) => `${one.state}${one.lastStatus ? ` (${one.lastStatus})` : ''}, ${one.attempts} tries`)
    .join('; ');
}

function events(work: Work): Table {
  return show(work, 'event', {
    title: 'Events',
    empty: 'No events yet.',
    heads: ['Id', 'Created', 'Type', 'Of', 'Delivery'],
    row: ({ id, owner, api }) => [
      code(id),
      timeOf(api.created),
      api.type,
      ownerName(work, owner),
      deliveryText(work, id),
    ],
  });
}

const CLOCK_STEPS = [
  { hours: 1, label: '1 hour on' },
  { hours: 24, label: '1 day on' },
  { hours: 72, label: '3 days on' },
];

/** All objects, what has become of them, and buttons for what the outside world may do. */
export function overviewPage(work: Work, problem?: string): SafeHtml {
  const tables = [
    balances,
    accounts,
    sessions,
    charges,
    transfers,
    refunds,
    disputes,
    payouts,
    topups,
    events,
  ];
  return layout(
    'Payments on this machine',
    html`<h1>Payments on this machine</h1>
      ${alertBox(problem)}
      <form class="bar" method="post" action="/clock">
        <span>The clock here says ${timeOf(work.now())}.</span>
        ${CLOCK_STEPS.map(
          ({ hours, label }) => html`<button class="small" name="hours" value="${hours}">${label}</button>`,
        )}
      </form>
      ${tables.map((table) => section(table(work)))}`,
    { isWide: true },
  );
}
