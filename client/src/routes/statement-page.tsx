import { useQuery } from '@tanstack/react-query';
import { useTranslation } from 'react-i18next';
import { Page } from '../components/page.tsx';
import { Loading, QueryErrorState } from '../components/states.tsx';
import { moneyKeys, statementQuery } from '../features/money/api/money.queries.ts';
import { StatementTable, StatementTotals } from '../features/money/components/statement-table.tsx';
import styles from '../features/money/components/money.module.css';
import { deviceTimeZone } from '../lib/clock.ts';
import { useLiveHints } from '../lib/live.ts';
import { queryClient } from '../lib/query-client.ts';

export function loader() {
  void queryClient.prefetchQuery(statementQuery());
  return null;
}

/** A company's money over all its work. */
export default function StatementPage() {
  const { t } = useTranslation('money');
  const statement = useQuery(statementQuery());
  useLiveHints({ money: () => [moneyKeys.all] });
  return (
    <Page title={t('title')} lead={statement.data && t(`lead.${statement.data.side}`)} width="wide">
      {statement.isPending && <Loading />}
      {statement.isError && (
        <QueryErrorState error={statement.error} onRetry={() => void statement.refetch()} />
      )}
      {statement.data !== undefined && (
        <div className={styles.stack}>
          {statement.data.lines.length > 0 && <StatementTotals statement={statement.data} />}
          <StatementTable statement={statement.data} timeZone={deviceTimeZone()} />
        </div>
      )}
    </Page>
  );
}
