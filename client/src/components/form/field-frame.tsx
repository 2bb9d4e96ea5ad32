import { useId, type ReactNode } from 'react';
import { useTranslation } from 'react-i18next';
import { useLabelInSummary } from './form-labels.ts';
import styles from './form.module.css';

/** What every field takes. */
export interface FieldWords {
  label: string;
  hint?: ReactNode;
  optional?: boolean;
}

/** The attributes that tie an input to its label, its hint and its error. */
export interface Wiring {
  id: string;
  'aria-describedby': string | undefined;
  'aria-invalid': true | undefined;
  'aria-required': true | undefined;
}

interface FieldFrameProps extends FieldWords {
  name: string;
  error: string | undefined;
  children: (wiring: Wiring) => ReactNode;
}

/** Label above, hint and error below, all tied to the input. */
export function FieldFrame({ name, label, hint, optional = false, error, children }: FieldFrameProps) {
  const { t } = useTranslation();
  const id = useId();
  useLabelInSummary(name, label);
  return (
    <div className={styles.field}>
      <label htmlFor={id} className={styles.label}>
        {label}
        {optional && <span className={styles.optional}> {t('form.optional')}</span>}
      </label>
      {children(wiringFor(id, { hint, error, optional }))}
      <FieldNotes id={id} hint={hint} error={error} />
    </div>
  );
}

export function wiringFor(
  id: string,
  field: { hint?: ReactNode; error: string | undefined; optional: boolean },
): Wiring {
  const described = [
    field.error === undefined ? undefined : `${id}-error`,
    field.hint === undefined ? undefined : `${id}-hint`,
  ].filter((part) => part !== undefined);
  return {
    id,
    'aria-describedby': described.length === 0 ? undefined : described.join(' '),
    'aria-invalid': field.error === undefined ? undefined : true,
    'aria-required': field.optional ? undefined : true,
  };
}

export function FieldNotes({ id, hint, error }: { id: string; hint: ReactNode; error: string | undefined }) {
  return (
    <>
      {error !== undefined && (
        <span id={`${id}-error`} className={styles.error}>
          <svg width="12" height="12" viewBox="0 0 12 12" aria-hidden="true" focusable="false">
            <path d="M6 0 12 11.5H0z" fill="currentColor" />
          </svg>
          {error}
        </span>
      )}
      {hint !== undefined && (
        <span id={`${id}-hint`} className={styles.hint}>
          {hint}
        </span>
      )}
    </>
  );
}
