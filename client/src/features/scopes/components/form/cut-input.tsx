import { memo, useId, useState, type ReactNode } from 'react';
import { readNumber } from '../../../../components/form/number-fields.tsx';
import { FieldNotes, wiringFor } from '../../../../components/form/field-frame.tsx';
import formStyles from '../../../../components/form/form.module.css';
import styles from './cut-list.module.css';

interface CutInputProps {
  /** The path that a complaint names: `cuts.2.cut.depthIn`. */
  name: string;
  /** Its column, for the arrow keys. */
  column: string;
  label: string;
  unit?: string;
  value: unknown;
  error: string | undefined;
  optional?: boolean;
  hint?: ReactNode;
  onChange: (column: string, value: number | string | null) => void;
}

/** One figure of a cut with its unit beside it. What is half typed ("12.") stays as it is typed. */
export const CutInput = memo(function CutInput(props: CutInputProps) {
  const { name, column, label, unit, value, error, optional = false, hint, onChange } = props;
  const id = useId();
  const [text, setText] = useState(() => shown(value));
  const current = Object.is(readNumber(text), value ?? null) ? text : shown(value);
  return (
    <span className={styles.field}>
      <label htmlFor={id} className={styles.label}>
        {label}
      </label>
      <span className={formStyles.withUnit} style={{ ['--unit-room' as string]: `${(unit ?? '').length}ch` }}>
        <input
          {...wiringFor(id, { hint, error, optional })}
          name={name}
          data-column={column}
          className={formStyles.control}
          inputMode="decimal"
          autoComplete="off"
          maxLength={12}
          value={current}
          onChange={(event) => {
            setText(event.target.value);
            onChange(column, readNumber(event.target.value));
          }}
        />
        {unit !== undefined && unit !== '' && <span className={formStyles.unit}>{unit}</span>}
      </span>
      <FieldNotes id={id} hint={hint} error={error} />
    </span>
  );
});

function shown(value: unknown): string {
  return typeof value === 'number' ? String(value) : typeof value === 'string' ? value : '';
}
