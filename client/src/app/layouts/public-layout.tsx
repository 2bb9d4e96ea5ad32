import type { ReactNode } from 'react';
import { useTranslation } from 'react-i18next';
import { Link, Outlet } from 'react-router-dom';
import { Mark } from '../../components/mark.tsx';
import { ThemeToggle } from '../../components/theme-toggle.tsx';
import { ButtonLink } from '../../components/link.tsx';
import { useMaybeSession } from '../../features/session/hooks/use-session.ts';
import { homeOf, paths } from '../../lib/paths.ts';
import styles from './public-layout.module.css';

/** The frame of pages that need no sign-in. */
export function PublicFrame({ children }: { children: ReactNode }) {
  const { t } = useTranslation();
  const me = useMaybeSession();
  return (
    <div className={styles.frame}>
      <header className={styles.header}>
        <Link to={paths.home} className={styles.brand}>
          <Mark size={24} />
          Kerfyard
        </Link>
        <div className={styles.side}>
          <ThemeToggle />
          {me === null ? (
            <ButtonLink to={paths.signIn()} variant="soft" color="gray">
              {t('signIn')}
            </ButtonLink>
          ) : (
            <ButtonLink
              to={homeOf({ isStaff: me.user.isStaff, kind: me.company?.kind ?? null })}
              variant="soft"
            >
              {t('toMyPages')}
            </ButtonLink>
          )}
        </div>
      </header>
      <main id="content" tabIndex={-1}>
        {children}
      </main>
    </div>
  );
}

export function PublicLayout() {
  return (
    <PublicFrame>
      <Outlet />
    </PublicFrame>
  );
}
