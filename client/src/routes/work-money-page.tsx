import type { SubcontractView } from '@kerfyard/common/subcontracts';
import { Callout } from '@radix-ui/themes';
import { useQuery } from '@tanstack/react-query';
import { useTranslation } from 'react-i18next';
import { useParams, useSearchParams, type LoaderFunctionArgs } from 'react-router-dom';
import { TextLink } from '../components/link.tsx';
import { MoneyLine } from '../components/money-line.tsx';
import { Page } from '../components/page.tsx';
import { Loading, QueryErrorState } from '../components/states.tsx';
import { moneyKeys, statementQuery } from '../features/money/api/money.queries.ts';
import { Fundings } from '../features/money/components/fundings.tsx';
import styles from '../features/money/components/money.module.css';
import { AcceptedWork, Releases } from '../features/money/components/releases.tsx';
import { SetAsideForm } from '../features/money/components/set-aside-form.tsx';
import { StatementTable, StatementTotals } from '../features/money/components/statement-table.tsx';
import { useCan } from '../features/session/hooks/use-session.ts';
import { subcontractQuery, workKeys } from '../features/work/api/work.queries.ts';
import { useLiveHints, useWatch } from '../lib/live.ts';
import { paths } from '../lib/paths.ts';
import { queryClient } from '../lib/query-client.ts';

export function loader({ params }: LoaderFunctionArgs) {
  const id = params.subcontractId ?? '';
  void queryClient.prefetchQuery(subcontractQuery(id));
  return null;
}

/** One subcontract's money: set aside, release, and each entry behind the bar. */
export default function WorkMoneyPage() {
  const { t } = useTranslation('money');
  const { subcontractId = '' } = useParams();
  const subcontract = useQuery({ ...subcontractQuery(subcontractId), refetchInterval: pollWhilePreparing });
  useWatch('subcontract', subcontractId);
  useLiveHints({
    money: () => [workKeys.one(subcontractId), moneyKeys.all],
    subcontract: () => [workKeys.one(subcontractId)],
  });
  if (subcontract.isError) {
    return (
      <Page title={t('title')}>
        <QueryErrorState error={subcontract.error} onRetry={() => void subcontract.refetch()} />
      </Page>
    );
  }
  if (subcontract.data === undefined) {
    return (
      <Page title={t('title')}>
        <Loading />
      </Page>
    );
  }
  return <SubcontractMoney subcontract={subcontract.data} />;
}

/** The payment page's address comes by the job runner, within a second or so; hints may be faster. */
function pollWhilePreparing(query: { state: { data?: SubcontractView | undefined } }): number | false {
  return query.state.data?.fundings.some((funding) => funding.status === 'requested') === true ? 700 : false;
}

function SubcontractMoney({ subcontract }: { subcontract: SubcontractView }) {
  const { t } = useTranslation('money');
  const can = useCan();
  const [search] = useSearchParams();
  const came = search.get('set-aside');
  const waiting = subcontract.fundings.some(
    (funding) => funding.status === 'awaiting_payment' || funding.status === 'processing',
  );
  const isUnderWay = waiting || subcontract.fundings.some((funding) => funding.status === 'requested');
  const isGc = subcontract.side === 'gc';
  const fundings = <Fundings fundings={subcontract.fundings} timeZone={subcontract.site.timeZone} />;
  return (
    <Page
      title={t('forWork', { number: subcontract.number })}
      lead={subcontract.title}
      width="wide"
      actions={
        <TextLink to={paths.workItem(subcontract.id)}>{t('back', { number: subcontract.number })}</TextLink>
      }
    >
      <div className={styles.stack}>
        <div role="status" className={styles.notice}>
          {(came === 'paid' || came === 'left') && waiting && (
            <Callout.Root>
              <Callout.Text>{t(`setAside.${came}`)}</Callout.Text>
            </Callout.Root>
          )}
        </div>
        <MoneyLine money={subcontract.money} />
        <div className={styles.columns}>
          <div className={styles.stack}>
            {isUnderWay && fundings}
            <AcceptedWork subcontract={subcontract} canRelease={isGc && can('money.release')} />
            {isGc && <SetAsideForm subcontract={subcontract} canPay={can('money.set_aside')} />}
            <Releases subcontract={subcontract} />
          </div>
          <div className={styles.stack}>
            {can('money.read') && <OwnTotals subcontract={subcontract} />}
            {!isUnderWay && fundings}
          </div>
        </div>
        {can('money.read') && <OwnStatement subcontract={subcontract} />}
      </div>
    </Page>
  );
}

/** The table below says so when the statement does not come. */
function OwnTotals({ subcontract }: { subcontract: SubcontractView }) {
  const statement = useQuery(statementQuery(subcontract.id)).data;
  if (statement === undefined || statement.lines.length === 0) return null;
  return <StatementTotals statement={statement} />;
}

function OwnStatement({ subcontract }: { subcontract: SubcontractView }) {
  const statement = useQuery(statementQuery(subcontract.id));
  if (statement.isError)
    return <QueryErrorState error={statement.error} onRetry={() => void statement.refetch()} />;
  if (statement.data === undefined) return <Loading />;
  return <StatementTable statement={statement.data} timeZone={subcontract.site.timeZone} ofOne />;
}
