import { Button } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import type { RawRow, RowsSpec } from '../calculator.ts';
import { maxRows, nextRow, type Problems } from '../inputs.ts';
import { ChoiceInput, NumberInput } from './calculator-fields.tsx';
import styles from './calculators.module.css';

interface RowsInputProps {
  /** The calculator's and the field's names: where the words are. */
  calculator: string;
  field: string;
  spec: RowsSpec;
  rows: readonly RawRow[];
  problems: Problems;
  onChange: (rows: readonly RawRow[]) => void;
}

/** A short table to fill, each row a small group of fields; its fields keep their labels, on a phone too. */
export function RowsInput({ calculator, field, spec, rows, problems, onChange }: RowsInputProps) {
  const { t } = useTranslation('calculators');
  const words = `${calculator}.rows.${field}`;
  const change = (index: number, name: string, text: string) =>
    onChange(rows.map((row, place) => (place === index ? { ...row, [name]: text } : row)));
  return (
    <div className={styles.rows}>
      {rows.map((row, index) => (
        <div
          key={index}
          className={styles.row}
          role="group"
          aria-label={t(`${words}.one`, { number: index + 1 })}
        >
          <div className={styles.rowHead}>
            <span aria-hidden="true">{t(`${words}.one`, { number: index + 1 })}</span>
            {rows.length > spec.minRows && (
              <Button
                type="button"
                variant="ghost"
                color="gray"
                className={styles.takeOut}
                aria-label={t(`${words}.takeOut`, { number: index + 1 })}
                onClick={() => onChange(rows.filter((_row, place) => place !== index))}
              >
                {t('takeOut')}
              </Button>
            )}
          </div>
          <div className={styles.cells}>
            {Object.entries(spec.columns).map(([name, column]) => {
              const place = `${field}[${index}].${name}`;
              const shared = {
                name: place,
                label: t(`${words}.${name}`),
                error: said(problems[place], t),
                text: row[name] ?? '',
                onChange: (text: string) => change(index, name, text),
              };
              return column.kind === 'choice' ? (
                <ChoiceInput key={name} {...shared} spec={column} words={wordsOf(name)} />
              ) : (
                <NumberInput key={name} {...shared} spec={column} />
              );
            })}
          </div>
        </div>
      ))}
      {rows.length < maxRows && (
        <Button
          type="button"
          variant="soft"
          color="gray"
          className={styles.add}
          onClick={() => onChange([...rows, nextRow(spec.columns, rows)])}
        >
          {t(`${words}.add`)}
        </Button>
      )}
    </div>
  );
}

/** Columns whose name stands for other words elsewhere. */
function wordsOf(column: string): string {
  return column === 'name' ? 'embedded' : column === 'unit' ? 'priceUnit' : column;
}

/** What is wrong with a field, in the engine's words for its range. */
export function said(
  allowed: string | undefined,
  t: (key: string, options?: Record<string, unknown>) => string,
): string | undefined {
  return allowed === undefined ? undefined : t('mustBe', { allowed });
}
