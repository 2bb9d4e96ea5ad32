import { termsSchema } from '@kerfyard/common/scopes';
import { memo } from 'react';
import { useFormContext } from 'react-hook-form';
import { useTranslation } from 'react-i18next';
import { DateField } from '../../../../components/form/date-field.tsx';
import { SelectField, TextField } from '../../../../components/form/fields.tsx';
import { NumberField } from '../../../../components/form/number-fields.tsx';
import type { ScopeFormValues } from '../../scope-form-values.ts';
import styles from './scope-form.module.css';

/** The commercial terms each bid answers to. */
export const TermFields = memo(function TermFields() {
  const { t } = useTranslation(['scopes', 'scope']);
  const { control } = useFormContext<ScopeFormValues>();
  return (
    <>
      <div className={styles.triple}>
        <SelectField
          control={control}
          name="terms.priceForm"
          label={t('scope:terms.priceForm')}
          options={termsSchema.shape.priceForm.options.map((value) => ({
            value,
            label: t(`scope:priceForms.${value}`),
          }))}
        />
        <SelectField
          control={control}
          name="terms.wages"
          label={t('scope:terms.wages')}
          options={termsSchema.shape.wages.options.map((value) => ({
            value,
            label: t(`scope:wages.${value}`),
          }))}
        />
        <NumberField
          control={control}
          name="terms.retainageBasisPoints"
          label={t('scope:terms.retainage')}
          unit="%"
          scale={100}
          hint={t('terms.retainageHint')}
        />
        <DateField control={control} name="terms.workFrom" label={t('terms.workFrom')} />
        <DateField control={control} name="terms.workTo" label={t('terms.workTo')} />
        <NumberField
          control={control}
          name="terms.standbyFreeMinutes"
          label={t('scope:terms.standbyFree')}
          unit="min"
        />
        <NumberField
          control={control}
          name="terms.answerDays"
          label={t('terms.answerDays')}
          hint={t('terms.answerDaysHint')}
          unit={t('terms.days')}
        />
        <NumberField
          control={control}
          name="terms.bidValidDays"
          label={t('scope:terms.bidValidDays')}
          unit={t('terms.days')}
        />
      </div>
      <TextField
        control={control}
        name="terms.notes"
        label={t('scope:terms.notes')}
        optional
        lines={3}
        maxLength={2000}
      />
    </>
  );
});
