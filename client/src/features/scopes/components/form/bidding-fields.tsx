import { memo } from 'react';
import { useFormContext, useWatch } from 'react-hook-form';
import { useTranslation } from 'react-i18next';
import { RadioField } from '../../../../components/form/choice-fields.tsx';
import { DateTimeField } from '../../../../components/form/date-time-field.tsx';
import type { ScopeFormValues } from '../../scope-form-values.ts';
import styles from './scope-form.module.css';

/** How bids come in, in plain words, and until when, in the zone of the site. */
export const BiddingFields = memo(function BiddingFields() {
  const { t } = useTranslation(['scopes', 'scope']);
  const { control } = useFormContext<ScopeFormValues>();
  const timeZone = useWatch({ control, name: 'site.timeZone' });
  return (
    <>
      <RadioField
        control={control}
        name="bidding.mode"
        label={t('bidding.mode')}
        look="cards"
        options={(['sealed', 'ranked'] as const).map((value) => ({
          value,
          label: t(`scope:mode.${value}`),
          note: t(`bidding.${value}`),
        }))}
      />
      <div className={styles.due}>
        <DateTimeField
          control={control}
          name="bidding.dueAt"
          label={t('bidding.dueAt')}
          hint={timeZone === '' ? t('bidding.needsZip') : t('bidding.inZone', { zone: timeZone })}
          timeZone={timeZone === '' ? 'UTC' : timeZone}
          disabled={timeZone === ''}
        />
      </div>
    </>
  );
});
