import type { Journal, JournalEntry } from './journal.ts';
import type { Kind, Kinds } from './records.ts';

interface AnyRecord {
  id: string;
  owner: string;
}

/** Records of one kind in the order they came, with each owner's own list beside. */
class Collection {
  readonly records = new Map<string, AnyRecord>();
  private readonly idsByOwner = new Map<string, Set<string>>();

  put(record: AnyRecord): void {
    this.records.set(record.id, record);
    const ids = this.idsByOwner.get(record.owner);
    if (ids) ids.add(record.id);
    else this.idsByOwner.set(record.owner, new Set([record.id]));
  }

  remove(id: string): void {
    const record = this.records.get(id);
    if (!record) return;
    this.records.delete(id);
    this.idsByOwner.get(record.owner)?.delete(id);
  }

  ids(owner: string | null): string[] {
    return [...(owner === null ? this.records.keys() : (this.idsByOwner.get(owner) ?? []))];
  }
}

/** All state in memory; every change also in the journal. */
export class Store {
  private collections = new Map<Kind, Collection>();

  constructor(private readonly journal: Journal) {}

  load(): void {
    this.journal.load((entry) => this.apply(entry));
  }

  /** Starts a set of changes that is applied whole by `commit` or forgotten. */
  begin(): Transaction {
    return new Transaction(this);
  }

  commit(entry: JournalEntry): void {
    if (entry.put.length === 0 && entry.remove.length === 0) return;
    this.journal.append(entry);
    this.apply(entry);
    if (this.journal.needsCompaction()) this.journal.compact(this.all());
  }

  /** Forgets everything, on disk too. */
  clear(): void {
    this.collections = new Map();
    this.journal.compact([]);
  }

  collection(kind: Kind): Collection {
    let found = this.collections.get(kind);
    if (!found) this.collections.set(kind, (found = new Collection()));
    return found;
  }

  private *all(): Iterable<[string, AnyRecord]> {
    for (const [kind, collection] of this.collections) {
      for (const record of collection.records.values()) yield [kind, record];
    }
  }

  private apply(entry: JournalEntry): void {
    for (const [kind, record] of entry.put) this.collection(kind as Kind).put(record as AnyRecord);
    for (const [kind, id] of entry.remove) this.collection(kind as Kind).remove(id);
  }
}

/**
 * A view of the store with changes of its own. Work inside is synchronous, so transactions never overlap. Records
 * from `get` and `list` must not be changed; `edit` returns a copy that will be saved.
 */
export class Transaction {
  private readonly staged = new Map<Kind, Map<string, AnyRecord | null>>();

  constructor(private readonly store: Store) {}

  get<K extends Kind>(kind: K, id: string): Kinds[K] | undefined {
    const staged = this.staged.get(kind)?.get(id);
    if (staged !== undefined) return (staged ?? undefined) as Kinds[K] | undefined;
    return this.store.collection(kind).records.get(id) as Kinds[K] | undefined;
  }

  /** Throws when there is no such record: callers look it up first. */
  edit<K extends Kind>(kind: K, id: string): Kinds[K] {
    const staged = this.staged.get(kind)?.get(id);
    if (staged) return staged as Kinds[K];
    const current = this.get(kind, id);
    if (!current) throw new Error(`no ${kind} ${id}`);
    const copy = structuredClone(current);
    this.stage(kind, id, copy);
    return copy;
  }

  put<K extends Kind>(kind: K, record: Kinds[K]): Kinds[K] {
    this.stage(kind, record.id, record);
    return record;
  }

  remove(kind: Kind, id: string): void {
    this.stage(kind, id, null);
  }

  /** Newest first. `owner` null lists all owners' records. */
  list<K extends Kind>(kind: K, owner: string | null): Kinds[K][] {
    const staged = this.staged.get(kind);
    const ids = this.store.collection(kind).ids(owner);
    const known = new Set(ids);
    for (const [id, record] of staged ?? []) {
      if (record && !known.has(id) && (owner === null || record.owner === owner)) ids.push(id);
    }
    const found: Kinds[K][] = [];
    for (const id of ids.reverse()) {
      const record = this.get(kind, id);
      if (record) found.push(record);
    }
    return found;
  }

  hasChanged(kind: Kind): boolean {
    return this.staged.has(kind);
  }

  commit(): void {
    const entry: JournalEntry = { put: [], remove: [] };
    for (const [kind, records] of this.staged) {
      for (const [id, record] of records) {
        if (record) entry.put.push([kind, record]);
        else entry.remove.push([kind, id]);
      }
    }
    this.store.commit(entry);
  }

  private stage(kind: Kind, id: string, record: AnyRecord | null): void {
    let records = this.staged.get(kind);
    if (!records) this.staged.set(kind, (records = new Map()));
    records.set(id, record);
  }
}
