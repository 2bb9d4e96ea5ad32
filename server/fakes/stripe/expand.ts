import { invalidRequest } from './errors.ts';
import { presentBalanceTransaction } from './resources/balance-transactions.ts';
import type { Kind } from './records.ts';
import { wholeList } from './lists.ts';
import type { Work } from './work.ts';

type Json = Record<string, unknown>;

const KIND_BY_PREFIX: Record<string, Kind> = {
  acct: 'account',
  ba: 'bank_account',
  ch: 'charge',
  cus: 'customer',
  dp: 'dispute',
  pi: 'payment_intent',
  pm: 'payment_method',
  po: 'payout',
  py: 'charge',
  pyr: 'refund',
  re: 'refund',
  tr: 'transfer',
  trr: 'transfer_reversal',
  tu: 'topup',
  txn: 'balance_transaction',
};

function lookUp(work: Work, id: string): Json | undefined {
  const kind = KIND_BY_PREFIX[id.slice(0, id.lastIndexOf('_'))];
  if (!kind) return undefined;
  const record = work.get(kind, id) as { api?: Json } | undefined;
  if (kind === 'balance_transaction' && record) return presentBalanceTransaction(work, id) as unknown as Json;
  return record?.api;
}

/** Lists that are only there when asked for. */
function includable(work: Work, object: Json, field: string): unknown {
  if (object['object'] === 'checkout.session' && field === 'line_items') {
    const session = work.get('checkout_session', String(object['id']));
    return wholeList(
      `/v1/checkout/sessions/${String(object['id'])}/line_items`,
      session?.notes.lineItems ?? [],
    );
  }
  if (object['object'] === 'charge' && field === 'refunds') {
    const refunds = work.list('refund', null).filter((refund) => refund.api.charge === object['id']);
    return wholeList(
      `/v1/charges/${String(object['id'])}/refunds`,
      refunds.map((refund) => refund.api),
    );
  }
  return undefined;
}

function cannotExpand(path: string): Error {
  return invalidRequest(`This property cannot be expanded (${path}).`, { param: 'expand' });
}

function expandField(work: Work, object: Json, field: string, fullPath: string): unknown {
  const value = object[field];
  if (value === null) return null;
  if (Array.isArray(value))
    return value.map((item) => (typeof item === 'string' ? (lookUp(work, item) ?? item) : item));
  if (typeof value === 'object' && value !== undefined) return value;
  const found = typeof value === 'string' ? lookUp(work, value) : includable(work, object, field);
  if (found === undefined) throw cannotExpand(fullPath);
  return found;
}

function expandPath(work: Work, node: unknown, path: string[], fullPath: string): unknown {
  const [field, ...rest] = path;
  if (field === undefined || node === null) return node;
  if (Array.isArray(node)) return node.map((item) => expandPath(work, item, path, fullPath));
  const object = node as Json;
  if (!(field in object) && includable(work, object, field) === undefined) throw cannotExpand(fullPath);
  const expanded = expandField(work, object, field, fullPath);
  return { ...object, [field]: expandPath(work, expanded, rest, fullPath) };
}

/** Replaces ids by objects along each path, for example `latest_charge.balance_transaction` or `data.source`. */
export function expandAnswer(work: Work, answer: object, paths: readonly string[] | undefined): object {
  return (paths ?? []).reduce<object>((body, path) => {
    if (path.split('.').length > 4)
      throw invalidRequest('You cannot expand more than 4 levels of a property.', { param: 'expand' });
    return expandPath(work, body, path.split('.'), path) as object;
  }, answer);
}
