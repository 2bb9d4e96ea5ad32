import { Suspense } from 'react';
import { useTranslation } from 'react-i18next';
import { Outlet, ScrollRestoration, useNavigation } from 'react-router-dom';
import { OfflineBanner } from '../../components/offline-banner.tsx';
import { ConfirmYou } from '../../features/session/components/confirm-you.tsx';
import { SignInAgain } from '../../features/session/components/sign-in-again.tsx';
import { FirstPaint } from '../first-paint.tsx';
import styles from './root-layout.module.css';

/** Around every page: the skip link, what is said about the line, the question to sign in again. */
export function RootLayout() {
  const { t } = useTranslation();
  const busy = useNavigation().state !== 'idle';
  return (
    <>
      <a className={styles.skip} href="#content">
        {t('skip')}
      </a>
      {busy && <div className={styles.busy} role="progressbar" aria-label={t('loadingPage')} />}
      <OfflineBanner />
      <Suspense fallback={<FirstPaint />}>
        <Outlet />
      </Suspense>
      <SignInAgain />
      <ConfirmYou />
      <ScrollRestoration />
    </>
  );
}
