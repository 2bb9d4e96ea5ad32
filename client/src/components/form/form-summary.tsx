import { Text } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import styles from './form.module.css';

export interface SummaryLine {
  /** The field to go to; null when it is none of this form. */
  name: string | null;
  text: string;
}

/** What is wrong with the form, read out as soon as it appears; each line leads to its field. */
export function FormSummary(props: {
  what: string | undefined;
  next: string | undefined;
  lines: readonly SummaryLine[];
  onChoose: (name: string) => void;
}) {
  const { t } = useTranslation();
  const empty = props.what === undefined && props.lines.length === 0;
  return (
    <div role="alert" className={empty ? 'k-hidden' : styles.summary}>
      {!empty && (
        <Text as="p" weight="medium">
          {props.what ?? t('form.wrong', { count: props.lines.length })}
        </Text>
      )}
      {props.next !== undefined && <Text as="p">{props.next}</Text>}
      {props.lines.length > 0 && (
        <ul>
          {props.lines.map((line) => (
            <li key={`${line.name ?? ''}${line.text}`}>
              {line.name === null ? (
                line.text
              ) : (
                <button
                  type="button"
                  className={styles.toField}
                  onClick={() => props.onChoose(line.name ?? '')}
                >
                  {line.text}
                </button>
              )}
            </li>
          ))}
        </ul>
      )}
    </div>
  );
}
