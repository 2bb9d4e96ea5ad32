import type { StatementLine, StatementView } from '@kerfyard/common/payments';
import { Heading, Text } from '@radix-ui/themes';
import { useTranslation } from 'react-i18next';
import { DataTable, type Column } from '../../../components/data-table.tsx';
import { TextLink } from '../../../components/link.tsx';
import { MoneyLine } from '../../../components/money-line.tsx';
import { MoneyText } from '../../../components/money-text.tsx';
import { EmptyState } from '../../../components/states.tsx';
import { formatDateTime } from '../../../lib/format.ts';
import { paths } from '../../../lib/paths.ts';
import { Amounts } from './amounts.tsx';
import styles from './money.module.css';

const totalsOf = {
  gc: ['setAsideCents', 'chargesCents', 'releasedCents', 'retainageCents', 'heldCents'],
  crew: ['releasedCents', 'feesCents', 'payableCents', 'transferredCents', 'retainageCents'],
} as const satisfies Record<StatementView['side'], readonly (keyof StatementView['totals'])[]>;

const example = {
  contractCents: 480_000,
  setAsideCents: 250_000,
  releasedCents: 160_000,
  retainageCents: 0,
  objectedCents: 0,
};

/** A statement: totals first, then every entry; both come from the same ledger rows. */
export function StatementTable({ statement, timeZone }: { statement: StatementView; timeZone: string }) {
  const { t } = useTranslation('money');
  if (statement.lines.length === 0) {
    return (
      <EmptyState
        drawing={<MoneyLine money={example} look="bar" />}
        title={t('statement.empty')}
        text={t('statement.emptyText')}
      />
    );
  }
  const columns: Column<StatementLine>[] = [
    {
      key: 'at',
      head: t('statement.at'),
      cell: (line) => formatDateTime(line.at, timeZone),
      csv: (line) => line.at,
    },
    {
      key: 'kind',
      head: t('statement.kind'),
      cell: (line) => t(`statement.kinds.${line.kind}`),
      csv: (line) => line.kind,
    },
    {
      key: 'subcontract',
      head: t('statement.subcontract'),
      cell: (line) => <TextLink to={paths.workMoney(line.subcontractId)}>{line.subcontractNumber}</TextLink>,
      csv: (line) => line.subcontractNumber,
    },
    {
      key: 'other',
      head: t('statement.other'),
      cell: (line) => line.otherSide.name,
      csv: (line) => line.otherSide.name,
    },
    {
      key: 'amount',
      head: t('statement.amount'),
      align: 'right',
      cell: (line) => <MoneyText cents={line.cents} />,
      csv: (line) => (line.cents / 100).toFixed(2),
    },
  ];
  return (
    <div className={styles.stack}>
      <section className={styles.section} aria-labelledby="totals">
        <Heading as="h2" size="5" weight="medium" id="totals">
          {t('totals.title')}
        </Heading>
        <Amounts
          rows={totalsOf[statement.side].map((key) => ({
            label: t(`totals.${key}`),
            cents: statement.totals[key],
          }))}
        />
        <Text size="2" color="gray">
          {t('totals.note')}
        </Text>
      </section>
      <DataTable
        caption={t('statement.caption')}
        columns={columns}
        rows={statement.lines}
        rowKey={(line) => `${line.entryId}-${line.kind}`}
        csvName="statement"
      />
    </div>
  );
}
