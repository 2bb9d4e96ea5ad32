import {
  closeSync,
  existsSync,
  fstatSync,
  ftruncateSync,
  mkdirSync,
  openSync,
  readFileSync,
  renameSync,
  writeSync,
} from 'node:fs';
import { join } from 'node:path';

/** One line of the journal: everything one request or timer changed, all or nothing. */
export interface JournalEntry {
  put: [kind: string, record: { id: string }][];
  remove: [kind: string, id: string][];
}

const SMALLEST_COMPACTION_BYTES = 32_000_000;

/**
 * Append-only file of changes. A line is written before the caller is answered, so what was answered survives
 * `kill -9` (the written bytes belong to the operating system then). A line cut short is the last one and is dropped.
 */
export class Journal {
  private readonly path: string;
  private fd = -1;
  private sizeBytes = 0;
  private compactAboveBytes: number;

  constructor(
    dataDir: string,
    private readonly smallestCompactionBytes = SMALLEST_COMPACTION_BYTES,
  ) {
    this.compactAboveBytes = smallestCompactionBytes;
    mkdirSync(dataDir, { recursive: true });
    this.path = join(dataDir, 'journal.ndjson');
  }

  /** Hands every whole entry to `apply`, oldest first, cuts off a torn end, and opens the file for appending. */
  load(apply: (entry: JournalEntry) => void): void {
    const content = existsSync(this.path) ? readFileSync(this.path) : Buffer.alloc(0);
    const wholeBytes = content.lastIndexOf(0x0a) + 1;
    for (const line of content.subarray(0, wholeBytes).toString('utf8').split('\n')) {
      if (line !== '') apply(JSON.parse(line) as JournalEntry);
    }
    this.fd = openSync(this.path, 'a');
    if (wholeBytes < content.length) ftruncateSync(this.fd, wholeBytes);
    this.sizeBytes = wholeBytes;
  }

  append(entry: JournalEntry): void {
    const line = Buffer.from(`${JSON.stringify(entry)}\n`);
    let written = 0;
    while (written < line.length) written += writeSync(this.fd, line, written);
    this.sizeBytes += line.length;
  }

  needsCompaction(): boolean {
    return this.sizeBytes > this.compactAboveBytes;
  }

  /** Replaces the history by the records as they stand now; the old file stays until the new one is whole. */
  compact(records: Iterable<[kind: string, record: { id: string }]>): void {
    const fd = openSync(`${this.path}.new`, 'w');
    for (const record of records) writeSync(fd, `${JSON.stringify({ put: [record], remove: [] })}\n`);
    this.sizeBytes = fstatSync(fd).size;
    // Twice what it holds now: a big state must not be rewritten with every change.
    this.compactAboveBytes = Math.max(this.smallestCompactionBytes, 2 * this.sizeBytes);
    closeSync(fd);
    renameSync(`${this.path}.new`, this.path);
    closeSync(this.fd);
    this.fd = openSync(this.path, 'a');
  }

  close(): void {
    closeSync(this.fd);
  }
}
