import { useEffect, useState } from 'react';
import { useTranslation } from 'react-i18next';
import { nowMs } from '../lib/clock.ts';
import { formatDateTime, splitDuration } from '../lib/format.ts';
import styles from './countdown.module.css';

interface DueTimeProps {
  /** ISO instant. */
  at: string;
  /** The site's zone, IANA. */
  timeZone: string;
  /** Called once when the moment passes while the page is open. */
  onPassed?: () => void;
}

/** A due time: the moment with its zone first, how long that is second. The server's clock decides, not this one. */
export function DueTime({ at, timeZone, onPassed }: DueTimeProps) {
  const left = useTimeLeft(at, onPassed);
  const words = useTimeLeftWords();
  const soon = left > 0 && left < 15 * 60_000;
  return (
    <span className={styles.due}>
      <time dateTime={at}>{formatDateTime(at, timeZone)}</time>
      <span className={soon ? styles.soon : styles.left}>{words(left)}</span>
    </span>
  );
}

/** Milliseconds until an instant, ticking every second in the last hour and every half minute before. */
export function useTimeLeft(at: string, onPassed?: () => void): number {
  const [left, setLeft] = useState(() => Date.parse(at) - nowMs());
  useEffect(() => {
    let timer: ReturnType<typeof setTimeout> | undefined;
    let before = Date.parse(at) - nowMs();
    const tick = () => {
      const now = Date.parse(at) - nowMs();
      setLeft(now);
      if (before > 0 && now <= 0) onPassed?.();
      before = now;
      if (now > 0) timer = setTimeout(tick, now < 3_600_000 ? 1 + (now % 1000) : 30_000);
    };
    tick();
    return () => clearTimeout(timer);
  }, [at, onPassed]);
  return left;
}

/** "in 2 days 4 h", "in 9 min 30 s", "passed". */
export function useTimeLeftWords(): (left: number) => string {
  const { t } = useTranslation();
  return (left) => {
    if (left <= 0) return t('time.passed');
    const { days, hours, minutes, seconds } = splitDuration(left);
    if (days > 0) return t('time.inDays', { count: days, hours });
    if (hours > 0) return t('time.inHours', { hours, minutes });
    if (minutes >= 15) return t('time.inMinutes', { minutes });
    return t('time.inSeconds', { minutes, seconds: String(seconds).padStart(2, '0') });
  };
}
