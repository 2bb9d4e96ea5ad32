import { useId, useState } from 'react';
import { useTranslation } from 'react-i18next';
import { FieldNotes, wiringFor } from '../../../../components/form/field-frame.tsx';
import formStyles from '../../../../components/form/form.module.css';
import { readNumber } from '../../../../components/form/number-fields.tsx';
import type { CutDetailsProps } from './cut-details.tsx';
import { CutInput } from './cut-input.tsx';
import styles from './cut-list.module.css';

const unit = 'ft';

/** What else shapes the panels of a slab: column lines, where a joint always falls, and how long a panel may be. */
export function JointFields(props: CutDetailsProps) {
  const { line, index, errors, onFigure } = props;
  const { t } = useTranslation('scopes');
  return (
    <div className={styles.detailLine}>
      <BaysInput {...props} field="baysAlongLengthFt" />
      <BaysInput {...props} field="baysAlongWidthFt" />
      <CutInput
        name={`cuts.${index}.cut.maxAspect`}
        column="maxAspect"
        label={t('cuts.fields.maxAspect')}
        unit="to 1"
        value={line.cut.maxAspect}
        error={errors.maxAspect}
        optional
        hint={t('cuts.aspectHint')}
        onChange={onFigure}
      />
    </div>
  );
}

function BaysInput({
  line,
  index,
  errors,
  change,
  field,
}: CutDetailsProps & { field: 'baysAlongLengthFt' | 'baysAlongWidthFt' }) {
  const { t } = useTranslation('scopes');
  const id = useId();
  const value = line.cut[field] ?? null;
  const [text, setText] = useState(() => shown(value));
  const current = shown(readBays(text)) === shown(value) ? text : shown(value);
  return (
    <span className={styles.field}>
      <label htmlFor={id} className={styles.label}>
        {t(`cuts.fields.${field}`)}
      </label>
      <span className={formStyles.withUnit} style={{ ['--unit-room' as string]: `${unit.length}ch` }}>
        <input
          {...wiringFor(id, { hint: true, error: errors[field], optional: true })}
          name={`cuts.${index}.cut.${field}`}
          className={formStyles.control}
          autoComplete="off"
          maxLength={200}
          value={current}
          onChange={(event) => {
            setText(event.target.value);
            change({ type: 'figure', id: line.id, field, value: readBays(event.target.value) });
          }}
        />
        <span className={formStyles.unit}>{unit}</span>
      </span>
      <FieldNotes id={id} hint={t('cuts.baysHint')} error={errors[field]} />
    </span>
  );
}

/** `40, 40, 40` → three numbers; nothing when empty; the text itself while it is no list of numbers. */
function readBays(text: string): number[] | string | null {
  const parts = text.split(/[\s,;]+/).filter((part) => part !== '');
  if (parts.length === 0) return null;
  const bays = parts.map(readNumber).filter((bay) => typeof bay === 'number');
  return bays.length === parts.length ? bays : text;
}

function shown(value: unknown): string {
  return Array.isArray(value) ? value.join(', ') : typeof value === 'string' ? value : '';
}
