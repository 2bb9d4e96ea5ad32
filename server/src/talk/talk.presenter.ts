import type { FileView } from '@kerfyard/common/files';
import type { Actor } from '@kerfyard/common/people';
import type { MessageView, ThreadView } from '@kerfyard/common/talk';
import { toInstant, toNumber } from '../platform/database/codecs.ts';

export interface ThreadViewRow {
  id: string;
  scope_id: string;
  subcontract_id: string | null;
  title: string;
  other_id: string;
  other_name: string;
  active_at: Date;
  last_body: string | null;
  last_sent_at: Date | null;
  last_author_name: string | null;
  unread: string;
}

export interface MessageRow {
  id: string;
  thread_id: string;
  seq: string;
  body: string;
  sent_at: Date;
  author_id: string;
  author_name: string;
  company_id: string;
  company_name: string;
  file_ids: string[];
}

/** A thread as one side sees it, with what that person has not seen yet. */
export function toThreadView(row: ThreadViewRow): ThreadView {
  const { last_body: body, last_sent_at: sentAt, last_author_name: authorName } = row;
  const hasLast = body !== null && sentAt !== null && authorName !== null;
  return {
    id: row.id,
    scopeId: row.scope_id,
    subcontractId: row.subcontract_id,
    title: row.title,
    otherSide: { id: row.other_id, name: row.other_name },
    lastMessage: hasLast ? { body, sentAt: toInstant(sentAt), authorName } : null,
    unread: toNumber(row.unread),
  };
}

/** A message as one side sees it. */
export function toMessageView(row: MessageRow, files: Map<string, FileView>, actor: Actor): MessageView {
  return {
    id: row.id,
    seq: toNumber(row.seq),
    author: { id: row.author_id, name: row.author_name },
    company: { id: row.company_id, name: row.company_name },
    isOwn: row.author_id === actor.userId,
    body: row.body,
    files: row.file_ids.flatMap((id) => files.get(id) ?? []),
    sentAt: toInstant(row.sent_at),
  };
}
