import { MoneyText } from '../../../components/money-text.tsx';
import styles from './money.module.css';

export interface Amount {
  label: string;
  cents: number;
  isTotal?: boolean;
}

/** Names and amounts in two columns, the last perhaps a total under a rule. */
export function Amounts({ rows }: { rows: readonly Amount[] }) {
  return (
    <dl className={styles.amounts}>
      {rows.map((row) => (
        <AmountRow key={row.label} row={row} />
      ))}
    </dl>
  );
}

function AmountRow({ row }: { row: Amount }) {
  const look = row.isTotal === true ? styles.total : undefined;
  return (
    <>
      <dt className={look}>{row.label}</dt>
      <dd className={look}>
        <MoneyText cents={row.cents} weight={row.isTotal === true ? 'strong' : 'normal'} />
      </dd>
    </>
  );
}
