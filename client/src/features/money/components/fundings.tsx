import type { FundingStatus, FundingView } from '@kerfyard/common/payments';
import { Button, Heading, Text } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { MoneyText } from '../../../components/money-text.tsx';
import { StatusWord, type StatusTone } from '../../../components/status-word.tsx';
import { formatDateTime } from '../../../lib/format.ts';
import styles from './money.module.css';

const tones: Record<FundingStatus, StatusTone> = {
  requested: 'waiting',
  awaiting_payment: 'waiting',
  processing: 'waiting',
  succeeded: 'good',
  failed: 'bad',
  expired: 'closed',
};

/** Money on its way in, newest first, with the way to the payment page while it waits. */
export function Fundings({ fundings, timeZone }: { fundings: readonly FundingView[]; timeZone: string }) {
  const { t } = useTranslation('money');
  return (
    <section className={styles.section} aria-labelledby="fundings">
      <Heading as="h2" size="5" weight="medium" id="fundings">
        {t('fundings.title')}
      </Heading>
      {fundings.length === 0 && <Text color="gray">{t('fundings.empty')}</Text>}
      {[...fundings].reverse().map((funding) => (
        <article key={funding.id} className={styles.item}>
          <div className={styles.itemHead}>
            <StatusWord tone={tones[funding.status]}>{t(`fundings.status.${funding.status}`)}</StatusWord>
            <MoneyText cents={funding.amountCents} weight="strong" />
          </div>
          <Text size="2" color="gray">
            {formatDateTime(funding.settledAt ?? funding.createdAt, timeZone)}
          </Text>
          {funding.status === 'requested' && (
            <Text size="2" role="status">
              {t('setAside.preparing')}
            </Text>
          )}
          {funding.status === 'awaiting_payment' && funding.checkoutUrl !== null && (
            <div>
              <Button asChild size="3">
                <a href={funding.checkoutUrl}>{t('setAside.goOn')}</a>
              </Button>
            </div>
          )}
        </article>
      ))}
    </section>
  );
}
