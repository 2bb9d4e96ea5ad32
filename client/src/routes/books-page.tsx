import type { BooksView } from '@kerfyard/common/payments';
import { Heading, Text } from '@radix-ui/themes';
import { useQuery } from '@tanstack/react-query';
import { useTranslation } from 'react-i18next';
import { DataTable } from '../components/data-table.tsx';
import { MoneyText } from '../components/money-text.tsx';
import { Page } from '../components/page.tsx';
import { Loading, QueryErrorState } from '../components/states.tsx';
import { StatusWord, type StatusTone } from '../components/status-word.tsx';
import { booksQuery } from '../features/money/api/money.queries.ts';
import styles from '../features/money/components/money.module.css';
import { deviceTimeZone } from '../lib/clock.ts';
import { formatDateTime } from '../lib/format.ts';
import { queryClient } from '../lib/query-client.ts';

export function loader() {
  void queryClient.prefetchQuery(booksQuery);
  return null;
}

/** Staff: every account, every rule, every call to the provider. */
export default function BooksPage() {
  const { t } = useTranslation('money');
  const books = useQuery(booksQuery);
  return (
    <Page title={t('books.title')} lead={t('books.lead')} width="wide">
      {books.isPending && <Loading />}
      {books.isError && <QueryErrorState error={books.error} onRetry={() => void books.refetch()} />}
      {books.data !== undefined && (
        <div className={styles.stack}>
          <Rules checks={books.data.checks} />
          <Incidents incidents={books.data.incidents} />
          <Balances books={books.data.trialBalance} />
          <Operations operations={books.data.operations} />
        </div>
      )}
    </Page>
  );
}

function Rules({ checks }: { checks: BooksView['checks'] }) {
  const { t } = useTranslation('money');
  return (
    <DataTable
      caption={t('books.checks')}
      columns={[
        {
          key: 'rule',
          head: t('books.rule'),
          cell: (check) => <span className={styles.rule}>{check.name}</span>,
          csv: (check) => check.name,
        },
        {
          key: 'result',
          head: t('books.result'),
          cell: (check) =>
            check.failures === 0 ? (
              <StatusWord tone="good">{t('books.holds')}</StatusWord>
            ) : (
              <StatusWord tone="bad">{t('books.broken', { count: check.failures })}</StatusWord>
            ),
          csv: (check) => check.failures,
        },
      ]}
      rows={checks}
      rowKey={(check) => check.id}
    />
  );
}

function Incidents({ incidents }: { incidents: BooksView['incidents'] }) {
  const { t } = useTranslation('money');
  return (
    <section className={styles.section} aria-labelledby="incidents">
      <Heading as="h2" size="4" weight="medium" id="incidents">
        {t('books.incidents')}
      </Heading>
      {incidents.length === 0 && <Text color="gray">{t('books.noIncidents')}</Text>}
      {incidents.map((incident) => (
        <article key={incident.id} className={styles.item}>
          <StatusWord tone={incident.closedAt === null ? 'warn' : 'closed'}>{incident.kind}</StatusWord>
          <Text size="2">{incident.detail}</Text>
        </article>
      ))}
    </section>
  );
}

function Balances({ books }: { books: BooksView['trialBalance'] }) {
  const { t } = useTranslation('money');
  return (
    <>
      {books.map((book) => (
        <DataTable
          key={book.book}
          caption={t(`books.book.${book.book}`)}
          columns={[
            {
              key: 'account',
              head: t('books.account'),
              cell: (row) => <span className={styles.code}>{row.code}</span>,
              csv: (row) => row.code,
              foot: t('books.sum'),
            },
            {
              key: 'kind',
              head: t('books.kind'),
              cell: (row) => row.kind,
              csv: (row) => row.kind,
              narrow: 'hide',
            },
            {
              key: 'balance',
              head: t('books.balance'),
              align: 'right',
              cell: (row) => <MoneyText cents={row.balanceCents} />,
              csv: (row) => row.balanceCents / 100,
              foot: <MoneyText cents={book.sumCents} weight="strong" />,
            },
          ]}
          rows={book.accounts}
          rowKey={(row) => row.code}
          csvName={`books-${book.book}`}
        />
      ))}
    </>
  );
}

const operationTones: Record<BooksView['operations'][number]['status'], StatusTone> = {
  requested: 'waiting',
  succeeded: 'done',
  refused: 'bad',
  unknown: 'warn',
};

function Operations({ operations }: { operations: BooksView['operations'] }) {
  const { t } = useTranslation('money');
  return (
    <DataTable
      caption={t('books.operations')}
      columns={[
        { key: 'operation', head: t('books.operation'), cell: (row) => row.kind },
        {
          key: 'status',
          head: t('books.status'),
          cell: (row) => (
            <StatusWord tone={operationTones[row.status]}>{t(`books.opStatus.${row.status}`)}</StatusWord>
          ),
        },
        { key: 'attempts', head: t('books.attempts'), align: 'right', cell: (row) => row.attempts },
        {
          key: 'made',
          head: t('books.made'),
          cell: (row) => formatDateTime(row.createdAt, deviceTimeZone()),
        },
        { key: 'error', head: t('books.error'), cell: (row) => row.error ?? '' },
      ]}
      rows={operations}
      rowKey={(row) => row.id}
    />
  );
}
