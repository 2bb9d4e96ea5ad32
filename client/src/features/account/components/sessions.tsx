import type { SessionView } from '@kerfyard/common/people';
import { Button, Text } from '@radix-ui/themes';
import { useQuery } from '@tanstack/react-query';
import { useTranslation } from 'react-i18next';
import { ConfirmDialog } from '../../../components/confirm-dialog.tsx';
import { Loading, QueryErrorState } from '../../../components/states.tsx';
import { StatusWord } from '../../../components/status-word.tsx';
import { deviceTimeZone } from '../../../lib/clock.ts';
import { formatDateTime } from '../../../lib/format.ts';
import { sessionsQuery, useEndOtherSessions, useEndSession } from '../api/account.queries.ts';
import { deviceOf } from '../device-words.ts';
import styles from './account.module.css';
import { Section } from './section.tsx';

/** Every browser that is signed in to this account, and how to sign it out. */
export function Sessions() {
  const { t } = useTranslation('account');
  const sessions = useQuery(sessionsQuery);
  const endOthers = useEndOtherSessions();
  return (
    <Section title={t('sessions.title')} text={t('sessions.text')}>
      {sessions.isPending && <Loading />}
      {sessions.isError && <QueryErrorState error={sessions.error} onRetry={() => void sessions.refetch()} />}
      {sessions.isSuccess && (
        <ul className={styles.sessions}>
          {sessions.data.map((session) => (
            <Session key={session.id} session={session} />
          ))}
        </ul>
      )}
      {(sessions.data?.length ?? 0) > 1 && (
        <ConfirmDialog
          trigger={
            <Button variant="soft" color="red" size="3" mt="3">
              {t('sessions.endOthers')}
            </Button>
          }
          title={t('sessions.endOthers')}
          text={t('sessions.endOthersText')}
          confirm={t('sessions.endOthers')}
          destructive
          onConfirm={() => endOthers.mutateAsync(undefined)}
        />
      )}
    </Section>
  );
}

function Session({ session }: { session: SessionView }) {
  const { t } = useTranslation('account');
  const end = useEndSession();
  const { browser, system } = deviceOf(session.userAgent);
  const device = t('sessions.device', {
    browser: browser ?? t('sessions.someBrowser'),
    system: system ?? t('sessions.someSystem'),
  });
  const at = (instant: string) => formatDateTime(instant, deviceTimeZone());
  return (
    <li>
      <div>
        <Text as="p" size="3">
          {device}
        </Text>
        <Text as="p" size="2" color="gray">
          {t('sessions.when', {
            used: at(session.lastUsedAt),
            started: at(session.startedAt),
            ip: session.ip,
          })}
        </Text>
      </div>
      {session.isCurrent ? (
        <StatusWord tone="good">{t('sessions.current')}</StatusWord>
      ) : (
        <Button
          variant="soft"
          color="gray"
          size="2"
          loading={end.isPending}
          aria-label={t('sessions.endNamed', { device })}
          onClick={() => end.mutate(session.id)}
        >
          {t('sessions.end')}
        </Button>
      )}
    </li>
  );
}
