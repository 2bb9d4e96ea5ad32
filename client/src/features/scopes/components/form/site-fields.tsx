import { Button, Text } from '@radix-ui/themes';
import { useQueryClient } from '@tanstack/react-query';
import { memo, useId, useState } from 'react';
import { useController, useFormContext, useWatch, type UseFormReturn } from 'react-hook-form';
import { useTranslation } from 'react-i18next';
import { FieldNotes, wiringFor } from '../../../../components/form/field-frame.tsx';
import { TextField } from '../../../../components/form/fields.tsx';
import formStyles from '../../../../components/form/form.module.css';
import { useLabelInSummary } from '../../../../components/form/form-labels.ts';
import { NumberField } from '../../../../components/form/number-fields.tsx';
import { isApiError } from '../../../../lib/api-error.ts';
import { formatNumber, fromLocalInput, toLocalInput } from '../../../../lib/format.ts';
import { placeQuery, timeZoneAt } from '../../../company/api/company.queries.ts';
import type { ScopeFormValues } from '../../scope-form-values.ts';
import styles from './scope-form.module.css';

/** Where it is: the ZIP code gives city, state, position and zone; the position may be moved by hand. */
export const SiteFields = memo(function SiteFields() {
  const { t } = useTranslation('scopes');
  const { control } = useFormContext<ScopeFormValues>();
  return (
    <>
      <div className={styles.pair}>
        <TextField control={control} name="site.name" label={t('site.name')} maxLength={120} />
        <TextField
          control={control}
          name="site.address"
          label={t('site.address')}
          autoComplete="off"
          maxLength={200}
        />
      </div>
      <div className={styles.place}>
        <ZipField />
        <TextField control={control} name="site.city" label={t('site.city')} maxLength={80} />
        <TextField control={control} name="site.state" label={t('site.state')} maxLength={2} />
      </div>
      <Position />
      <TextField
        control={control}
        name="site.contact"
        label={t('site.contact')}
        hint={t('site.contactHint')}
        optional
        maxLength={120}
      />
    </>
  );
});

function ZipField() {
  const { t } = useTranslation('scopes');
  const form = useFormContext<ScopeFormValues>();
  const { field, fieldState } = useController({ control: form.control, name: 'site.zip' });
  const client = useQueryClient();
  const [failure, setFailure] = useState<string>();
  const id = useId();
  useLabelInSummary('site.zip', t('site.zip'));
  const type = async (typed: string) => {
    const zip = typed.replace(/\D/g, '').slice(0, 5);
    field.onChange(zip);
    setFailure(undefined);
    if (zip.length < 5) return;
    try {
      const place = await client.fetchQuery(placeQuery(zip));
      if (form.getValues('site.zip') !== zip) return;
      form.setValue('site.city', place.city);
      form.setValue('site.state', place.state);
      form.setValue('site.lat', place.lat);
      form.setValue('site.lon', place.lon);
      changeZone(form, place.timeZone);
    } catch (error) {
      setFailure(isApiError(error, 'not_found') ? t('site.zipUnknown') : t('site.zipFailed'));
    }
  };
  const problem = failure ?? fieldState.error?.message;
  return (
    <div className={formStyles.field}>
      <label className={formStyles.label} htmlFor={id}>
        {t('site.zip')}
      </label>
      <input
        {...wiringFor(id, { hint: true, error: problem, optional: false })}
        ref={field.ref}
        name="site.zip"
        className={formStyles.control}
        inputMode="numeric"
        autoComplete="postal-code"
        maxLength={5}
        value={field.value}
        onBlur={field.onBlur}
        onChange={(event) => void type(event.target.value)}
      />
      <FieldNotes id={id} error={problem} hint={t('site.zipHint')} />
    </div>
  );
}

/** In another zone the due time keeps its hour on the wall: "2:00 PM there" is what was meant. */
function changeZone(form: UseFormReturn<ScopeFormValues>, timeZone: string): void {
  const before = form.getValues('site.timeZone');
  const dueAt = form.getValues('bidding.dueAt');
  form.setValue('site.timeZone', timeZone);
  if (before === '' || before === timeZone || dueAt === null) return;
  form.setValue('bidding.dueAt', fromLocalInput(toLocalInput(dueAt, before), timeZone));
}

function Position() {
  const { t } = useTranslation('scopes');
  const form = useFormContext<ScopeFormValues>();
  const [byHand, setByHand] = useState(false);
  const { lat, lon, timeZone } = useWatch({ control: form.control, name: 'site' });
  const known = typeof lat === 'number' && typeof lon === 'number';
  const findZone = async () => {
    const position = form.getValues('site');
    if (typeof position.lat !== 'number' || typeof position.lon !== 'number') return;
    const found = await timeZoneAt({ lat: position.lat, lon: position.lon }).catch(() => null);
    if (found !== null) changeZone(form, found.timeZone);
  };
  if (byHand) {
    return (
      <div className={styles.place} onBlur={() => void findZone()}>
        <NumberField control={form.control} name="site.lat" label={t('site.lat')} unit="°" />
        <NumberField control={form.control} name="site.lon" label={t('site.lon')} unit="°" />
        <Text size="2" color="gray" className={styles.zone}>
          {timeZone === '' ? t('site.zoneUnknown') : t('site.zone', { zone: timeZone })}
        </Text>
      </div>
    );
  }
  return (
    <div className={styles.position}>
      <Text size="2" color="gray">
        {known
          ? t('site.position', { lat: formatNumber(lat, 4), lon: formatNumber(lon, 4), zone: timeZone })
          : t('site.positionUnknown')}
      </Text>
      <Button type="button" variant="soft" color="gray" onClick={() => setByHand(true)}>
        {t('site.move')}
      </Button>
    </div>
  );
}
