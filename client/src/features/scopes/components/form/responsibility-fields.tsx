import {
  countResponsibilities,
  prefillResponsibilities,
  responsibilityHolders,
  type PrefillInput,
  type Responsibility,
  type ResponsibilityHolder,
} from '@kerfyard/common/scopes';
import { Button, Text } from '@radix-ui/themes';
import { memo, useEffect, useId, useMemo, useRef, useState } from 'react';
import { useController, useFormContext, useWatch } from 'react-hook-form';
import { useTranslation } from 'react-i18next';
import { FieldNotes } from '../../../../components/form/field-frame.tsx';
import formStyles from '../../../../components/form/form.module.css';
import { kindOf, type DraftCut } from '../../cut-lines.ts';
import type { ScopeFormValues } from '../../scope-form-values.ts';
import styles from './scope-form.module.css';

interface ResponsibilityFieldsProps {
  lines: readonly DraftCut[];
  /** Complaints by place in the sheet. */
  errors: ReadonlyMap<number, string>;
}

/** Who has what, no line blank: prefilled by what is cut and where, said in one line, opened to change it. */
export const ResponsibilityFields = memo(function ResponsibilityFields(props: ResponsibilityFieldsProps) {
  const { t } = useTranslation(['scopes', 'scope']);
  const { control } = useFormContext<ScopeFormValues>();
  const { field } = useController({ control, name: 'responsibilities' });
  const rows = field.value;
  const [wanted, setWanted] = useState(false);
  const open = wanted || props.errors.size > 0;
  const id = useId();
  usePrefill(props.lines, rows, field.onChange);
  const counts = countResponsibilities(rows);
  const change = (index: number, row: Responsibility) =>
    field.onChange(rows.map((known, at) => (at === index ? row : known)));
  return (
    <>
      <div className={styles.sentence}>
        <Text as="p" size="4" weight="medium">
          {t(counts.other === 0 ? 'sheet.sentence' : 'sheet.sentenceOther', {
            gc: counts.gc,
            crew: counts.crew,
            other: counts.other,
          })}
        </Text>
        <Button
          type="button"
          variant="soft"
          size="3"
          aria-expanded={open}
          aria-controls={id}
          onClick={() => setWanted(!open)}
        >
          {t(open ? 'sheet.close' : 'sheet.open')}
        </Button>
      </div>
      {open && (
        <div className={styles.sheet} id={id}>
          <div className={styles.sheetHead} aria-hidden="true">
            <span>{t('scope:responsibilities.item')}</span>
            {responsibilityHolders.map((holder) => (
              <span key={holder}>{t(`sheet.holders.${holder}`)}</span>
            ))}
          </div>
          {rows.map((row, index) => (
            <SheetRow
              key={row.item}
              row={row}
              index={index}
              error={props.errors.get(index)}
              onChange={(next) => change(index, next)}
            />
          ))}
        </div>
      )}
    </>
  );
});

function SheetRow(props: {
  row: Responsibility;
  index: number;
  error: string | undefined;
  onChange: (row: Responsibility) => void;
}) {
  const { row, index, error, onChange } = props;
  const { t } = useTranslation(['scopes', 'scope']);
  const id = useId();
  const item = t(`scope:items.${row.item}`);
  return (
    <fieldset className={styles.sheetRow} role="radiogroup" aria-label={item}>
      <span className={styles.item}>{item}</span>
      {responsibilityHolders.map((by: ResponsibilityHolder) => (
        <label key={by} className={styles.holder}>
          <input
            type="radio"
            name={`responsibilities.${index}.by`}
            checked={row.by === by}
            onChange={() => onChange({ ...row, by, name: by === 'other' ? row.name : '' })}
          />
          <span className={styles.holderName}>{t(`sheet.holders.${by}`)}</span>
        </label>
      ))}
      {row.by === 'other' && (
        <div className={styles.otherName}>
          <input
            aria-label={t('sheet.nameFor', { item })}
            aria-invalid={error === undefined ? undefined : true}
            aria-describedby={error === undefined ? undefined : `${id}-error`}
            name={`responsibilities.${index}.name`}
            className={formStyles.control}
            placeholder={t('sheet.name')}
            maxLength={80}
            value={row.name}
            onChange={(event) => onChange({ ...row, name: event.target.value })}
          />
          <FieldNotes id={id} hint={undefined} error={error} />
        </div>
      )}
    </fieldset>
  );
}

/**
 * The usual holder of each item follows what is cut and where, as long as the line was not changed by hand: a line
 * that differs from what was usual before is somebody's decision and stays.
 */
function usePrefill(
  lines: readonly DraftCut[],
  rows: readonly Responsibility[],
  change: (rows: Responsibility[]) => void,
): void {
  const { control } = useFormContext<ScopeFormValues>();
  const [indoors, face, below] = useWatch({
    control,
    name: ['conditions.indoors', 'conditions.face', 'conditions.below'],
  });
  const kinds = [...new Set(lines.map(kindOf))].sort().join(' ');
  const usual = useMemo(
    () => prefillResponsibilities(prefillInput({ kinds, indoors, face, below })),
    [kinds, indoors, face, below],
  );
  const before = useRef(usual);
  useEffect(() => {
    const was = new Map(before.current.map((row) => [row.item, row.by]));
    const now = new Map(usual.map((row) => [row.item, row.by]));
    before.current = usual;
    const typed = new Map(rows.map((row) => [row.item, row]));
    const next = usual.map((fresh) => {
      const row = typed.get(fresh.item);
      if (row === undefined) return fresh;
      return row.by === was.get(row.item) ? { ...row, by: now.get(row.item) ?? row.by } : row;
    });
    const isSame = next.length === rows.length && next.every((row, at) => row.by === rows[at]?.by);
    if (!isSame) change(next);
  }, [usual, rows, change]);
}

const faces = ['floor', 'wall', 'ceiling'] as const;
const belows = ['soil', 'occupied', 'unoccupied', 'unknown'] as const;

function prefillInput(typed: {
  kinds: string;
  indoors: boolean | null;
  face: string;
  below: string;
}): PrefillInput {
  return {
    kinds: typed.kinds.split(' ').filter((kind) => kind !== '') as PrefillInput['kinds'],
    indoors: typed.indoors === true,
    face: faces.find((face) => face === typed.face) ?? 'floor',
    below: belows.find((below) => below === typed.below) ?? 'unknown',
  };
}
