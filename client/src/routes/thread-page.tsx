import type { ThreadView } from '@kerfyard/common/talk';
import { Text } from '@radix-ui/themes';
import { useQuery } from '@tanstack/react-query';
import { useTranslation } from 'react-i18next';
import { useParams, type LoaderFunctionArgs } from 'react-router-dom';
import { TextLink } from '../components/link.tsx';
import { useSession } from '../features/session/hooks/use-session.ts';
import { messagesQuery, threadQuery } from '../features/talk/api/talk.queries.ts';
import styles from '../features/talk/components/talk.module.css';
import { ThreadPanel } from '../features/talk/components/thread-panel.tsx';
import { paths } from '../lib/paths.ts';
import { queryClient } from '../lib/query-client.ts';

export function loader({ params }: LoaderFunctionArgs) {
  const id = params.threadId ?? '';
  void queryClient.prefetchQuery(threadQuery(id));
  void queryClient.prefetchInfiniteQuery(messagesQuery(id));
  return null;
}

/** One thread, with the way to what it is about. */
export default function ThreadPage() {
  const { t } = useTranslation('talk');
  const { threadId = '' } = useParams();
  const thread = useQuery(threadQuery(threadId)).data;
  return (
    <div className={`k-panel ${styles.section}`}>
      <div className={styles.back}>
        <TextLink to={paths.talk}>{t('allThreads')}</TextLink>
      </div>
      {thread !== undefined && <About thread={thread} />}
      <ThreadPanel key={threadId} threadId={threadId} />
    </div>
  );
}

function About({ thread }: { thread: ThreadView }) {
  const { t } = useTranslation('talk');
  const isGc = useSession().company?.kind === 'general_contractor';
  const scope = isGc ? paths.scope(thread.scopeId) : paths.openScope(thread.scopeId);
  return (
    <Text as="p" size="3">
      {t('about')}{' '}
      <TextLink to={thread.subcontractId === null ? scope : paths.workItem(thread.subcontractId)}>
        {thread.title}
      </TextLink>
    </Text>
  );
}
