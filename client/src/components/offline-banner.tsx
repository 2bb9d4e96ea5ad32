import { useSyncExternalStore } from 'react';
import { useTranslation } from 'react-i18next';
import styles from './offline-banner.module.css';

function subscribe(listener: () => void): () => void {
  window.addEventListener('online', listener);
  window.addEventListener('offline', listener);
  return () => {
    window.removeEventListener('online', listener);
    window.removeEventListener('offline', listener);
  };
}

/** Says plainly that the device has no line, and that what is on the screen stays. */
export function OfflineBanner() {
  const { t } = useTranslation();
  const online = useSyncExternalStore(subscribe, () => navigator.onLine);
  return (
    <div role="status" className={online ? 'k-hidden' : styles.banner}>
      {online ? '' : t('offline')}
    </div>
  );
}
