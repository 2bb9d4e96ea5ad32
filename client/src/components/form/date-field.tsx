import { useController, type FieldValues } from 'react-hook-form';
import { FieldFrame, type FieldWords } from './field-frame.tsx';
import type { Bound } from './fields.tsx';
import styles from './form.module.css';

/** A day without a time, by the browser's own calendar. The form's value is `YYYY-MM-DD`, or '' when empty. */
export function DateField<Input extends FieldValues, Output>(
  props: Bound<Input, Output> & FieldWords & { min?: string; disabled?: boolean },
) {
  const { control, name, label, hint, optional, min, disabled = false } = props;
  const { field, fieldState } = useController({ control, name });
  return (
    <FieldFrame
      name={name}
      label={label}
      hint={hint}
      optional={optional ?? false}
      error={fieldState.error?.message}
    >
      {(wiring) => (
        <input
          {...wiring}
          {...field}
          type="date"
          min={min}
          disabled={disabled}
          className={styles.control}
          value={(field.value as string | null) ?? ''}
        />
      )}
    </FieldFrame>
  );
}
