import type { WorkingStep } from '@kerfyard/common/cutting';
import { lazy, Suspense, useState, type ComponentProps } from 'react';
import { useTranslation } from 'react-i18next';
import { formatNumber } from '../lib/format.ts';
import styles from './figure.module.css';

// Lists are full of figures and few of them are opened: the popover's code comes with the first press.
const FigureOpened = lazy(() => import('./figure-opened.tsx'));

interface FigureProps {
  /** What the figure is, for those who hear it: "Sawing". */
  label: string;
  /** A number, rounded here, or text that is ready. */
  value: number | string;
  unit: string;
  /** Decimals shown at most. */
  digits?: number;
  size?: 'small' | 'normal' | 'large';
  /** How it was worked out: with it, the figure has a dotted underline and opens. */
  working?: readonly WorkingStep[] | undefined;
}

/** A figure with its unit beside it, lighter; a computed one opens to its formula, the numbers put in and their source. */
export function Figure({ label, value, unit, digits = 1, size = 'normal', working }: FigureProps) {
  const { t } = useTranslation();
  const [wanted, setWanted] = useState(false);
  const shown = typeof value === 'number' ? formatNumber(value, digits) : value;
  const sizeClass = styles[`${size}Size`] ?? '';
  const figure = (
    <>
      <span className={styles.value}>{shown}</span>
      {unit !== '' && <span className={styles.unit}>{unit}</span>}
    </>
  );
  if (working === undefined || working.length === 0) {
    return <span className={`${styles.figure} ${sizeClass}`}>{figure}</span>;
  }
  const button: ComponentProps<'button'> = {
    type: 'button',
    className: `${styles.figure} ${styles.opens} ${sizeClass}`,
    'aria-label': t('figure.open', { label, value: `${shown} ${unit}`.trim() }),
    children: figure,
  };
  const closed = <button {...button} aria-haspopup="dialog" onClick={() => setWanted(true)} />;
  if (!wanted) return closed;
  return (
    <Suspense fallback={closed}>
      <FigureOpened label={label} figure={figure} steps={working} button={button} />
    </Suspense>
  );
}
