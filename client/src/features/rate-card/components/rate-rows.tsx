import { MAX_RATES, methods, rateUnits, type RateCard } from '@kerfyard/common/people';
import { cutKinds } from '@kerfyard/common/scopes';
import { Button, Text } from '@radix-ui/themes';
import { memo } from 'react';
import { useFieldArray, type Control } from 'react-hook-form';
import { useTranslation } from 'react-i18next';
import { SelectField } from '../../../components/form/fields.tsx';
import { NumberField, RateField } from '../../../components/form/number-fields.tsx';
import { nextRate, type RateCardValues } from '../rate-card-form-values.ts';
import styles from './rate-card.module.css';

export type RateCardControl = Control<RateCardValues, unknown, RateCard>;

/** The rates one under the other, each with its method, kind, unit and band. */
export function RateRows({ control, canEdit }: { control: RateCardControl; canEdit: boolean }) {
  const { t } = useTranslation('rate-card');
  const { fields, append, remove } = useFieldArray({ control, name: 'rates' });
  return (
    <>
      {fields.length === 0 ? (
        <Text as="p" color="gray">
          {t('rates.empty')}
        </Text>
      ) : (
        <ol className={styles.rates} aria-label={t('rates.title')}>
          {fields.map((field, index) => (
            <RateRowFields
              key={field.id}
              control={control}
              index={index}
              onRemove={canEdit ? () => remove(index) : null}
            />
          ))}
        </ol>
      )}
      {canEdit && (
        <div className={styles.row}>
          <Button
            type="button"
            variant="soft"
            size="3"
            disabled={fields.length >= MAX_RATES}
            onClick={() => append(nextRate(fields.at(-1)))}
          >
            {t('rates.add')}
          </Button>
        </div>
      )}
    </>
  );
}

const RateRowFields = memo(function RateRowFields(props: {
  control: RateCardControl;
  index: number;
  onRemove: (() => void) | null;
}) {
  const { control, index, onRemove } = props;
  const { t } = useTranslation('rate-card');
  return (
    <li className={styles.rate} aria-label={t('rates.row', { number: index + 1 })}>
      <SelectField
        control={control}
        name={`rates.${index}.method`}
        label={t('rates.method')}
        options={methods.map((value) => ({ value, label: t(`methods.${value}`) }))}
      />
      <SelectField
        control={control}
        name={`rates.${index}.kind`}
        label={t('rates.kind')}
        placeholder={t('rates.everyKind')}
        options={cutKinds.map((value) => ({ value, label: t(`kinds.${value}`) }))}
      />
      <SelectField
        control={control}
        name={`rates.${index}.unit`}
        label={t('rates.unit')}
        options={rateUnits.map((value) => ({ value, label: t(`units.${value}`) }))}
      />
      <NumberField
        control={control}
        name={`rates.${index}.upToIn`}
        label={t('rates.upToIn')}
        unit="in"
        optional
      />
      <RateField control={control} name={`rates.${index}.rate`} label={t('rates.rate')} />
      {onRemove !== null && (
        <Button
          type="button"
          className={styles.remove}
          variant="soft"
          color="gray"
          size="3"
          aria-label={t('rates.remove', { number: index + 1 })}
          onClick={onRemove}
        >
          {t('rates.removeShort')}
        </Button>
      )}
    </li>
  );
});
