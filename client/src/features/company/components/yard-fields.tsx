import type { EditCompany, OwnCompanyView } from '@kerfyard/common/people';
import { Button, Text } from '@radix-ui/themes';
import { useQueryClient } from '@tanstack/react-query';
import { useId, useState } from 'react';
import { useController, type UseFormReturn } from 'react-hook-form';
import { useTranslation } from 'react-i18next';
import { FieldNotes, wiringFor } from '../../../components/form/field-frame.tsx';
import formStyles from '../../../components/form/form.module.css';
import { useLabelInSummary } from '../../../components/form/form-labels.ts';
import { NumberField } from '../../../components/form/number-fields.tsx';
import { isApiError } from '../../../lib/api-error.ts';
import { placeQuery } from '../api/company.queries.ts';
import styles from './company.module.css';

type CompanyFormState = UseFormReturn<EditCompany, unknown, EditCompany>;

/** Where the trucks start: a ZIP code gives the middle of its area, and the position may be moved by hand. */
export function YardFields({ form, known }: { form: CompanyFormState; known: OwnCompanyView['yard'] }) {
  const { t } = useTranslation('company');
  const id = useId();
  const zip = useYardZip(form, known);
  const [byHand, setByHand] = useState(false);
  useLabelInSummary('yard', t('fields.yardZip'));
  useLabelInSummary('yard.zip', t('fields.yardZip'));
  return (
    <div className={styles.pair}>
      <div className={formStyles.field}>
        <label className={formStyles.label} htmlFor={id}>
          {t('fields.yardZip')} <span className={formStyles.optional}>{t('shell:form.optional')}</span>
        </label>
        <input
          {...wiringFor(id, { hint: true, error: zip.problem, optional: true })}
          ref={zip.ref}
          className={formStyles.control}
          inputMode="numeric"
          autoComplete="postal-code"
          maxLength={5}
          value={zip.text}
          onChange={(event) => void zip.type(event.target.value)}
        />
        <FieldNotes id={id} error={zip.problem} hint={zip.place ?? t('fields.yardHint')} />
      </div>
      {zip.hasPosition && (
        <div className={styles.position}>
          {byHand ? (
            <div className={styles.pair}>
              <NumberField control={form.control} name="yard.lat" label={t('fields.lat')} unit="°" />
              <NumberField control={form.control} name="yard.lon" label={t('fields.lon')} unit="°" />
            </div>
          ) : (
            <>
              <Text as="p" size="2" color="gray">
                {t('fields.positionNote')}
              </Text>
              <Button type="button" variant="soft" color="gray" onClick={() => setByHand(true)}>
                {t('fields.movePosition')}
              </Button>
            </>
          )}
        </div>
      )}
    </div>
  );
}

/** The typed ZIP code, looked up when it is whole; the form's `yard` follows the answer. */
function useYardZip(form: CompanyFormState, known: OwnCompanyView['yard']) {
  const { t } = useTranslation('company');
  const client = useQueryClient();
  const { field, fieldState } = useController({ control: form.control, name: 'yard' });
  const [text, setText] = useState(field.value?.zip ?? '');
  const [place, setPlace] = useState(known === null ? undefined : `${known.city}, ${known.state}`);
  const [failure, setFailure] = useState<string>();

  const type = async (typed: string) => {
    const zip = typed.replace(/\D/g, '').slice(0, 5);
    setText(zip);
    setFailure(undefined);
    setPlace(undefined);
    // Half a code is kept as one the schema refuses, so that saving says so; none means no yard.
    field.onChange(zip === '' ? null : { zip, lat: 0, lon: 0 });
    if (zip.length < 5) return;
    try {
      const found = await client.fetchQuery(placeQuery(zip));
      field.onChange({ zip: found.zip, lat: found.lat, lon: found.lon });
      setPlace(`${found.city}, ${found.state}`);
    } catch (error) {
      setFailure(isApiError(error, 'not_found') ? t('fields.zipUnknown') : t('fields.zipFailed'));
      field.onChange({ zip: '', lat: 0, lon: 0 });
    }
  };
  const fieldProblem = fieldState.error as { message?: string; zip?: { message?: string } } | undefined;
  return {
    text,
    type,
    place,
    ref: field.ref,
    problem: failure ?? fieldProblem?.zip?.message ?? fieldProblem?.message,
    hasPosition: place !== undefined,
  };
}
