import { Global, Module, type OnModuleInit } from '@nestjs/common';
import { FileAccess } from '../files/file-access.ts';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { WatchAccess } from '../platform/realtime/watch-access.ts';
import { MessageWaiting } from './message-waiting.ts';
import { OpenThread } from './open-thread.ts';
import { PostMessage } from './post-message.ts';
import { ReadThreads } from './read-threads.ts';
import { TalkController } from './talk.controller.ts';
import { FILE_IN_OWN_THREAD } from './talk.queries.ts';
import { ThreadAccess } from './thread-access.ts';

/** Threads between a general contractor and one crew. Global: the demo talks as people do. */
@Global()
@Module({
  controllers: [TalkController],
  providers: [ThreadAccess, ReadThreads, PostMessage, OpenThread, MessageWaiting],
  exports: [OpenThread, PostMessage],
})
export class TalkModule implements OnModuleInit {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly fileAccess: FileAccess,
    private readonly watchAccess: WatchAccess,
    private readonly access: ThreadAccess,
  ) {}

  onModuleInit(): void {
    this.fileAccess.register(async (actor, fileId) => {
      if (actor.company === null) return false;
      return (await this.uow.row(null, FILE_IN_OWN_THREAD, [fileId, actor.company.id])) !== null;
    });
    this.watchAccess.register('thread', (actor, id) => this.access.has(actor, id));
  }
}
