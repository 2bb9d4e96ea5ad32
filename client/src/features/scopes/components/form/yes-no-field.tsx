import { useId, type ReactNode } from 'react';
import { useController, type Control, type FieldPath } from 'react-hook-form';
import { useTranslation } from 'react-i18next';
import { FieldNotes } from '../../../../components/form/field-frame.tsx';
import formStyles from '../../../../components/form/form.module.css';
import { useLabelInSummary } from '../../../../components/form/form-labels.ts';
import type { ScopeFormValues } from '../../scope-form-values.ts';
import styles from './scope-form.module.css';

interface YesNoFieldProps {
  control: Control<ScopeFormValues>;
  name: FieldPath<ScopeFormValues>;
  label: string;
  hint?: ReactNode;
  onChoose?: (value: boolean) => void;
}

/** Yes or no, neither chosen to begin with: a blank is not a no. */
export function YesNoField({ control, name, label, hint, onChoose }: YesNoFieldProps) {
  const { t } = useTranslation('scope');
  const { field, fieldState } = useController({ control, name });
  const id = useId();
  useLabelInSummary(name, label);
  const choose = (value: boolean) => {
    field.onChange(value);
    onChoose?.(value);
  };
  return (
    <fieldset className={formStyles.choices} role="radiogroup" aria-describedby={`${id}-error ${id}-hint`}>
      <legend className={formStyles.label}>{label}</legend>
      <div className={styles.yesNo}>
        {[true, false].map((value) => (
          <label key={String(value)} className={formStyles.choice}>
            <input
              type="radio"
              name={name}
              ref={value ? field.ref : undefined}
              checked={field.value === value}
              onBlur={field.onBlur}
              onChange={() => choose(value)}
            />
            <span>{t(value ? 'yes' : 'no')}</span>
          </label>
        ))}
      </div>
      <FieldNotes id={id} hint={hint} error={fieldState.error?.message} />
    </fieldset>
  );
}
