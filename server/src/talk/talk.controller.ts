import { Body, Controller, Get, HttpCode, Param, Post, Query } from '@nestjs/common';
import type { z } from 'zod';
import { idSchema, type Page } from '@kerfyard/common/api';
import type { Actor } from '@kerfyard/common/people';
import {
  openThreadSchema,
  postMessageSchema,
  readThreadSchema,
  type MessageView,
  type PostMessage as PostMessageInput,
  type ThreadView,
} from '@kerfyard/common/talk';
import { CurrentActor, Needs } from '../platform/auth/access.decorators.ts';
import { OpenThread } from './open-thread.ts';
import { PostMessage } from './post-message.ts';
import { ReadThreads } from './read-threads.ts';
import {
  messagesQuerySchema,
  threadsQuerySchema,
  type MessagesQuery,
  type ThreadsQuery,
} from './talk.schema.ts';

@Controller()
@Needs('talk')
export class TalkController {
  constructor(
    private readonly threads: ReadThreads,
    private readonly postMessage: PostMessage,
    private readonly openThread: OpenThread,
  ) {}

  @Get('threads')
  list(
    @CurrentActor() actor: Actor,
    @Query({ schema: threadsQuerySchema }) query: ThreadsQuery,
  ): Promise<Page<ThreadView>> {
    return this.threads.page(actor, query);
  }

  @Get('threads/unread')
  unread(@CurrentActor() actor: Actor): Promise<{ messages: number }> {
    return this.threads.unread(actor);
  }

  @Get('threads/:id')
  one(@CurrentActor() actor: Actor, @Param('id', { schema: idSchema }) id: string): Promise<ThreadView> {
    return this.threads.one(actor, id);
  }

  @Get('threads/:id/messages')
  messages(
    @CurrentActor() actor: Actor,
    @Param('id', { schema: idSchema }) id: string,
    @Query({ schema: messagesQuerySchema }) query: MessagesQuery,
  ): Promise<Page<MessageView>> {
    return this.threads.messages(actor, id, query);
  }

  @Post('threads/:id/messages')
  post(
    @CurrentActor() actor: Actor,
    @Param('id', { schema: idSchema }) id: string,
    @Body({ schema: postMessageSchema }) input: PostMessageInput,
  ): Promise<MessageView> {
    return this.postMessage.run(actor, id, input);
  }

  /** Answers how many messages are unread in all. */
  @Post('threads/:id/read')
  @HttpCode(200)
  markRead(
    @CurrentActor() actor: Actor,
    @Param('id', { schema: idSchema }) id: string,
    @Body({ schema: readThreadSchema }) { seq }: z.output<typeof readThreadSchema>,
  ): Promise<{ messages: number }> {
    return this.threads.markRead(actor, id, seq);
  }

  @Post('scopes/:id/threads')
  @HttpCode(200)
  open(
    @CurrentActor() actor: Actor,
    @Param('id', { schema: idSchema }) scopeId: string,
    @Body({ schema: openThreadSchema }) { crewCompanyId }: z.output<typeof openThreadSchema>,
  ): Promise<ThreadView> {
    return this.openThread.run(actor, scopeId, crewCompanyId);
  }
}
