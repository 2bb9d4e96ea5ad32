import { useQuery } from '@tanstack/react-query';
import { useEffect, useRef } from 'react';
import { useTranslation } from 'react-i18next';
import { NavLink } from 'react-router-dom';
import { useAnnounce } from '../../../components/announcer.tsx';
import { NavPicture } from '../../../components/nav-picture.tsx';
import { paths } from '../../../lib/paths.ts';
import { unreadQuery } from '../api/talk.queries.ts';
import { useTalkHints } from '../hooks/use-talk-hints.ts';
import styles from './talk-link.module.css';

/** The way to all threads, with the number of messages not seen: at every width, in the frame of every page. */
export function TalkLink() {
  const { t } = useTranslation();
  useTalkHints();
  const known = useQuery(unreadQuery).data?.messages;
  useAnnounceMore(known);
  const count = known ?? 0;
  return (
    <NavLink to={paths.talk} className={styles.link}>
      <NavPicture name="talk" />
      <span className={styles.label}>{t('nav.talk')}</span>
      {count > 0 && (
        <span className={styles.count}>
          <span aria-hidden="true">{count > 99 ? '99+' : count}</span>
          <span className="k-hidden">{t('waiting', { count })}</span>
        </span>
      )}
    </NavLink>
  );
}

/** Said when more wait than before, not when they are read. */
function useAnnounceMore(count: number | undefined): void {
  const { t } = useTranslation();
  const announce = useAnnounce();
  const before = useRef<number | undefined>(undefined);
  useEffect(() => {
    if (count === undefined) return;
    if (before.current !== undefined && count > before.current) announce(t('waiting', { count }));
    before.current = count;
  }, [count, announce, t]);
}
