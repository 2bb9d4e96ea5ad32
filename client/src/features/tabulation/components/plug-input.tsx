import { useId, useState } from 'react';
import { useTranslation } from 'react-i18next';
import formStyles from '../../../components/form/form.module.css';
import { readCents, showCents } from '../../../components/form/number-fields.tsx';
import { useErrorWords } from '../../../lib/error-words.ts';
import styles from './tabulation.module.css';

interface PlugInputProps {
  label: string;
  cents: number;
  disabled: boolean;
  onSave: (cents: number) => Promise<unknown>;
}

type State = { kind: 'quiet' | 'saving' | 'saved' } | { kind: 'failed'; error: unknown };

/** Dollars for one item; sent when the field is left or Return is pressed. What was typed stays if that fails. */
export function PlugInput({ label, cents, disabled, onSave }: PlugInputProps) {
  const { t } = useTranslation('tabulation');
  const words = useErrorWords();
  const id = useId();
  const [typed, setTyped] = useState<string | null>(null);
  const [state, setState] = useState<State>({ kind: 'quiet' });
  const save = async () => {
    if (typed === null) return;
    const wanted = readCents(typed) ?? 0;
    if (typeof wanted !== 'number') return;
    if (wanted === cents) {
      setTyped(null);
      return;
    }
    setState({ kind: 'saving' });
    try {
      await onSave(wanted);
      setTyped(null);
      setState({ kind: 'saved' });
    } catch (error) {
      setState({ kind: 'failed', error });
    }
  };
  const isWrong = typed !== null && typeof readCents(typed) === 'string';
  const said =
    state.kind === 'failed'
      ? words(state.error).what
      : state.kind === 'quiet'
        ? ''
        : t(state.kind === 'saving' ? 'table.saving' : 'table.saved');
  return (
    <span className={styles.plug}>
      <span className={formStyles.withUnit} style={{ ['--unit-room' as string]: '0px' }}>
        <span className={formStyles.before} aria-hidden="true">
          $
        </span>
        <input
          className={formStyles.control}
          aria-label={label}
          aria-describedby={`${id}-state`}
          aria-invalid={isWrong ? true : undefined}
          inputMode="decimal"
          autoComplete="off"
          maxLength={14}
          disabled={disabled}
          value={typed ?? showCents(cents)}
          onChange={(event) => {
            setTyped(event.target.value);
            setState({ kind: 'quiet' });
          }}
          onBlur={() => void save()}
          onKeyDown={(event) => {
            if (event.key === 'Enter') void save();
          }}
        />
      </span>
      <span
        id={`${id}-state`}
        role="status"
        className={state.kind === 'failed' ? formStyles.error : formStyles.hint}
      >
        {said}
      </span>
    </span>
  );
}
