import { Text } from '@radix-ui/themes';
import type { ReactNode } from 'react';
import { useTranslation } from 'react-i18next';
import { Link, NavLink } from 'react-router-dom';
import styles from './app-shell.module.css';
import { Mark } from './mark.tsx';
import { NavPicture, type NavPictureName } from './nav-picture.tsx';

export interface NavItem {
  to: string;
  label: string;
  picture: NavPictureName;
  /** Things waiting there; nothing is shown at zero. */
  waiting?: number;
}

interface AppShellProps {
  home: string;
  items: readonly NavItem[];
  /** Right of the navigation: the state of the line, the account. */
  side: ReactNode;
  children: ReactNode;
}

/** The signed-in frame: a bar on top at the desk, a bar within thumb reach on a phone. */
export function AppShell({ home, items, side, children }: AppShellProps) {
  const { t } = useTranslation();
  return (
    <div className={styles.shell}>
      <header className={styles.top}>
        <div className={styles.inner}>
          <Link to={home} className={styles.brand} aria-label={t('brandHome')}>
            <Mark size={22} />
            <span className={styles.name}>Kerfyard</span>
          </Link>
          <nav className={styles.nav} aria-label={t('navigation')}>
            <ul>
              {items.map((item) => (
                <li key={item.to}>
                  <NavLink to={item.to} className={styles.item}>
                    <span className={styles.picture}>
                      <NavPicture name={item.picture} />
                    </span>
                    <span className={styles.label}>{item.label}</span>
                    <Waiting count={item.waiting ?? 0} />
                  </NavLink>
                </li>
              ))}
            </ul>
          </nav>
          <div className={styles.side}>{side}</div>
        </div>
      </header>
      <main id="content" tabIndex={-1} className={styles.main}>
        {children}
      </main>
    </div>
  );
}

function Waiting({ count }: { count: number }) {
  const { t } = useTranslation();
  if (count === 0) return null;
  return (
    <Text size="1" weight="medium" className={styles.waiting}>
      <span aria-hidden="true">{count > 99 ? '99+' : count}</span>
      <span className="k-hidden">{t('waiting', { count })}</span>
    </Text>
  );
}
