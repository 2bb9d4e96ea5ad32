import { Checkbox } from '@radix-ui/themes';
import { useId, type ReactNode } from 'react';
import { useController, type FieldValues } from 'react-hook-form';
import { useTranslation } from 'react-i18next';
import { FieldNotes, wiringFor, type FieldWords } from './field-frame.tsx';
import type { Bound, Option } from './fields.tsx';
import { useLabelInSummary } from './form-labels.ts';
import styles from './form.module.css';

/** One yes or no. */
export function CheckboxField<Input extends FieldValues, Output>(
  props: Bound<Input, Output> & { label: string; hint?: ReactNode; disabled?: boolean },
) {
  const { control, name, label, hint, disabled = false } = props;
  const { field, fieldState } = useController({ control, name });
  const id = useId();
  useLabelInSummary(name, label);
  const error = fieldState.error?.message;
  return (
    <div className={styles.field}>
      <label className={styles.choice}>
        <Checkbox
          {...wiringFor(id, { hint, error, optional: true })}
          ref={field.ref}
          checked={field.value === true}
          disabled={disabled}
          onBlur={field.onBlur}
          onCheckedChange={(checked) => field.onChange(checked === true)}
        />
        <span>{label}</span>
      </label>
      <FieldNotes id={id} hint={hint} error={error} />
    </div>
  );
}

interface GroupProps extends FieldWords {
  options: readonly Option[];
  /** `cards`: large, side by side, with notes; `rows`: one under the other. */
  look?: 'cards' | 'rows';
  disabled?: boolean;
}

/** One of a few, all of them seen at once. */
export function RadioField<Input extends FieldValues, Output>(props: Bound<Input, Output> & GroupProps) {
  const { control, name, look = 'rows', options, disabled = false, ...words } = props;
  const { field, fieldState } = useController({ control, name });
  return (
    <Group {...words} name={name} look={look} error={fieldState.error?.message} role="radiogroup">
      {options.map((option, index) => (
        <label key={option.value} className={look === 'cards' ? styles.card : styles.choice}>
          <input
            type="radio"
            name={name}
            value={option.value}
            ref={index === 0 ? field.ref : undefined}
            checked={field.value === option.value}
            disabled={disabled}
            onBlur={field.onBlur}
            onChange={() => field.onChange(option.value)}
          />
          <OptionWords option={option} />
        </label>
      ))}
    </Group>
  );
}

/** Any of a few; the form's value is the list of the chosen ones, in the order of the options. */
export function CheckboxGroupField<Input extends FieldValues, Output>(
  props: Bound<Input, Output> & GroupProps,
) {
  const { control, name, look = 'rows', options, disabled = false, ...words } = props;
  const { field, fieldState } = useController({ control, name });
  const chosen = (field.value as string[] | null) ?? [];
  const toggle = (value: string) => {
    const next = chosen.includes(value) ? chosen.filter((item) => item !== value) : [...chosen, value];
    field.onChange(options.map((option) => option.value).filter((item) => next.includes(item)));
  };
  return (
    <Group {...words} name={name} look={look} error={fieldState.error?.message} role="group">
      {options.map((option, index) => (
        <label key={option.value} className={look === 'cards' ? styles.card : styles.choice}>
          <input
            type="checkbox"
            name={name}
            value={option.value}
            ref={index === 0 ? field.ref : undefined}
            checked={chosen.includes(option.value)}
            disabled={disabled}
            onBlur={field.onBlur}
            onChange={() => toggle(option.value)}
          />
          <OptionWords option={option} />
        </label>
      ))}
    </Group>
  );
}

function OptionWords({ option }: { option: Option }) {
  return (
    <span>
      {option.label}
      {option.note !== undefined && (
        <span className={styles.hint} style={{ display: 'block' }}>
          {option.note}
        </span>
      )}
    </span>
  );
}

function Group(
  props: FieldWords & {
    name: string;
    look: 'cards' | 'rows';
    error: string | undefined;
    role: 'radiogroup' | 'group';
    children: ReactNode;
  },
) {
  const { t } = useTranslation();
  const id = useId();
  useLabelInSummary(props.name, props.label);
  const wiring = wiringFor(id, { hint: props.hint, error: props.error, optional: true });
  return (
    <fieldset className={styles.choices} role={props.role} aria-describedby={wiring['aria-describedby']}>
      <legend className={styles.label}>
        {props.label}
        {props.optional === true && <span className={styles.optional}> {t('form.optional')}</span>}
      </legend>
      <div className={props.look === 'cards' ? styles.cards : styles.rows}>{props.children}</div>
      <FieldNotes id={id} hint={props.hint} error={props.error} />
    </fieldset>
  );
}
