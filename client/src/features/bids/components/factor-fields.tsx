import type { BidInput } from '@kerfyard/common/bids';
import { commonFactorsPct } from '@kerfyard/common/cutting';
import type { PriceFactor } from '@kerfyard/common/people';
import { Text } from '@radix-ui/themes';
import { useQuery } from '@tanstack/react-query';
import type { Control } from 'react-hook-form';
import { useTranslation } from 'react-i18next';
import { NumberField } from '../../../components/form/number-fields.tsx';
import { formatNumber } from '../../../lib/format.ts';
import { rateCardQuery } from '../../rate-card/api/rate-card.queries.ts';
import { bidFactors, type BidFactor, type BidFormValues } from '../bid-form-values.ts';
import styles from './bids.module.css';

/** What multiplies every line; beside each the crew's own figure, or else common practice. */
export function FactorFields({ control }: { control: Control<BidFormValues, unknown, BidInput> }) {
  const { t } = useTranslation('bid');
  const { data } = useQuery(rateCardQuery);
  const hintOf = (name: PriceFactor) => {
    const own = data?.card?.factors[name] ?? null;
    const factor = formatNumber((own ?? commonFactorsPct.rows[name]) / 100, 2);
    return t(own === null ? 'factors.common' : 'factors.own', { factor });
  };
  const labelOf = (name: BidFactor) => t(`factors.${name}`);
  return (
    <fieldset className={styles.plain}>
      <Text asChild weight="medium">
        <legend>{t('factors.title')}</legend>
      </Text>
      <div className={styles.pair}>
        {bidFactors.map((name) => (
          <NumberField
            key={name}
            control={control}
            name={`factors.${name}`}
            label={labelOf(name)}
            {...(name === 'other' ? {} : { hint: hintOf(name) })}
            scale={100}
            unit="×"
            optional
          />
        ))}
      </div>
    </fieldset>
  );
}
