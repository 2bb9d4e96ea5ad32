import { Button, Text } from '@radix-ui/themes';
import { useInfiniteQuery, useQuery } from '@tanstack/react-query';
import { useTranslation } from 'react-i18next';
import { Outlet, useParams } from 'react-router-dom';
import { Page } from '../components/page.tsx';
import { EmptyState, Loading, QueryErrorState } from '../components/states.tsx';
import { threadQuery, threadsQuery } from '../features/talk/api/talk.queries.ts';
import { TalkDrawing } from '../features/talk/components/talk-drawing.tsx';
import styles from '../features/talk/components/talk.module.css';
import { ThreadList } from '../features/talk/components/thread-list.tsx';
import { queryClient } from '../lib/query-client.ts';

export function loader() {
  void queryClient.prefetchInfiniteQuery(threadsQuery());
  return null;
}

/** All threads of the company; an open one stands beside the list, on a phone in its place. */
export default function TalkPage() {
  const { t } = useTranslation('talk');
  const { threadId } = useParams();
  const open = useQuery({ ...threadQuery(threadId ?? ''), enabled: threadId !== undefined });
  const title = open.data === undefined ? t('title') : t('with', { name: open.data.otherSide.name });
  return (
    <Page title={title} width="wide">
      <div className={`${styles.page} ${threadId === undefined ? '' : styles.hasOpen}`}>
        <Threads hasOpen={threadId !== undefined} />
        <Outlet />
      </div>
    </Page>
  );
}

function Threads({ hasOpen }: { hasOpen: boolean }) {
  const { t } = useTranslation('talk');
  const threads = useInfiniteQuery(threadsQuery());
  if (threads.data === undefined) {
    if (!threads.isError) return <Loading />;
    return <QueryErrorState error={threads.error} onRetry={() => void threads.refetch()} />;
  }
  const items = threads.data.pages.flatMap((page) => page.items);
  if (items.length === 0) {
    return (
      <div className={styles.whole}>
        <EmptyState drawing={<TalkDrawing />} title={t('empty')} text={t('emptyText')} />
      </div>
    );
  }
  return (
    <>
      <div className={`k-panel ${styles.list}`}>
        <ThreadList threads={items} />
        {threads.hasNextPage && (
          <div className={styles.more}>
            <Button
              variant="soft"
              color="gray"
              loading={threads.isFetchingNextPage}
              onClick={() => void threads.fetchNextPage()}
            >
              {t('moreThreads')}
            </Button>
          </div>
        )}
      </div>
      {!hasOpen && (
        <Text as="p" color="gray" className={styles.choose}>
          {t('choose')}
        </Text>
      )}
    </>
  );
}
