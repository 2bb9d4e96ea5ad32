import { useState } from 'react';
import { useController, type FieldValues } from 'react-hook-form';
import { FieldFrame, type FieldWords, type Wiring } from './field-frame.tsx';
import type { Bound } from './fields.tsx';
import styles from './form.module.css';

/** A typed number as the form keeps it: a number, null when empty, the text itself when it is no number. */
type Typed = number | string | null;

/** `1,234.5` → 1234.5; empty → null; anything else comes back as it is, for the schema to refuse. */
export function readNumber(text: string): Typed {
  const plain = text.replaceAll(',', '').trim();
  if (plain === '') return null;
  return /^-?(\d+\.?\d*|\.\d+)$/.test(plain) ? Number(plain) : text;
}

/** `1,234.5` dollars → 123450 cents, without ever holding dollars in a float. */
export function readCents(text: string): Typed {
  const plain = text.replace(/[$,\s]/g, '');
  if (plain === '') return null;
  const match = /^(\d*)(?:\.(\d{0,2}))?$/.exec(plain);
  if (match === null || plain === '.') return text;
  return Number(match[1] ?? 0) * 100 + Number((match[2] ?? '').padEnd(2, '0'));
}

function showNumber(value: unknown): string {
  return typeof value === 'number' ? String(value) : typeof value === 'string' ? value : '';
}

/** Whole cents as dollars for an input: 123450 → `1,234.50`. */
export function showCents(value: unknown): string {
  if (typeof value !== 'number') return showNumber(value);
  const cents = value % 100;
  const dollars = String((value - cents) / 100).replace(/\B(?=(\d{3})+$)/g, ',');
  return cents === 0 ? dollars : `${dollars}.${String(cents).padStart(2, '0')}`;
}

/** `0.0425` dollars → 425 hundredths of a cent, for rates that have parts of a cent. */
export function readRate(text: string): Typed {
  const plain = text.replace(/[$,\s]/g, '');
  if (plain === '') return null;
  const match = /^(\d*)(?:\.(\d{0,4}))?$/.exec(plain);
  if (match === null || plain === '.') return text;
  return Number(match[1] ?? 0) * 10_000 + Number((match[2] ?? '').padEnd(4, '0'));
}

/** Hundredths of a cent as dollars for an input: at least two decimals when there are any, parts of a cent as needed. */
export function showRate(value: unknown): string {
  if (typeof value !== 'number') return showNumber(value);
  const parts = String(value % 10_000).padStart(4, '0');
  const dollars = String(Math.floor(value / 10_000)).replace(/\B(?=(\d{3})+$)/g, ',');
  if (parts === '0000') return dollars;
  return `${dollars}.${parts.endsWith('00') ? parts.slice(0, 2) : parts.replace(/0$/, '')}`;
}

interface Reading {
  read: (text: string) => Typed;
  show: (value: unknown) => string;
}

/** Keeps the text as typed ("12." is half a number) while the form holds what it means. */
function useTypedText(value: unknown, change: (next: Typed) => void, { read, show }: Reading) {
  const [text, setText] = useState(() => show(value));
  // The form's value may change from outside (a reset, a prefill): the text follows only then.
  const shown = Object.is(read(text), value ?? null) ? text : show(value);
  return {
    text: shown,
    type: (next: string) => {
      setText(next);
      change(read(next));
    },
    settle: () => setText(show(value)),
  };
}

interface FigureInputProps {
  wiring: Wiring;
  before?: string;
  unit?: string;
  disabled: boolean;
  typed: ReturnType<typeof useTypedText>;
  field: { ref: (element: HTMLInputElement | null) => void; name: string; onBlur: () => void };
}

function FigureInput({ wiring, before, unit, disabled, typed, field }: FigureInputProps) {
  return (
    <span className={styles.withUnit} style={{ ['--unit-room' as string]: `${(unit ?? '').length}ch` }}>
      {before !== undefined && (
        <span className={styles.before} aria-hidden="true">
          {before}
        </span>
      )}
      <input
        {...wiring}
        ref={field.ref}
        name={field.name}
        className={styles.control}
        inputMode="decimal"
        autoComplete="off"
        disabled={disabled}
        value={typed.text}
        onChange={(event) => typed.type(event.target.value)}
        onBlur={() => {
          typed.settle();
          field.onBlur();
        }}
      />
      {unit !== undefined && <span className={styles.unit}>{unit}</span>}
    </span>
  );
}

/** Kept in a smaller unit than typed: percent typed, basis points kept, with 100. */
function scaledReading(scale: number): Reading {
  return {
    read: (text) => {
      const typed = readNumber(text);
      return typeof typed === 'number' ? Math.round(typed * scale) : typed;
    },
    show: (value) => showNumber(typeof value === 'number' ? value / scale : value),
  };
}

/**
 * A number with its unit beside it. The form's value is a number, or null when nothing is typed; with `scale` it is
 * the typed number times that, rounded.
 */
export function NumberField<Input extends FieldValues, Output>(
  props: Bound<Input, Output> & FieldWords & { unit?: string; scale?: number; disabled?: boolean },
) {
  const { control, name, label, hint, optional, unit, scale, disabled = false } = props;
  const { field, fieldState } = useController({ control, name });
  const reading = scale === undefined ? { read: readNumber, show: showNumber } : scaledReading(scale);
  const typed = useTypedText(field.value, field.onChange, reading);
  return (
    <FieldFrame
      name={name}
      label={label}
      hint={hint}
      optional={optional ?? false}
      error={fieldState.error?.message}
    >
      {(wiring) => (
        <FigureInput
          wiring={wiring}
          {...(unit === undefined ? {} : { unit })}
          disabled={disabled}
          typed={typed}
          field={field}
        />
      )}
    </FieldFrame>
  );
}

/** Dollars typed, whole cents kept. */
export function MoneyField<Input extends FieldValues, Output>(props: DollarFieldProps<Input, Output>) {
  return <DollarField {...props} reading={centsReading} />;
}

/** Dollars typed, parts of a cent too; hundredths of a cent kept. */
export function RateField<Input extends FieldValues, Output>(props: DollarFieldProps<Input, Output>) {
  return <DollarField {...props} reading={rateReading} />;
}

type DollarFieldProps<Input extends FieldValues, Output> = Bound<Input, Output> &
  FieldWords & { disabled?: boolean };

const centsReading: Reading = { read: readCents, show: showCents };
const rateReading: Reading = { read: readRate, show: showRate };

function DollarField<Input extends FieldValues, Output>(
  props: DollarFieldProps<Input, Output> & { reading: Reading },
) {
  const { control, name, label, hint, optional, disabled = false, reading } = props;
  const { field, fieldState } = useController({ control, name });
  const typed = useTypedText(field.value, field.onChange, reading);
  return (
    <FieldFrame
      name={name}
      label={label}
      hint={hint}
      optional={optional ?? false}
      error={fieldState.error?.message}
    >
      {(wiring) => <FigureInput wiring={wiring} before="$" disabled={disabled} typed={typed} field={field} />}
    </FieldFrame>
  );
}
