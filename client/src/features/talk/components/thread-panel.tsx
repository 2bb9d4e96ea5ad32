import type { MessageView, ThreadView } from '@kerfyard/common/talk';
import { Button, Text } from '@radix-ui/themes';
import { useInfiniteQuery, useQuery } from '@tanstack/react-query';
import { useEffect, useRef, useState } from 'react';
import { useTranslation } from 'react-i18next';
import { useAnnounce } from '../../../components/announcer.tsx';
import { Loading, QueryErrorState } from '../../../components/states.tsx';
import { messagesQuery, threadQuery, useMarkRead, useSendMessage } from '../api/talk.queries.ts';
import { useInView } from '../hooks/use-in-view.ts';
import { MessageForm } from './message-form.tsx';
import { MessageList } from './message-list.tsx';
import { LogisticsNote } from './talk-section.tsx';
import styles from './talk.module.css';

/** One thread: write on top, below it what was said, the last first. Seen messages are marked as read. */
export function ThreadPanel({ threadId }: { threadId: string }) {
  const thread = useQuery(threadQuery(threadId));
  const messages = useInfiniteQuery(messagesQuery(threadId));
  const failed = [thread, messages].find((query) => query.isError && query.data === undefined);
  if (failed !== undefined) {
    return <QueryErrorState error={failed.error} onRetry={() => void failed.refetch()} />;
  }
  if (thread.data === undefined || messages.data === undefined) return <Loading />;
  return (
    <Opened
      thread={thread.data}
      messages={messages.data.pages.flatMap((page) => page.items)}
      older={
        messages.hasNextPage
          ? { isLoading: messages.isFetchingNextPage, load: () => void messages.fetchNextPage() }
          : null
      }
      refetch={() => void messages.refetch()}
    />
  );
}

interface OpenedProps {
  thread: ThreadView;
  messages: readonly MessageView[];
  older: { isLoading: boolean; load: () => void } | null;
  refetch: () => void;
}

function Opened({ thread, messages, older, refetch }: OpenedProps) {
  const { t } = useTranslation('talk');
  const send = useSendMessage(thread.id);
  const top = useRef<HTMLDivElement>(null);
  const [seenSeq] = useState(() => seqSeenAtOpening(thread, messages));
  useMarkSeen(thread, messages[0]?.seq ?? 0, useInView(top));
  useAnnounceNew(thread, messages);
  return (
    <div className={styles.thread}>
      {thread.subcontractId === null && <LogisticsNote />}
      <MessageForm
        draftKey={thread.scopeId + thread.otherSide.id}
        to={thread.otherSide.name}
        onSend={send.mutateAsync}
        onEarlierArrived={refetch}
      />
      <div ref={top} />
      {messages.length === 0 ? (
        <Text as="p" size="2" color="gray">
          {t('nothingYet', { name: thread.otherSide.name })}
        </Text>
      ) : (
        <MessageList messages={messages} otherSideId={thread.otherSide.id} seenSeq={seenSeq} />
      )}
      {older !== null && (
        <div>
          <Button variant="soft" color="gray" size="3" loading={older.isLoading} onClick={older.load}>
            {t('older')}
          </Button>
        </div>
      )}
    </div>
  );
}

/** The number of the last message before the unread ones; when all on the page are unread, before all of them. */
function seqSeenAtOpening(thread: ThreadView, messages: readonly MessageView[]): number {
  const theirs = messages.filter((message) => message.company.id === thread.otherSide.id);
  return theirs[thread.unread]?.seq ?? (thread.unread === 0 ? (messages[0]?.seq ?? 0) : 0);
}

function useMarkSeen(thread: ThreadView, newest: number, isInView: boolean): void {
  const { mutate } = useMarkRead(thread.id);
  const hasUnread = thread.unread > 0;
  useEffect(() => {
    if (isInView && hasUnread && newest > 0) mutate(newest);
  }, [isInView, hasUnread, newest, mutate]);
}

function useAnnounceNew(thread: ThreadView, messages: readonly MessageView[]): void {
  const { t } = useTranslation('talk');
  const announce = useAnnounce();
  const [newest] = messages;
  const told = useRef(newest?.seq ?? 0);
  useEffect(() => {
    if (newest === undefined || newest.seq <= told.current) return;
    told.current = newest.seq;
    if (newest.company.id !== thread.otherSide.id) return;
    const words = newest.body === '' ? t('photosOnly', { count: newest.files.length }) : newest.body;
    announce(t('arrived', { name: newest.author.name, words }));
  }, [newest, thread.otherSide.id, announce, t]);
}
