import { useId } from 'react';
import { useTranslation } from 'react-i18next';
import { FieldFrame, FieldNotes, wiringFor } from '../../../components/form/field-frame.tsx';
import form from '../../../components/form/form.module.css';
import type { ChoiceSpec, NumberSpec, SetSpec, SwitchSpec } from '../calculator.ts';
import styles from './calculators.module.css';

interface Named {
  name: string;
  label: string;
  hint?: string | undefined;
  error: string | undefined;
}

interface Typed {
  text: string;
  onChange: (text: string) => void;
}

/** A number as typed, its unit inside the field. */
export function NumberInput(
  props: Named & Typed & { spec: Pick<NumberSpec, 'unit' | 'optional'>; long?: boolean },
) {
  const { name, label, hint, error, text, onChange, spec, long = false } = props;
  const isMoney = spec.unit === '$';
  return (
    <FieldFrame name={name} label={label} hint={hint} optional={spec.optional} error={error}>
      {(wiring) => (
        <span
          className={form.withUnit}
          style={{ ['--unit-room' as string]: `${isMoney ? 0 : spec.unit.length}ch` }}
        >
          {isMoney && (
            <span className={form.before} aria-hidden="true">
              $
            </span>
          )}
          <input
            {...wiring}
            name={name}
            className={form.control}
            inputMode={long ? 'text' : 'decimal'}
            autoComplete="off"
            value={text}
            onChange={(event) => onChange(event.target.value)}
          />
          {!isMoney && spec.unit !== '' && <span className={form.unit}>{spec.unit}</span>}
        </span>
      )}
    </FieldFrame>
  );
}

/** One of a list. A choice that is none of them (a mistyped address) shows as none, never as the first. */
export function ChoiceInput(props: Named & Typed & { spec: ChoiceSpec; words: string }) {
  const { name, label, hint, error, text, onChange, spec, words } = props;
  const { t } = useTranslation('calculators');
  const isKnown = spec.options.includes(text);
  return (
    <FieldFrame name={name} label={label} hint={hint} error={error}>
      {(wiring) => (
        <select
          {...wiring}
          name={name}
          className={form.control}
          value={isKnown ? text : ''}
          onChange={(event) => onChange(event.target.value)}
        >
          {!isKnown && <option value="">{t('choose')}</option>}
          {spec.options.map((option) => (
            <option key={option} value={option}>
              {t(`options.${words}.${option}`)}
            </option>
          ))}
        </select>
      )}
    </FieldFrame>
  );
}

/** Any of a few, as ticks. */
export function SetInput(props: Named & Typed & { spec: SetSpec; words: string }) {
  const { label, hint, error, text, onChange, spec, words } = props;
  const { t } = useTranslation('calculators');
  const id = useId();
  const chosen = text === '' ? [] : text.split(',');
  const toggle = (option: string) => {
    const next = chosen.includes(option) ? chosen.filter((one) => one !== option) : [...chosen, option];
    onChange(spec.options.filter((one) => next.includes(one)).join(','));
  };
  return (
    <fieldset
      className={form.choices}
      aria-describedby={wiringFor(id, { hint, error, optional: true })['aria-describedby']}
    >
      <legend className={form.label}>{label}</legend>
      <div className={form.rows}>
        {spec.options.map((option) => (
          <label key={option} className={form.choice}>
            <input type="checkbox" checked={chosen.includes(option)} onChange={() => toggle(option)} />
            <span>{t(`options.${words}.${option}`)}</span>
          </label>
        ))}
      </div>
      <FieldNotes id={id} hint={hint} error={error} />
    </fieldset>
  );
}

/** One yes or no. */
export function SwitchInput(props: Named & Typed & { spec: SwitchSpec }) {
  const { label, hint, error, text, onChange } = props;
  const id = useId();
  return (
    <div className={`${form.field} ${form.rows} ${styles.wide}`}>
      <label className={form.choice}>
        <input
          type="checkbox"
          {...wiringFor(id, { hint, error, optional: true })}
          checked={text === 'yes'}
          onChange={(event) => onChange(event.target.checked ? 'yes' : 'no')}
        />
        <span>{label}</span>
      </label>
      <FieldNotes id={id} hint={hint} error={error} />
    </div>
  );
}
