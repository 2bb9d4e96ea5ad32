import type { CompanyView } from '@kerfyard/common/api';
import { Text } from '@radix-ui/themes';
import { useInfiniteQuery } from '@tanstack/react-query';
import { useTranslation } from 'react-i18next';
import { Loading, QueryErrorState } from '../../../components/states.tsx';
import { threadsQuery, useSendFirstMessage } from '../api/talk.queries.ts';
import { MessageForm } from './message-form.tsx';
import { LogisticsNote, TalkSection } from './talk-section.tsx';
import { ThreadPanel } from './thread-panel.tsx';

/** For a crew beside a scope: its thread with the scope's general contractor, opened by the first message. */
export function ScopeTalk({ scopeId, gc }: { scopeId: string; gc: CompanyView }) {
  const { t } = useTranslation('talk');
  return (
    <TalkSection title={t('with', { name: gc.name })}>
      <OwnThread scopeId={scopeId} gc={gc} />
    </TalkSection>
  );
}

function OwnThread({ scopeId, gc }: { scopeId: string; gc: CompanyView }) {
  const { t } = useTranslation('talk');
  const threads = useInfiniteQuery(threadsQuery(scopeId));
  const sendFirst = useSendFirstMessage(scopeId);
  if (threads.data === undefined) {
    if (!threads.isError) return <Loading />;
    return <QueryErrorState error={threads.error} onRetry={() => void threads.refetch()} />;
  }
  const own = threads.data.pages[0]?.items[0];
  // The thread is heard of before the message that opens it is sent: the form stays until it is.
  if (own !== undefined && !sendFirst.isPending) return <ThreadPanel threadId={own.id} />;
  return (
    <>
      <LogisticsNote />
      <MessageForm draftKey={scopeId + gc.id} to={gc.name} onSend={sendFirst.mutateAsync} />
      <Text as="p" size="2" color="gray">
        {t('nothingYet', { name: gc.name })}
      </Text>
    </>
  );
}
