import { Injectable } from '@nestjs/common';
import type { StatementLine, StatementView } from '@kerfyard/common/payments';
import type { Actor } from '@kerfyard/common/people';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { STATEMENT_LINES } from './money-reader.queries.ts';

interface PostingRow {
  entry_id: string;
  posted_at: Date;
  event: string;
  code: string;
  amount_cents: string;
  subcontract_id: string;
  subcontract_number: string;
  other_id: string;
  other_name: string;
}

type Side = 'gc' | 'crew';
type Kind = StatementLine['kind'];

/**
 * How a posting reads on a side's statement: which account's movement in which event, and its sign there.
 * What is not listed (our balance at the provider, its fee) is nobody's line.
 */
const readings: Record<Side, { event: string; account: string; kind: Kind; sign: 1 | -1 }[]> = {
  gc: [
    { event: 'E01', account: 'held_unallocated', kind: 'set_aside', sign: -1 },
    { event: 'E01', account: 'platform_charge', kind: 'charge', sign: -1 },
    { event: 'E07', account: 'held', kind: 'released', sign: -1 },
    { event: 'E07', account: 'retainage_held', kind: 'retainage_held', sign: -1 },
  ],
  crew: [
    { event: 'E07', account: 'crew_payable', kind: 'released', sign: -1 },
    { event: 'E07', account: 'platform_fee', kind: 'fee', sign: -1 },
    { event: 'E07', account: 'retainage_held', kind: 'retainage_held', sign: -1 },
    { event: 'E08', account: 'crew_payable', kind: 'transferred', sign: -1 },
  ],
};

/** A company's statement: its side of every ledger entry, and totals that are sums of those same postings. */
@Injectable()
export class Statements {
  constructor(private readonly uow: UnitOfWork) {}

  async statement(actor: Actor, subcontractId: string | null): Promise<StatementView> {
    if (actor.company === null) throw new AppError('forbidden');
    const side: Side = actor.company.kind === 'general_contractor' ? 'gc' : 'crew';
    const rows = await this.uow.rows<PostingRow>(null, STATEMENT_LINES, [actor.company.id, subcontractId]);
    return { side, lines: perEntry(rows.flatMap((row) => readLine(side, row))), totals: totalsOf(rows) };
  }
}

function readLine(side: Side, row: PostingRow): StatementLine[] {
  const account = accountName(row.code);
  const reading = readings[side].find((r) => r.event === row.event && r.account === account);
  if (reading === undefined) return [];
  return [
    {
      entryId: row.entry_id,
      at: row.posted_at.toISOString(),
      kind: reading.kind,
      subcontractId: row.subcontract_id,
      subcontractNumber: `S-${row.subcontract_number}`,
      otherSide: { id: row.other_id, name: row.other_name },
      cents: reading.sign * Number(row.amount_cents),
    },
  ];
}

/** One line per entry and kind: an entry moves each line of the schedule of values by a posting of its own. */
function perEntry(lines: StatementLine[]): StatementLine[] {
  const merged = new Map<string, StatementLine>();
  for (const line of lines) {
    const key = `${line.entryId} ${line.kind}`;
    const before = merged.get(key);
    merged.set(key, before === undefined ? line : { ...before, cents: before.cents + line.cents });
  }
  return [...merged.values()];
}

/** Sums over postings, credits positive: each equals the balance, or the one-way movement, of its ledger account. */
function totalsOf(rows: PostingRow[]): StatementView['totals'] {
  const sum = (test: (row: PostingRow, account: string) => boolean) =>
    rows.reduce(
      (total, row) => (test(row, accountName(row.code)) ? total - Number(row.amount_cents) : total),
      0,
    );
  const retainageCents = sum((_, account) => account === 'retainage_held');
  const payableCents = sum((_, account) => account === 'crew_payable');
  const transferredCents = -sum((row, account) => account === 'crew_payable' && row.event === 'E08');
  const feesCents = sum((_, account) => account === 'platform_fee');
  return {
    setAsideCents: sum((row, account) => account === 'held_unallocated' && row.event === 'E01'),
    chargesCents: sum((_, account) => account === 'platform_charge'),
    heldCents: sum((_, account) => account === 'held_unallocated' || account === 'held'),
    releasedCents: payableCents + transferredCents + feesCents,
    feesCents,
    retainageCents,
    payableCents,
    transferredCents,
  };
}

function accountName(code: string): string {
  return code.split(':', 1)[0] ?? '';
}
