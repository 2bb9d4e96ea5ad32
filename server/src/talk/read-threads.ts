import { Injectable } from '@nestjs/common';
import type { Page } from '@kerfyard/common/api';
import type { Actor } from '@kerfyard/common/people';
import type { MessageView, ThreadView } from '@kerfyard/common/talk';
import { FilesService } from '../files/files.service.ts';
import { toNumber } from '../platform/database/codecs.ts';
import { readCursor, toPage } from '../platform/database/page-cursor.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { LiveHints, rooms } from '../platform/realtime/live-hints.ts';
import { toMessageView, toThreadView, type MessageRow, type ThreadViewRow } from './talk.presenter.ts';
import {
  MARK_READ,
  MESSAGE_BY_ID,
  MESSAGES_PAGE,
  THREAD_BY_ID,
  THREADS_PAGE,
  UNREAD_TOTAL,
} from './talk.queries.ts';
import { ThreadAccess } from './thread-access.ts';
import type { MessagesQuery, ThreadsQuery } from './talk.schema.ts';

/** Threads and messages as one person sees them, and how far that person has read. */
@Injectable()
export class ReadThreads {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly access: ThreadAccess,
    private readonly files: FilesService,
    private readonly hints: LiveHints,
  ) {}

  /** Newest first, by when something was last written. */
  async page(actor: Actor, query: ThreadsQuery): Promise<Page<ThreadView>> {
    const after = readCursor(query.cursor);
    const rows = await this.uow.rows<ThreadViewRow>(null, THREADS_PAGE, [
      ...reader(actor),
      after?.at ?? null,
      after?.id ?? null,
      query.limit + 1,
      query.scopeId ?? null,
    ]);
    const key = (row: ThreadViewRow) => ({ at: row.active_at, id: row.id });
    return toPage(rows, query.limit, { key, item: toThreadView });
  }

  /** @throws AppError 404 for unknown and foreign ids alike */
  async one(actor: Actor, threadId: string, tx: Tx | null = null): Promise<ThreadView> {
    const row = await this.uow.row<ThreadViewRow>(tx, THREAD_BY_ID, [...reader(actor), threadId]);
    if (row === null) throw new AppError('not_found');
    return toThreadView(row);
  }

  /** Newest first; `nextCursor` is the next `before`. */
  async messages(actor: Actor, threadId: string, query: MessagesQuery): Promise<Page<MessageView>> {
    await this.access.demand(null, actor, threadId);
    const rows = await this.uow.rows<MessageRow>(null, MESSAGES_PAGE, [
      threadId,
      query.before ?? null,
      query.limit + 1,
    ]);
    const page = rows.slice(0, query.limit);
    const files = await this.files.views(page.flatMap((row) => row.file_ids));
    return {
      items: page.map((row) => toMessageView(row, files, actor)),
      nextCursor: rows.length > query.limit ? (page.at(-1)?.seq ?? null) : null,
    };
  }

  /** One message of a thread already known to be the actor's. */
  async message(actor: Actor, messageId: string): Promise<MessageView> {
    const row = await this.uow.row<MessageRow>(null, MESSAGE_BY_ID, [messageId]);
    if (row === null) throw new AppError('not_found');
    return toMessageView(row, await this.files.views(row.file_ids), actor);
  }

  /** Remember what was seen, and tell the person's other windows. */
  async markRead(actor: Actor, threadId: string, seq: number): Promise<{ messages: number }> {
    const thread = await this.access.demand(null, actor, threadId);
    await this.uow.run(async (tx) => this.uow.rows(tx, MARK_READ, [threadId, actor.userId, seq]));
    this.hints.emit(rooms.user(actor.userId), { topic: 'thread', threadId, seq: toNumber(thread.seq) });
    return this.unread(actor);
  }

  /** Messages of other companies that this person has not seen. */
  async unread(actor: Actor): Promise<{ messages: number }> {
    if (actor.company === null) return { messages: 0 };
    const row = await this.uow.row<{ messages: string }>(null, UNREAD_TOTAL, reader(actor));
    return { messages: toNumber(row?.messages ?? 0) };
  }
}

const reader = (actor: Actor): [string | null, string] => [actor.company?.id ?? null, actor.userId];
