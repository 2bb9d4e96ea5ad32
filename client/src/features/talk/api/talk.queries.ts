import type { Page } from '@kerfyard/common/api';
import type { MessageView, PostMessage, ThreadView } from '@kerfyard/common/talk';
import {
  infiniteQueryOptions,
  queryOptions,
  useMutation,
  useQueryClient,
  type InfiniteData,
  type QueryClient,
} from '@tanstack/react-query';
import { api } from '../../../lib/api-client.ts';

const MESSAGES_AT_ONCE = 20;

export const talkKeys = {
  lists: ['talk', 'threads'] as const,
  list: (scopeId: string | undefined) => ['talk', 'threads', scopeId ?? 'all'] as const,
  one: (threadId: string) => ['talk', 'thread', threadId] as const,
  messages: (threadId: string) => ['talk', 'messages', threadId] as const,
  unread: ['talk', 'unread'] as const,
};

/** A company's threads, or those about one scope, the last written first, read on by key. */
export function threadsQuery(scopeId?: string) {
  return infiniteQueryOptions({
    queryKey: talkKeys.list(scopeId),
    queryFn: ({ signal, pageParam }) =>
      api.get<Page<ThreadView>>('/api/threads', { signal, query: { cursor: pageParam, scopeId } }),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
    meta: { live: true },
  });
}

export function threadQuery(threadId: string) {
  return queryOptions({
    queryKey: talkKeys.one(threadId),
    queryFn: ({ signal }) => api.get<ThreadView>(`/api/threads/${threadId}`, { signal }),
    meta: { live: true },
  });
}

/** A thread's messages, the newest first; each further page holds older ones. */
export function messagesQuery(threadId: string) {
  return infiniteQueryOptions({
    queryKey: talkKeys.messages(threadId),
    queryFn: ({ signal, pageParam }) =>
      api.get<Page<MessageView>>(`/api/threads/${threadId}/messages`, {
        signal,
        query: { before: pageParam, limit: MESSAGES_AT_ONCE },
      }),
    initialPageParam: null as string | null,
    getNextPageParam: (page) => page.nextCursor,
    meta: { live: true },
  });
}

/** How many messages of other companies the signed-in person has not seen. */
export const unreadQuery = queryOptions({
  queryKey: talkKeys.unread,
  queryFn: ({ signal }) => api.get<{ messages: number }>('/api/threads/unread', { signal }),
  staleTime: Infinity,
  meta: { live: true },
});

type Messages = InfiniteData<Page<MessageView>, string | null>;
type Threads = InfiniteData<Page<ThreadView>, string | null>;

/** The newest message's number that this page already has. */
export function newestSeq(client: QueryClient, threadId: string): number {
  return client.getQueryData<Messages>(talkKeys.messages(threadId))?.pages[0]?.items[0]?.seq ?? 0;
}

const postMessage = (threadId: string, message: PostMessage) =>
  api.post<MessageView>(`/api/threads/${threadId}/messages`, message, { idempotencyKey: message.id });

/** Send a message; its id makes a second try of it the same message. */
export function useSendMessage(threadId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (message: PostMessage) => postMessage(threadId, message),
    onSuccess: (message) => addMessage(client, threadId, message),
  });
}

/** A crew's first message about a scope: its thread is opened by it. Both steps may be tried again. */
export function useSendFirstMessage(scopeId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: async (message: PostMessage) => {
      const thread = await api.post<ThreadView>(`/api/scopes/${scopeId}/threads`, {});
      await postMessage(thread.id, message);
    },
    // Not waited for: the form clears itself first, and then makes room for the thread.
    onSuccess: () => void client.invalidateQueries({ queryKey: talkKeys.lists }),
  });
}

/** Remember how far the person has read; answers what is still unread in all. */
export function useMarkRead(threadId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (seq: number) => api.post<{ messages: number }>(`/api/threads/${threadId}/read`, { seq }),
    onSuccess: (unread) => {
      client.setQueryData(talkKeys.unread, unread);
      const seen = (thread: ThreadView) => (thread.id === threadId ? { ...thread, unread: 0 } : thread);
      client.setQueryData<ThreadView>(talkKeys.one(threadId), (thread) => thread && seen(thread));
      client.setQueriesData<Threads>({ queryKey: talkKeys.lists }, (list) => list && mapItems(list, seen));
    },
  });
}

/** The answer to a send goes on top at once when nothing came between; else the thread is read again. */
async function addMessage(client: QueryClient, threadId: string, message: MessageView): Promise<void> {
  const queryKey = talkKeys.messages(threadId);
  if (newestSeq(client, threadId) !== message.seq - 1) {
    await client.invalidateQueries({ queryKey });
    return;
  }
  client.setQueryData<Messages>(queryKey, (known) => {
    const [first, ...older] = known?.pages ?? [];
    if (known === undefined || first === undefined) return known;
    return { ...known, pages: [{ ...first, items: [message, ...first.items] }, ...older] };
  });
}

function mapItems<Item>(
  list: InfiniteData<Page<Item>, string | null>,
  change: (item: Item) => Item,
): InfiniteData<Page<Item>, string | null> {
  return { ...list, pages: list.pages.map((page) => ({ ...page, items: page.items.map(change) })) };
}
