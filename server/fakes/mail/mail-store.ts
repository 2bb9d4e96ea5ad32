import { randomBytes } from 'node:crypto';
import { mkdirSync, readdirSync, readFileSync, renameSync, rmSync, writeFileSync } from 'node:fs';
import { join } from 'node:path';

/** One received message as kept on disk and answered as JSON. */
export interface StoredMessage {
  id: string;
  receivedAt: string;
  from: string;
  /** Envelope recipients, lower case: what the sender really addressed, blind copies included. */
  to: string[];
  subject: string;
  text: string;
  html: string | null;
  /** Every http(s) address in the message, in order, without repeats. */
  links: string[];
  attachments: StoredAttachment[];
}

export interface StoredAttachment {
  filename: string;
  contentType: string;
  sizeBytes: number;
  contentBase64: string;
}

/** Messages in memory, each also a file, so that a restart keeps them. The oldest go when there are too many. */
export class MailStore {
  private messages: StoredMessage[] = [];
  private lastStamp = 0;

  constructor(
    private readonly directory: string,
    private readonly maxMessages = 500,
  ) {
    mkdirSync(directory, { recursive: true });
    for (const name of readdirSync(directory).sort()) this.load(name);
  }

  /** Newest first; `to` matches one recipient exactly, without regard to case. */
  list(filter: { to?: string | null } = {}): StoredMessage[] {
    const recipient = filter.to?.toLowerCase();
    const found = recipient ? this.messages.filter((m) => m.to.includes(recipient)) : this.messages;
    return [...found].reverse();
  }

  find(id: string): StoredMessage | undefined {
    return this.messages.find((message) => message.id === id);
  }

  /** Writes the message to disk, then shows it. Returns it with its id. */
  add(message: Omit<StoredMessage, 'id'>): StoredMessage {
    const stored = { id: this.nextId(), ...message };
    const path = this.pathOf(stored.id);
    writeFileSync(`${path}.part`, JSON.stringify(stored));
    renameSync(`${path}.part`, path);
    this.messages.push(stored);
    while (this.messages.length > this.maxMessages) this.remove(this.messages[0]!.id);
    return stored;
  }

  /** Returns whether there was such a message. */
  remove(id: string): boolean {
    const index = this.messages.findIndex((message) => message.id === id);
    if (index < 0) return false;
    this.messages.splice(index, 1);
    rmSync(this.pathOf(id), { force: true });
    return true;
  }

  clear(): void {
    for (const message of [...this.messages]) this.remove(message.id);
  }

  private load(name: string): void {
    const path = join(this.directory, name);
    if (!name.endsWith('.json')) return rmSync(path, { force: true });
    try {
      this.messages.push(JSON.parse(readFileSync(path, 'utf8')) as StoredMessage);
    } catch {
      // Half a file can only come from a crash of the disk: the message is lost, the program is not.
      rmSync(path, { force: true });
    }
  }

  private pathOf(id: string): string {
    return join(this.directory, `${id}.json`);
  }

  /** Ids sort by arrival, also within one millisecond and across restarts. */
  private nextId(): string {
    this.lastStamp = Math.max(this.lastStamp + 1, Date.now());
    return `${this.lastStamp}-${randomBytes(4).toString('hex')}`;
  }
}
