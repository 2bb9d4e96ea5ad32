import { Button, Text } from '@radix-ui/themes';
import { useInfiniteQuery } from '@tanstack/react-query';
import { useId, useState } from 'react';
import { useTranslation } from 'react-i18next';
import { Loading, QueryErrorState } from '../../../components/states.tsx';
import { threadsQuery } from '../api/talk.queries.ts';
import { TalkSection } from './talk-section.tsx';
import styles from './talk.module.css';
import { ThreadPanel } from './thread-panel.tsx';
import { ThreadSummary } from './thread-summary.tsx';

/** For a general contractor beside its scope: the threads of the bidders that wrote, each opening in place. */
export function ScopeThreads({ scopeId }: { scopeId: string }) {
  const { t } = useTranslation('talk');
  return (
    <TalkSection title={t('withBidders')}>
      <Threads scopeId={scopeId} />
    </TalkSection>
  );
}

function Threads({ scopeId }: { scopeId: string }) {
  const { t } = useTranslation('talk');
  const threads = useInfiniteQuery(threadsQuery(scopeId));
  const [openId, setOpenId] = useState<string | null>(null);
  const panelId = useId();
  if (threads.data === undefined) {
    if (!threads.isError) return <Loading />;
    return <QueryErrorState error={threads.error} onRetry={() => void threads.refetch()} />;
  }
  const items = threads.data.pages.flatMap((page) => page.items);
  if (items.length === 0) {
    return (
      <Text as="p" size="2" color="gray">
        {t('noBidderYet')}
      </Text>
    );
  }
  return (
    <>
      <ul className={styles.threads}>
        {items.map((thread) => {
          const isOpen = thread.id === openId;
          return (
            <li key={thread.id}>
              <button
                type="button"
                className={styles.row}
                aria-expanded={isOpen}
                aria-controls={isOpen ? panelId : undefined}
                onClick={(event) => {
                  // What was said last comes onto the screen, or it would not count as seen.
                  if (!isOpen) event.currentTarget.scrollIntoView({ block: 'start' });
                  setOpenId(isOpen ? null : thread.id);
                }}
              >
                <ThreadSummary thread={thread} />
              </button>
              {isOpen && (
                <div id={panelId} className={styles.inRow}>
                  <ThreadPanel threadId={thread.id} />
                </div>
              )}
            </li>
          );
        })}
      </ul>
      {threads.hasNextPage && (
        <div>
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
    </>
  );
}
