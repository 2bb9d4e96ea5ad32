import type { OwnScopesQuery } from '@kerfyard/common/scopes';
import { useTranslation } from 'react-i18next';
import { Link } from 'react-router-dom';
import { paths } from '../../../lib/paths.ts';
import styles from './own-scopes.module.css';

const statuses = ['draft', 'open', 'due', 'awarded', 'closed_without_award', 'withdrawn'] as const;

/** The status that the address asks for; an unknown one asks for all. */
export function readStatus(search: URLSearchParams): OwnScopesQuery['status'] {
  const asked = search.get('status');
  return statuses.find((status) => status === asked);
}

/** Each choice is an address of its own, so it can be kept, sent and gone back to. */
export function StatusFilter({ status }: { status: OwnScopesQuery['status'] }) {
  const { t } = useTranslation(['scopes', 'scope']);
  return (
    <nav className={styles.filter} aria-label={t('filter.label')}>
      <Link
        to={paths.scopes}
        className={styles.choice}
        aria-current={status === undefined ? 'page' : undefined}
      >
        {t('filter.all')}
      </Link>
      {statuses.map((one) => (
        <Link
          key={one}
          to={`${paths.scopes}?status=${one}`}
          className={styles.choice}
          aria-current={status === one ? 'page' : undefined}
        >
          {t(`scope:status.${one}`)}
        </Link>
      ))}
    </nav>
  );
}
