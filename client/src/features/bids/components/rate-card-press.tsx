import type { BidInput } from '@kerfyard/common/bids';
import type { ScopeBody } from '@kerfyard/common/scopes';
import { Button, Text } from '@radix-ui/themes';
import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import type { UseFormReturn } from 'react-hook-form';
import { useTranslation } from 'react-i18next';
import { useAnnounce } from '../../../components/announcer.tsx';
import { TextLink } from '../../../components/link.tsx';
import { formatMoney } from '../../../lib/format.ts';
import { paths } from '../../../lib/paths.ts';
import { rateCardQuery } from '../../rate-card/api/rate-card.queries.ts';
import type { BidFormValues } from '../bid-form-values.ts';
import { fillFromCard } from '../from-rate-card.ts';
import styles from './bids.module.css';

interface RateCardPressProps {
  form: UseFormReturn<BidFormValues, unknown, BidInput>;
  body: ScopeBody;
}

/** One press fills the bid from the crew's own rate card; without a card, the way to one. */
export function RateCardPress({ form, body }: RateCardPressProps) {
  const { t } = useTranslation('bid');
  const announce = useAnnounce();
  const { data } = useQuery(rateCardQuery);
  const [said, setSaid] = useState<string | null>(null);
  const card = data?.card ?? null;
  if (data === undefined) return null;
  if (card === null || card.rates.length === 0) {
    return (
      <Text as="p" size="2" color="gray">
        {t('card.none')} <TextLink to={paths.rateCard}>{t('card.toCard')}</TextLink>
      </Text>
    );
  }
  const fill = () => {
    const filled = fillFromCard(form.getValues(), body, card);
    const marks = filled.unpriced.join(', ');
    for (const key of filledFields) form.setValue(key, filled.values[key], { shouldDirty: true });
    if (filled.isFilled) addStandby();
    const done = filled.isFilled ? t('card.filled') : t('card.notFilled');
    const text = marks === '' ? done : `${done} ${t('card.unpriced', { marks })}`;
    setSaid(text);
    announce(text);
  };
  const addStandby = () => {
    if (card.standbyHourCents === null || card.standbyHourCents === 0) return;
    const line = t('card.standby', {
      minutes: body.terms.standbyFreeMinutes,
      rate: formatMoney(card.standbyHourCents),
    });
    const exclusions = form.getValues('exclusions');
    if (exclusions.includes(line)) return;
    form.setValue('exclusions', exclusions.trim() === '' ? line : `${exclusions.trimEnd()}\n${line}`, {
      shouldDirty: true,
    });
  };
  return (
    <div className={styles.row}>
      <Button type="button" variant="soft" size="3" onClick={fill}>
        {t('card.press')}
      </Button>
      <TextLink to={paths.rateCard} size="2">
        {t('card.look')}
      </TextLink>
      {said !== null && <Text size="2">{said}</Text>}
    </div>
  );
}

const filledFields = [
  'lines',
  'factors',
  'lumpCents',
  'minimumCents',
  'mobilizationCents',
  'minimumIncludesMobilization',
] as const satisfies readonly (keyof BidFormValues)[];
