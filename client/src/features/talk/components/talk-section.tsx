import { Heading, Text } from '@radix-ui/themes';
import { useId, type ReactNode } from 'react';
import { useTranslation } from 'react-i18next';
import styles from './talk.module.css';

/** The frame of talk beside the thing talked about. */
export function TalkSection({ title, children }: { title: string; children: ReactNode }) {
  const id = useId();
  return (
    <section className={`k-panel ${styles.section}`} aria-labelledby={id}>
      <Heading as="h2" size="4" weight="medium" id={id}>
        {title}
      </Heading>
      {children}
    </section>
  );
}

/** What may be said before bids are due. */
export function LogisticsNote() {
  const { t } = useTranslation('talk');
  return (
    <Text as="p" size="2" color="gray">
      {t('logisticsOnly')}
    </Text>
  );
}
