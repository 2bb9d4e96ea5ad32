import { useQuery } from '@tanstack/react-query';
import { useEffect } from 'react';
import { useTranslation } from 'react-i18next';
import { useSearchParams } from 'react-router-dom';
import { ButtonLink } from '../components/link.tsx';
import { Page } from '../components/page.tsx';
import { Loading, QueryErrorState } from '../components/states.tsx';
import { companyKeys, companyQuery, useReadPayouts } from '../features/company/api/company.queries.ts';
import { CompanyForm } from '../features/company/components/company-form.tsx';
import styles from '../features/company/components/company.module.css';
import { Ladder } from '../features/company/components/ladder.tsx';
import { Payouts } from '../features/company/components/payouts.tsx';
import { RateCardLink } from '../features/company/components/rate-card-link.tsx';
import { Units } from '../features/company/components/units.tsx';
import { useCan } from '../features/session/hooks/use-session.ts';
import { useLiveHints } from '../lib/live.ts';
import { paths } from '../lib/paths.ts';
import { queryClient } from '../lib/query-client.ts';

export function loader() {
  void queryClient.prefetchQuery(companyQuery);
  return null;
}

/** One's own company: what it is, what it may do, what it sends out, where its money goes. */
export default function CompanyPage() {
  const { t } = useTranslation('company');
  const can = useCan();
  const company = useQuery(companyQuery);
  useBackFromPayouts();
  // The provider goes on checking after its page was left, and tells us when it has done.
  useLiveHints({ money: () => [companyKeys.own] });
  if (company.isPending) {
    return (
      <Page title={t('title')}>
        <Loading />
      </Page>
    );
  }
  if (company.isError) {
    return (
      <Page title={t('title')}>
        <QueryErrorState error={company.error} onRetry={() => void company.refetch()} />
      </Page>
    );
  }
  const own = company.data;
  const canEdit = can('company.edit');
  const isCrew = own.kind === 'cutting_contractor';
  return (
    <Page
      title={t('title')}
      lead={t(`kind.${own.kind}`)}
      actions={
        <ButtonLink to={paths.people} variant="soft" size="3">
          {t('people')}
        </ButtonLink>
      }
    >
      <div className={styles.columns}>
        <div className={styles.column}>
          <CompanyForm company={own} canEdit={canEdit} />
        </div>
        <div className={styles.column}>
          <Ladder company={own} />
          {isCrew && <Payouts payouts={own.payouts} canStart={can('money.payout')} />}
          {isCrew && can('bid.read') && <RateCardLink />}
          {isCrew && <Units kind="crews" units={own.crews} canEdit={canEdit} />}
          {isCrew && <Units kind="trucks" units={own.trucks} canEdit={canEdit} />}
        </div>
      </div>
    </Page>
  );
}

/** Back from the payment provider's page: ask again how far the set-up is, then drop the mark from the address. */
function useBackFromPayouts(): void {
  const { mutate: read } = useReadPayouts();
  const [search, setSearch] = useSearchParams();
  const isBack = search.has('payouts');
  useEffect(() => {
    if (!isBack) return;
    read();
    setSearch({}, { replace: true });
  }, [read, isBack, setSearch]);
}
