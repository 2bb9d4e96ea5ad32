import type { WorkingStep } from '@kerfyard/common/cutting';
import { Popover } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { formatNumber } from '../lib/format.ts';
import styles from './figure.module.css';
import { Working } from './working.tsx';

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
  const shown = typeof value === 'number' ? formatNumber(value, digits) : value;
  const figure = (
    <>
      <span className={styles.value}>{shown}</span>
      {unit !== '' && <span className={styles.unit}>{unit}</span>}
    </>
  );
  if (working === undefined || working.length === 0) {
    return <span className={`${styles.figure} ${styles[`${size}Size`]}`}>{figure}</span>;
  }
  return (
    <Popover.Root>
      <Popover.Trigger>
        <button
          type="button"
          className={`${styles.figure} ${styles.opens} ${styles[`${size}Size`]}`}
          aria-label={t('figure.open', { label, value: `${shown} ${unit}`.trim() })}
        >
          {figure}
        </button>
      </Popover.Trigger>
      <Popover.Content maxWidth="min(30rem, calc(100vw - 2rem))" aria-label={t('figure.title', { label })}>
        <Working label={label} figure={figure} steps={working} />
      </Popover.Content>
    </Popover.Root>
  );
}
