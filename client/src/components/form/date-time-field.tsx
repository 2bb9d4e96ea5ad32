import { useState } from 'react';
import { useController, type FieldValues } from 'react-hook-form';
import { fromLocalInput, toLocalInput, zoneName } from '../../lib/format.ts';
import { FieldFrame, type FieldWords } from './field-frame.tsx';
import type { Bound } from './fields.tsx';
import styles from './form.module.css';

/** A moment in the zone of the site, the zone named beside it. The form's value is an ISO instant, or null. */
export function DateTimeField<Input extends FieldValues, Output>(
  props: Bound<Input, Output> & FieldWords & { timeZone: string; disabled?: boolean },
) {
  const { control, name, label, hint, optional, timeZone, disabled = false } = props;
  const { field, fieldState } = useController({ control, name });
  const instant = typeof field.value === 'string' && field.value !== '' ? (field.value as string) : null;
  const typed = useTypedMoment(instant, timeZone);
  const zone = instant === null ? zoneName(timeZone) : zoneName(timeZone, instant);
  return (
    <FieldFrame
      name={name}
      label={label}
      hint={hint}
      optional={optional ?? false}
      error={fieldState.error?.message}
    >
      {(wiring) => (
        <span className={styles.withZone}>
          <input
            {...wiring}
            ref={field.ref}
            name={field.name}
            type="datetime-local"
            step={60}
            className={styles.control}
            disabled={disabled}
            value={typed.text}
            onBlur={field.onBlur}
            onChange={(event) => {
              typed.type(event.target.value);
              field.onChange(fromLocalInput(event.target.value, timeZone));
            }}
          />
          <span className={styles.zone}>{zone}</span>
        </span>
      )}
    </FieldFrame>
  );
}

/**
 * Keeps what is in the input while it means the form's value: a year half typed (0002) has an instant that would be
 * written back differently, and the input would jump under the fingers.
 */
function useTypedMoment(instant: string | null, timeZone: string) {
  const [text, type] = useState(() => (instant === null ? '' : toLocalInput(instant, timeZone)));
  const isSame =
    fromLocalInput(text, timeZone) === (instant === null ? null : new Date(instant).toISOString());
  return { text: isSame ? text : instant === null ? '' : toLocalInput(instant, timeZone), type };
}
