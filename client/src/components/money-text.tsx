import { formatMoney } from '../lib/format.ts';
import styles from './figure.module.css';

interface MoneyTextProps {
  cents: number;
  /** Quiet for zero and asides, strong for totals. */
  weight?: 'quiet' | 'normal' | 'strong';
  /** Shows a plus before what came in. */
  signed?: boolean;
  dropZeroCents?: boolean;
}

/** An amount of money: right-aligned where it stands in a column, never wrapped. */
export function MoneyText({
  cents,
  weight = 'normal',
  signed = false,
  dropZeroCents = false,
}: MoneyTextProps) {
  const text = formatMoney(cents, { dropZeroCents });
  return (
    <span className={`${styles.money} ${styles[weight]}`}>{signed && cents > 0 ? `+${text}` : text}</span>
  );
}
