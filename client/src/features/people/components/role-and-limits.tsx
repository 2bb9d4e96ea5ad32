import { roles, type CompanyKind, type Role } from '@kerfyard/common/people';
import { useWatch, type Control, type FieldPath, type FieldValues } from 'react-hook-form';
import { useTranslation } from 'react-i18next';
import { RadioField } from '../../../components/form/choice-fields.tsx';
import { MoneyField } from '../../../components/form/number-fields.tsx';
import { limitsFor } from '../limits-for.ts';
import styles from './people.module.css';

/** What a person may do, and up to how many dollars. The form has `role` and `limits`. */
export function RoleAndLimits<Input extends FieldValues, Output>({
  control,
  kind,
}: {
  control: Control<Input, unknown, Output>;
  kind: CompanyKind;
}) {
  const { t } = useTranslation('people');
  const roleField = 'role' as FieldPath<Input>;
  const shown = limitsFor(kind, useWatch({ control, name: roleField }) as Role);
  return (
    <>
      <RadioField
        control={control}
        name={roleField}
        label={t('fields.role')}
        options={roles.map((one) => ({
          value: one,
          label: t(`role.${one}`),
          note: t(`roleNote.${kind}.${one}`),
        }))}
      />
      {shown.length > 0 && (
        <div className={styles.limits}>
          {shown.map((limit) => (
            <MoneyField
              key={limit}
              control={control}
              name={`limits.${limit}` as FieldPath<Input>}
              label={t(`fields.${limit}`)}
              hint={t('fields.limitHint')}
              optional
            />
          ))}
        </div>
      )}
    </>
  );
}
