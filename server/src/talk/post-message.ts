import { Injectable } from '@nestjs/common';
import type { Actor } from '@kerfyard/common/people';
import type { MessageView, PostMessage as Input } from '@kerfyard/common/talk';
import { FilesService } from '../files/files.service.ts';
import { Clock } from '../platform/clock/clock.ts';
import { toNumber } from '../platform/database/codecs.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { LiveHints, rooms } from '../platform/realtime/live-hints.ts';
import { MessageWaiting } from './message-waiting.ts';
import { ReadThreads } from './read-threads.ts';
import type { MessageRow } from './talk.presenter.ts';
import {
  INSERT_MESSAGE,
  INSERT_MESSAGE_FILES,
  MARK_READ,
  MESSAGE_BY_ID,
  MOVE_THREAD_ON,
} from './talk.queries.ts';
import { ThreadAccess, type ThreadRow } from './thread-access.ts';

/** Writes one message. The client makes its id, so that a second try of the same message is the same message. */
@Injectable()
export class PostMessage {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly clock: Clock,
    private readonly access: ThreadAccess,
    private readonly files: FilesService,
    private readonly waiting: MessageWaiting,
    private readonly threads: ReadThreads,
    private readonly hints: LiveHints,
  ) {}

  /** @throws AppError 404, 409 `key_reused` for an id that is another message, 422 for files that are not the company's */
  async run(actor: Actor, threadId: string, input: Input): Promise<MessageView> {
    const fileIds = [...new Set(input.fileIds)];
    const { thread, seq } = await this.uow.run(async (tx) => {
      const locked = await this.access.lock(tx, actor, threadId);
      const earlier = await this.uow.row<MessageRow>(tx, MESSAGE_BY_ID, [input.id]);
      if (earlier !== null) {
        if (!isSame(earlier, { actor, threadId, body: input.body, fileIds }))
          throw new AppError('key_reused');
        return { thread: locked, seq: null };
      }
      return { thread: locked, seq: await this.write(tx, actor, locked, { ...input, fileIds }) };
    });
    if (seq !== null) {
      const to = [
        rooms.company(thread.gc_company_id),
        rooms.company(thread.crew_company_id),
        rooms.thread(threadId),
      ];
      this.hints.emit(to, { topic: 'thread', threadId, seq });
    }
    return this.threads.message(actor, input.id);
  }

  private async write(tx: Tx, actor: Actor, thread: ThreadRow, message: Input): Promise<number> {
    const own = ownSide(actor, thread);
    await this.files.requireOwn(tx, { companyId: own, fileIds: message.fileIds, field: 'fileIds' });
    const seq = toNumber(thread.seq) + 1;
    const sentAt = await this.clock.now(tx);
    await this.uow.rows(tx, INSERT_MESSAGE, [
      message.id,
      thread.id,
      seq,
      actor.userId,
      own,
      message.body,
      sentAt,
    ]);
    if (message.fileIds.length > 0)
      await this.uow.rows(tx, INSERT_MESSAGE_FILES, [message.id, message.fileIds]);
    await this.uow.rows(tx, MOVE_THREAD_ON, [thread.id, seq, sentAt]);
    await this.uow.rows(tx, MARK_READ, [thread.id, actor.userId, seq]);
    const other = own === thread.gc_company_id ? thread.crew_company_id : thread.gc_company_id;
    await this.waiting.ask(tx, { threadId: thread.id, companyId: other });
    return seq;
  }
}

function ownSide(actor: Actor, thread: ThreadRow): string {
  return actor.company?.id === thread.gc_company_id ? thread.gc_company_id : thread.crew_company_id;
}

function isSame(
  earlier: MessageRow,
  now: { actor: Actor; threadId: string; body: string; fileIds: readonly string[] },
): boolean {
  return (
    earlier.thread_id === now.threadId &&
    earlier.author_id === now.actor.userId &&
    earlier.body === now.body &&
    earlier.file_ids.join() === now.fileIds.join()
  );
}
