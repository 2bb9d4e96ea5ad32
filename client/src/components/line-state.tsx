import { useTranslation } from 'react-i18next';
import type { LineState } from '../lib/socket.ts';
import styles from './line-state.module.css';

/** The state of the live line: a shape and a word, at every width. */
export function LineStateMark({ state }: { state: LineState }) {
  const { t } = useTranslation();
  return (
    <span className={styles.line} data-line={state} role="status">
      <svg width="14" height="14" viewBox="0 0 14 14" aria-hidden="true" focusable="false">
        {state === 'live' && <circle cx="7" cy="7" r="5" className={styles.live} />}
        {(state === 'connecting' || state === 'reconnecting') && (
          <>
            <circle cx="7" cy="7" r="4.5" className={styles.ring} />
            <path d="M7 2.5a4.5 4.5 0 0 1 0 9z" className={styles.half} />
          </>
        )}
        {state === 'off' && <path d="M3 3l8 8M11 3l-8 8" className={styles.cross} />}
      </svg>
      {t(`line.${state}`)}
    </span>
  );
}
