import { editCompanySchema, methods, type EditCompany, type OwnCompanyView } from '@kerfyard/common/people';
import { Button, Heading, Text } from '@radix-ui/themes';
import { useQueryClient } from '@tanstack/react-query';
import { useState } from 'react';
import { useTranslation } from 'react-i18next';
import { useAnnounce } from '../../../components/announcer.tsx';
import { CheckboxGroupField } from '../../../components/form/choice-fields.tsx';
import { TextField } from '../../../components/form/fields.tsx';
import { Form } from '../../../components/form/form.tsx';
import { NumberField } from '../../../components/form/number-fields.tsx';
import { useAppForm } from '../../../lib/app-form.ts';
import { useEditCompany } from '../api/company.queries.ts';
import styles from './company.module.css';
import { YardFields } from './yard-fields.tsx';

/** Name and phone of the company; for a crew also its yard, service radius and methods. */
export function CompanyForm({ company, canEdit }: { company: OwnCompanyView; canEdit: boolean }) {
  const { t } = useTranslation('company');
  const announce = useAnnounce();
  const client = useQueryClient();
  const edit = useEditCompany();
  const [saved, setSaved] = useState(false);
  const isCrew = company.kind === 'cutting_contractor';
  const form = useAppForm({ schema: editCompanySchema, defaultValues: valuesOf(company) });

  const save = async (values: EditCompany) => {
    setSaved(false);
    await edit.mutateAsync(values);
    form.reset(values);
    setSaved(true);
    announce(t('saved'));
    await client.invalidateQueries({ queryKey: ['session', 'me'] });
  };

  return (
    <section className="k-panel" aria-labelledby="company-form">
      <Heading as="h2" size="4" weight="medium" mb="4" id="company-form">
        {t('about')}
      </Heading>
      <Form form={form} onSubmit={save} label={t('about')}>
        <fieldset className={styles.plain} disabled={!canEdit}>
          <div className={styles.pair}>
            <TextField
              control={form.control}
              name="name"
              label={t('fields.name')}
              autoComplete="organization"
            />
            <TextField
              control={form.control}
              name="phone"
              label={t('fields.phone')}
              type="tel"
              inputMode="tel"
              autoComplete="tel"
            />
          </div>
          {isCrew && (
            <>
              <YardFields form={form} known={company.yard} />
              <NumberField
                control={form.control}
                name="serviceRadiusMi"
                label={t('fields.serviceRadius')}
                hint={t('fields.serviceRadiusHint')}
                unit="mi"
                optional
              />
              <CheckboxGroupField
                control={form.control}
                name="methods"
                label={t('fields.methods')}
                hint={t('fields.methodsHint')}
                options={methods.map((method) => ({ value: method, label: t(`methods.${method}`) }))}
              />
            </>
          )}
        </fieldset>
        {canEdit && (
          <div className={styles.buttons}>
            <Button type="submit" size="3" loading={form.formState.isSubmitting}>
              {t('save')}
            </Button>
            {saved && !form.formState.isDirty && (
              <Text size="2" color="gray">
                {t('saved')}
              </Text>
            )}
          </div>
        )}
      </Form>
    </section>
  );
}

function valuesOf(company: OwnCompanyView): EditCompany {
  return {
    name: company.name,
    phone: company.phone,
    yard: company.yard && { zip: company.yard.zip, lat: company.yard.lat, lon: company.yard.lon },
    serviceRadiusMi: company.serviceRadiusMi,
    methods: company.methods,
  };
}
