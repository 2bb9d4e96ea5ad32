import { createHash } from 'node:crypto';
import { Injectable } from '@nestjs/common';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import {
  INSERT_SEALS,
  LAST_SEAL,
  LOCK_SEALER,
  SEAL_AT,
  SEALED_ENTRIES,
  UNSEALED_COUNT,
  UNSEALED_ENTRIES,
} from './seal.queries.ts';

interface EntryContent {
  id: string;
  number: string;
  book: string;
  event: string;
  idempotency_key: string;
  request_hash: Buffer;
  provider_object_id: string | null;
  provider_event_kind: string | null;
  subcontract_id: string | null;
  reverses_entry_id: string | null;
  memo: string;
  posted_at: Date;
  lines: [number, string, string, string][] | null;
}

interface SealRow {
  position: string;
  hash: Buffer;
}

type SealedEntry = SealRow & { previous: Buffer; entry_id: string } & (EntryContent | { id: null });

const BATCH = 1_000;
/** What the first seal names as the one before it. */
const BEGINNING = Buffer.alloc(32);

/**
 * The hash chain over the ledger (B-I10). Entries are sealed after their commit, by one sealer at a time; what is sealed
 * can be checked by anyone who keeps the newest hash elsewhere.
 */
@Injectable()
export class LedgerSeals {
  constructor(private readonly uow: UnitOfWork) {}

  /** Seal every entry committed so far. Gives how many there were. */
  async sealAll(): Promise<number> {
    let sealed = 0;
    for (;;) {
      const count = await this.sealSome();
      sealed += count;
      if (count < BATCH) return sealed;
    }
  }

  private sealSome(): Promise<number> {
    return this.uow.run(async (tx) => {
      await this.uow.rows(tx, LOCK_SEALER);
      const last = await this.uow.row<SealRow>(tx, LAST_SEAL);
      const entries = await this.uow.rows<EntryContent>(tx, UNSEALED_ENTRIES, [BATCH]);
      if (entries.length === 0) return 0;
      let position = Number(last?.position ?? 0);
      let previous = last?.hash ?? BEGINNING;
      const seals = entries.map((entry) => {
        position += 1;
        const seal = { position, entryId: entry.id, previous, hash: sealHash(previous, entry) };
        previous = seal.hash;
        return seal;
      });
      await this.uow.rows(tx, INSERT_SEALS, [
        seals.map((seal) => seal.position),
        seals.map((seal) => seal.entryId),
        seals.map((seal) => seal.previous),
        seals.map((seal) => seal.hash),
      ]);
      return seals.length;
    });
  }

  /** How many committed entries wait for the sealer. */
  async waiting(): Promise<number> {
    return (await this.uow.row<{ entries: number }>(null, UNSEALED_COUNT))?.entries ?? 0;
  }

  /**
   * Compute the chain again from the entries as they stand now: all of it, or its `newest` part.
   * @returns what does not hold, by position; empty when all does
   */
  async verify(newest?: number): Promise<string[]> {
    const last = await this.uow.row<SealRow>(null, LAST_SEAL);
    let position = newest === undefined ? 0 : Math.max(0, Number(last?.position ?? 0) - newest);
    const start = await this.uow.row<SealRow>(null, SEAL_AT, [position]);
    let previous = start?.hash ?? BEGINNING;
    const broken: string[] = [];
    for (;;) {
      const rows = await this.uow.rows<SealedEntry>(null, SEALED_ENTRIES, [position, BATCH]);
      for (const row of rows) {
        position += 1;
        broken.push(...faultsOf(row, position, previous));
        position = Number(row.position);
        previous = row.hash;
      }
      if (rows.length < BATCH) return broken;
    }
  }
}

function faultsOf(row: SealedEntry, position: number, previous: Buffer): string[] {
  const at = `seal ${row.position}`;
  if (Number(row.position) !== position) return [`${at}: the one before it is missing`];
  if (!row.previous.equals(previous)) return [`${at}: does not name the one before it`];
  if (row.id === null) return [`${at}: its entry ${row.entry_id} is gone`];
  return sealHash(previous, row).equals(row.hash) ? [] : [`${at}: its entry ${row.entry_id} was changed`];
}

/** SHA-256 over the hash before and the entry's content as one JSON text. */
function sealHash(previous: Buffer, entry: EntryContent): Buffer {
  const content = JSON.stringify([
    entry.id,
    entry.number,
    entry.book,
    entry.event,
    entry.idempotency_key,
    entry.request_hash.toString('hex'),
    entry.provider_object_id,
    entry.provider_event_kind,
    entry.subcontract_id,
    entry.reverses_entry_id,
    entry.memo,
    entry.posted_at.toISOString(),
    entry.lines,
  ]);
  return createHash('sha256').update(previous).update(content).digest();
}
