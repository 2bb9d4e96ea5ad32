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

interface StatementProps {
  statement: StatementView;
  timeZone: string;
}

/** The sums; they come from the same ledger rows as the entries. */
export function StatementTotals({ statement }: { statement: StatementView }) {
  const { t } = useTranslation('money');
  return (
    <section className={styles.section} aria-labelledby="totals">
      <Heading as="h2" size="5" weight="medium" id="totals">
        {t('totals.title')}
      </Heading>
      <Amounts
        rows={totalsOf[statement.side].map((key) => ({
          label: t(`totals.${statement.side}.${key}`),
          cents: statement.totals[key],
        }))}
      />
      <Text size="2" color="gray">
        {t('totals.note')}
      </Text>
    </section>
  );
}

/** Every entry. On one subcontract's page (`ofOne`) number and other side stand in its head already. */
export function StatementTable({ statement, timeZone, ofOne = false }: StatementProps & { ofOne?: boolean }) {
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
  const kindOf = (line: StatementLine) => t(`statement.kinds.${statement.side}.${line.kind}`);
  const when: Column<StatementLine> = {
    key: 'at',
    head: t('statement.at'),
    cell: (line) => <span className={styles.when}>{formatDateTime(line.at, timeZone)}</span>,
    csv: (line) => line.at,
    narrow: 'hide',
  };
  const what: Column<StatementLine> = {
    key: 'kind',
    head: t('statement.kind'),
    cell: (line) => (
      <>
        {kindOf(line)}
        <span className={styles.onPhone}>
          {formatDateTime(line.at, timeZone)}
          {!ofOne && (
            <>
              {' · '}
              <TextLink to={paths.workMoney(line.subcontractId)}>{line.subcontractNumber}</TextLink>
              {' · '}
              {line.otherSide.name}
            </>
          )}
        </span>
      </>
    ),
    csv: kindOf,
  };
  const about: Column<StatementLine>[] = [
    {
      key: 'subcontract',
      head: t('statement.subcontract'),
      cell: (line) => <TextLink to={paths.workMoney(line.subcontractId)}>{line.subcontractNumber}</TextLink>,
      csv: (line) => line.subcontractNumber,
      narrow: 'hide',
    },
    {
      key: 'other',
      head: t('statement.other'),
      cell: (line) => line.otherSide.name,
      csv: (line) => line.otherSide.name,
      narrow: 'hide',
    },
  ];
  const amount: Column<StatementLine> = {
    key: 'amount',
    head: t('statement.amount'),
    align: 'right',
    cell: (line) => <MoneyText cents={line.cents} />,
    csv: (line) => (line.cents / 100).toFixed(2),
  };
  return (
    <DataTable
      caption={t('statement.caption')}
      columns={[when, what, ...(ofOne ? [] : about), amount]}
      rows={statement.lines}
      rowKey={(line) => `${line.entryId}-${line.kind}`}
      csvName="statement"
    />
  );
}
