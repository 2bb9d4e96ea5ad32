import { createHash } from 'node:crypto';
import { Injectable } from '@nestjs/common';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { newId } from '../platform/ids/ids.ts';
import type { AccountRef, Book, EntryLine } from './accounts.ts';
import {
  ACCOUNT_IDS,
  ENSURE_ACCOUNTS,
  ENTRY_BY_KEY,
  INSERT_ENTRY,
  INSERT_POSTINGS,
  LOCK_ACCOUNTS,
} from './ledger.queries.ts';

export interface NewEntry {
  book: Book;
  /** The money event this is, E01 to E20. */
  event: string;
  /** One effect per key: the same key with the same lines is a replay, with others an error. */
  key: string;
  lines: EntryLine[];
  subcontractId?: string;
  /** The provider's object this entry answers to; one entry per object and kind. */
  provider?: { objectId: string; kind: string };
  memo?: string;
}

/**
 * Posts to the ledger. The database itself refuses what is unbalanced, overdrawn, late or changed afterwards; this
 * service only keeps the lock order (accounts by id) and the replay rule.
 */
@Injectable()
export class Ledger {
  constructor(private readonly uow: UnitOfWork) {}

  /**
   * Post one entry in the caller's transaction.
   * @returns the entry's id, and whether it had been posted before under the same key
   * @throws AppError key_reused when the key stands for other lines; illegal_move (at the account) on an overdraft
   */
  async post(tx: Tx, entry: NewEntry): Promise<{ entryId: string; replayed: boolean }> {
    const lines = mergeByAccount(entry.lines);
    const hash = requestHash(entry, lines);
    const ids = await this.lockAccounts(
      tx,
      lines.map((line) => line.account),
    );
    const entryId = newId();
    const inserted = await this.uow.row<{ id: string }>(tx, INSERT_ENTRY, [
      entryId,
      entry.book,
      entry.event,
      entry.key,
      hash,
      entry.provider?.objectId ?? null,
      entry.provider?.kind ?? null,
      entry.subcontractId ?? null,
      entry.memo ?? '',
    ]);
    if (inserted === null) return this.replay(tx, entry.key, hash);
    await this.uow.rows(tx, INSERT_POSTINGS, [
      entryId,
      lines.map((_, index) => index + 1),
      lines.map((line) => ids.get(line.account.code) ?? ''),
      lines.map((line) => line.cents),
    ]);
    return { entryId, replayed: false };
  }

  private async replay(tx: Tx, key: string, hash: Buffer): Promise<{ entryId: string; replayed: boolean }> {
    const existing = await this.uow.row<{ id: string; request_hash: Buffer }>(tx, ENTRY_BY_KEY, [key]);
    if (existing === null || !existing.request_hash.equals(hash)) throw new AppError('key_reused');
    return { entryId: existing.id, replayed: true };
  }

  /** Make the accounts that are new and lock all of them in id order, so that no two postings wait for each other. */
  private async lockAccounts(tx: Tx, refs: AccountRef[]): Promise<Map<string, string>> {
    const codes = refs.map((ref) => ref.code);
    let found = await this.uow.rows<{ id: string; code: string }>(tx, ACCOUNT_IDS, [codes]);
    if (found.length < codes.length) {
      await this.uow.rows(tx, ENSURE_ACCOUNTS, [JSON.stringify(refs.map(toRow))]);
      found = await this.uow.rows<{ id: string; code: string }>(tx, ACCOUNT_IDS, [codes]);
    }
    await this.uow.rows(tx, LOCK_ACCOUNTS, [found.map((row) => row.id)]);
    return new Map(found.map((row) => [row.code, row.id]));
  }
}

function toRow(ref: AccountRef) {
  return {
    book: ref.book,
    code: ref.code,
    kind: ref.kind,
    may_be_negative: ref.mayBeNegative,
    subcontract_id: ref.subcontractId,
    company_id: ref.companyId,
    sov_line_id: ref.sovLineId,
  };
}

/** One line per account, none of them zero. */
function mergeByAccount(lines: EntryLine[]): EntryLine[] {
  const byCode = new Map<string, EntryLine>();
  for (const line of lines) {
    const known = byCode.get(line.account.code);
    byCode.set(line.account.code, { account: line.account, cents: (known?.cents ?? 0) + line.cents });
  }
  return [...byCode.values()].filter((line) => line.cents !== 0);
}

function requestHash(entry: NewEntry, lines: EntryLine[]): Buffer {
  const sorted = lines
    .map((line) => [line.account.code, line.cents] as const)
    .sort(([a], [b]) => (a < b ? -1 : 1));
  return createHash('sha256')
    .update(JSON.stringify([entry.book, entry.event, sorted]))
    .digest();
}
