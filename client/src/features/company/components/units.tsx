import { unitNameSchema } from '@kerfyard/common/people';
import { Button, Heading, Text } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { TextField } from '../../../components/form/fields.tsx';
import { Form } from '../../../components/form/form.tsx';
import { useAppForm } from '../../../lib/app-form.ts';
import { newId } from '../../../lib/ids.ts';
import { useAddUnit } from '../api/company.queries.ts';
import styles from './company.module.css';

interface UnitsProps {
  kind: 'crews' | 'trucks';
  units: readonly { id: string; name: string }[];
  canEdit: boolean;
}

/** The crews or trucks a visit books; none of them can be in two places. */
export function Units({ kind, units, canEdit }: UnitsProps) {
  const { t } = useTranslation('company');
  const add = useAddUnit(kind);
  const form = useAppForm({ schema: unitNameSchema, defaultValues: { id: newId(), name: '' } });
  return (
    <section className="k-panel" aria-labelledby={kind}>
      <Heading as="h2" size="4" weight="medium" mb="1" id={kind}>
        {t(`${kind}.title`)}
      </Heading>
      <Text as="p" size="2" color="gray" mb="3">
        {t(`${kind}.text`)}
      </Text>
      {units.length > 0 && (
        <ul className={styles.units}>
          {units.map((unit) => (
            <li key={unit.id}>{unit.name}</li>
          ))}
        </ul>
      )}
      {canEdit && (
        <Form
          form={form}
          label={t(`${kind}.add`)}
          onSubmit={async (unit) => {
            await add.mutateAsync(unit);
            form.reset({ id: newId(), name: '' });
          }}
        >
          <div className={styles.addRow}>
            <TextField control={form.control} name="name" label={t(`${kind}.name`)} />
            <Button type="submit" size="3" variant="soft" loading={form.formState.isSubmitting}>
              {t(`${kind}.add`)}
            </Button>
          </div>
        </Form>
      )}
    </section>
  );
}
