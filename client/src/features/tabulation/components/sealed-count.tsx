import { Heading, Text } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { DueTime } from '../../../components/countdown.tsx';
import styles from './tabulation.module.css';

interface SealedCountProps {
  count: number;
  dueAt: string;
  timeZone: string;
  onDue: () => void;
}

/** Before due of sealed bids: how many, and when they open. There is nothing else to show, to anyone. */
export function SealedCount({ count, dueAt, timeZone, onDue }: SealedCountProps) {
  const { t } = useTranslation('tabulation');
  return (
    <section className={`k-panel ${styles.sealed}`}>
      <svg viewBox="0 0 120 76" className={styles.envelope} aria-hidden="true" focusable="false">
        <rect x="2" y="2" width="116" height="72" rx="3" />
        <path d="M2 5 60 46 118 5" />
        <path d="M54 41.800 60 46l6-4.200" className={styles.seal} />
      </svg>
      <Heading as="h2" size="6" weight="medium">
        {count === 0 ? t('sealed.none') : t('sealed.count', { count })}
      </Heading>
      <div>
        <Text as="div" size="2" color="gray">
          {t('sealed.opens')}
        </Text>
        <DueTime at={dueAt} timeZone={timeZone} onPassed={onDue} />
      </div>
      <Text as="p" color="gray">
        {t('sealed.meaning')}
      </Text>
    </section>
  );
}
