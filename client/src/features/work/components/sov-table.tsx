import type { SovLineState, SovLineView, SubcontractView } from '@kerfyard/common/subcontracts';
import { useTranslation } from 'react-i18next';
import { DataTable, type Column } from '../../../components/data-table.tsx';
import { MoneyText } from '../../../components/money-text.tsx';
import { StatusWord, type StatusTone } from '../../../components/status-word.tsx';
import styles from './work.module.css';

const tones: Record<SovLineState, StatusTone> = {
  not_set_aside: 'quiet',
  setting_aside: 'waiting',
  set_aside: 'good',
  submitted: 'waiting',
  accepted: 'good',
  released: 'done',
};

/** The schedule of values: each line, its amount and where it stands. */
export function SovTable({ subcontract }: { subcontract: SubcontractView }) {
  const { t } = useTranslation('work');
  const columns: Column<SovLineView>[] = [
    {
      key: 'line',
      head: t('sov.line'),
      cell: (line) => line.description,
      csv: (line) => line.description,
      foot: t('sov.total'),
    },
    {
      key: 'state',
      head: t('sov.state'),
      cell: (line) => (
        <span className={styles.noWrap}>
          <StatusWord tone={tones[line.state]}>{t(`sov.states.${line.state}`)}</StatusWord>
        </span>
      ),
      csv: (line) => line.state,
    },
    {
      key: 'amount',
      head: t('sov.amount'),
      align: 'right',
      cell: (line) => <MoneyText cents={line.amountCents} />,
      csv: (line) => (line.amountCents / 100).toFixed(2),
      foot: <MoneyText cents={subcontract.totalCents} weight="strong" />,
    },
  ];
  return (
    <DataTable
      caption={t('sov.title')}
      columns={columns}
      rows={subcontract.sov}
      rowKey={(line) => line.id}
      csvName={`schedule-of-values-${subcontract.number}`}
    />
  );
}
