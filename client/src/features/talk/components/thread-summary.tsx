import type { ThreadView } from '@kerfyard/common/talk';
import { useTranslation } from 'react-i18next';
import { deviceTimeZone } from '../../../lib/clock.ts';
import { formatDateTime } from '../../../lib/format.ts';
import styles from './talk.module.css';

/** A thread in a list: with whom, about what, the last words, and how many are not seen. */
export function ThreadSummary({ thread, showTitle = false }: { thread: ThreadView; showTitle?: boolean }) {
  const { t } = useTranslation('talk');
  const last = thread.lastMessage;
  return (
    <span className={styles.summary}>
      <span className={styles.with}>{thread.otherSide.name}</span>
      {thread.unread > 0 && (
        <span className={styles.count}>
          <span aria-hidden="true">{thread.unread}</span>
          <span className="k-hidden">{t('shell:waiting', { count: thread.unread })}</span>
        </span>
      )}
      {showTitle && <span className={styles.about}>{thread.title}</span>}
      <span className={styles.last}>
        {last === null
          ? t('nothingSaid')
          : t('lastWords', { name: last.authorName, words: last.body === '' ? t('photos') : last.body })}
      </span>
      {last !== null && (
        <time className={styles.when} dateTime={last.sentAt}>
          {formatDateTime(last.sentAt, deviceTimeZone())}
        </time>
      )}
    </span>
  );
}
