import type { HTMLInputAutoCompleteAttribute } from 'react';
import { useController, type Control, type FieldPath, type FieldValues } from 'react-hook-form';
import { FieldFrame, type FieldWords } from './field-frame.tsx';
import styles from './form.module.css';

/** Ties a field to its form: `control={form.control} name="yard.zip"`, the name checked against the form's values. */
export interface Bound<Input extends FieldValues, Output> {
  control: Control<Input, unknown, Output>;
  name: FieldPath<Input>;
}

interface TextFieldProps {
  type?: 'text' | 'email' | 'password' | 'tel' | 'search';
  autoComplete?: HTMLInputAutoCompleteAttribute;
  inputMode?: 'text' | 'numeric' | 'decimal' | 'email' | 'tel';
  placeholder?: string;
  maxLength?: number;
  disabled?: boolean;
  /** Several lines: how many show at first. */
  lines?: number;
}

/** One line of text, or several with `lines`. */
export function TextField<Input extends FieldValues, Output>(
  props: Bound<Input, Output> & FieldWords & TextFieldProps,
) {
  const { control, name, label, hint, optional, lines, type = 'text', ...rest } = props;
  const { field, fieldState } = useController({ control, name });
  return (
    <FieldFrame
      name={name}
      label={label}
      hint={hint}
      optional={optional ?? false}
      error={fieldState.error?.message}
    >
      {(wiring) => {
        const shared = {
          ...rest,
          ...field,
          value: (field.value as string | null) ?? '',
          className: styles.control,
        };
        return lines === undefined ? (
          <input {...shared} {...wiring} type={type} />
        ) : (
          <textarea {...shared} {...wiring} rows={lines} />
        );
      }}
    </FieldFrame>
  );
}

export interface Option<Value extends string = string> {
  value: Value;
  label: string;
  /** A second, quieter line (radio fields). */
  note?: string;
}

/** One of a list; the browser's own list, which is the best one on a phone. */
export function SelectField<Input extends FieldValues, Output>(
  props: Bound<Input, Output> &
    FieldWords & { options: readonly Option[]; placeholder?: string; disabled?: boolean },
) {
  const { control, name, label, hint, optional, options, placeholder, disabled } = props;
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
        <select
          {...field}
          {...wiring}
          disabled={disabled}
          value={(field.value as string | null) ?? ''}
          className={styles.control}
        >
          {placeholder !== undefined && <option value="">{placeholder}</option>}
          {options.map((option) => (
            <option key={option.value} value={option.value}>
              {option.label}
            </option>
          ))}
        </select>
      )}
    </FieldFrame>
  );
}
