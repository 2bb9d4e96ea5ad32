import type { FileView } from '@kerfyard/common/files';
import { dropTail, keepTail, readTail } from '../../lib/draft-tail.ts';

/** A message not sent yet. The id stays with the words: sent again after a reload, they are still one message. */
export interface MessageDraft {
  id: string | undefined;
  body: string;
  files: FileView[];
}

const tailKey = (key: string) => `talk.${key}`;

export function readDraft(key: string): MessageDraft {
  const kept = readTail(tailKey(key)) as Partial<MessageDraft> | null | undefined;
  return {
    id: typeof kept?.id === 'string' ? kept.id : undefined,
    body: typeof kept?.body === 'string' ? kept.body : '',
    files: Array.isArray(kept?.files) ? kept.files.filter((file) => typeof file?.id === 'string') : [],
  };
}

/** An empty draft leaves nothing behind. */
export function keepDraft(key: string, draft: MessageDraft): void {
  if (draft.body === '' && draft.files.length === 0) dropTail(tailKey(key));
  else keepTail(tailKey(key), draft);
}
