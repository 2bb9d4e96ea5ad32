import type { NumberOrigin, WorkingStep } from '@kerfyard/common/cutting';
import { useTranslation } from 'react-i18next';
import { Figure } from '../../../components/figure.tsx';
import styles from './estimate.module.css';

interface EstimateRowProps {
  label: string;
  /** Ready to show: a figure, or a span of two. */
  value: string;
  unit?: string;
  working: readonly WorkingStep[];
  note?: string | undefined;
  isTotal?: boolean;
}

/** One figure of the estimate: it opens its working, and says whose numbers went in. */
export function EstimateRow({ label, value, unit = '', working, note, isTotal = false }: EstimateRowProps) {
  const { t } = useTranslation('estimate');
  const whose = whoseNumbers(working);
  const look = isTotal ? styles.strong : undefined;
  const notes = [...(whose === null ? [] : [t(`whose.${whose}`)]), ...(note === undefined ? [] : [note])];
  return (
    <>
      <dt className={look}>{label}</dt>
      <dd className={look}>
        <Figure label={label} value={value} unit={unit} working={working} />
      </dd>
      {notes.length > 0 && <dd className={styles.note}>{notes.join('. ')}</dd>}
    </>
  );
}

/** Whose numbers a working used, beside arithmetic and published tables: the crew's, common practice, or both. */
export function whoseNumbers(working: readonly WorkingStep[]): 'own' | 'common' | 'both' | null {
  const origins = new Set<NumberOrigin>(working.map(({ source }) => source.origin));
  const isCommon = origins.has('common practice');
  if (origins.has('company')) return isCommon ? 'both' : 'own';
  return isCommon ? 'common' : null;
}
