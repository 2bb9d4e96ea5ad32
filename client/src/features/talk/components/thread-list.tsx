import type { ThreadView } from '@kerfyard/common/talk';
import { useTranslation } from 'react-i18next';
import { NavLink } from 'react-router-dom';
import { paths } from '../../../lib/paths.ts';
import styles from './talk.module.css';
import { ThreadSummary } from './thread-summary.tsx';

/** All threads, the last written first; the open one is marked. */
export function ThreadList({ threads }: { threads: readonly ThreadView[] }) {
  const { t } = useTranslation('talk');
  return (
    <nav aria-label={t('threads')}>
      <ul className={styles.threads}>
        {threads.map((thread) => (
          <li key={thread.id}>
            <NavLink to={paths.thread(thread.id)} className={styles.row}>
              <ThreadSummary thread={thread} showTitle />
            </NavLink>
          </li>
        ))}
      </ul>
    </nav>
  );
}
