import type { PricedBid } from '@kerfyard/common/bids';
import { Text } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { MoneyText } from '../../../components/money-text.tsx';
import styles from './bids.module.css';

/** What the engine makes of the price: lines, mobilization, the minimum against the sum, the total. */
export function PriceSummary({ priced }: { priced: PricedBid }) {
  const { t } = useTranslation('bid');
  return (
    <>
      <dl className={styles.price}>
        {priced.lines.length > 0 && (
          <>
            <dt>{t('price.computed')}</dt>
            <dd>
              <MoneyText cents={priced.computedCents} />
            </dd>
          </>
        )}
        {priced.mobilizationCents > 0 && (
          <>
            <dt>{t('price.mobilization')}</dt>
            <dd>
              <MoneyText cents={priced.mobilizationCents} />
            </dd>
          </>
        )}
        {priced.minimumCents > 0 && (
          <>
            <dt>{t('price.minimum')}</dt>
            <dd>
              <MoneyText cents={priced.minimumCents} />
            </dd>
          </>
        )}
        <dt className={styles.total}>{t('price.total')}</dt>
        <dd className={styles.total}>
          <MoneyText cents={priced.totalCents} weight="strong" />
        </dd>
      </dl>
      {priced.minimumApplied && (
        <Text as="p" size="2">
          {t('price.minimumApplied')}
        </Text>
      )}
    </>
  );
}
