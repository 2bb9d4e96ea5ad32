import { useQueryClient } from '@tanstack/react-query';
import { useLiveHints } from '../../../lib/live.ts';
import { newestSeq, talkKeys } from '../api/talk.queries.ts';

/** Keep threads, messages and counts as they are at the server, on every page: the frame calls it once. */
export function useTalkHints(): void {
  const client = useQueryClient();
  useLiveHints({
    thread: ({ threadId, seq }) => [
      talkKeys.unread,
      talkKeys.lists,
      talkKeys.one(threadId),
      // What was read elsewhere is a hint too, and brings no message.
      ...(newestSeq(client, threadId) < seq ? [talkKeys.messages(threadId)] : []),
    ],
  });
}
