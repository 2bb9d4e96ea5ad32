import type { ScopeDetailView } from '@kerfyard/common/scopes';
import { Button, Text } from '@radix-ui/themes';
import { useQuery } from '@tanstack/react-query';
import { useTranslation } from 'react-i18next';
import { useParams, type LoaderFunctionArgs } from 'react-router-dom';
import { DueTime } from '../components/countdown.tsx';
import { Page } from '../components/page.tsx';
import { Loading, QueryErrorState } from '../components/states.tsx';
import { bidDraftQuery, bidKeys, ownBidQuery } from '../features/bids/api/bids.queries.ts';
import { BidPanel } from '../features/bids/components/bid-panel.tsx';
import styles from '../features/bids/components/bids.module.css';
import { companyQuery } from '../features/company/api/company.queries.ts';
import { scopeKeys, scopeQuery } from '../features/scopes/api/scope.queries.ts';
import { ScopeBody } from '../features/scopes/components/scope-body.tsx';
import { ScopeStatusWord } from '../features/scopes/components/scope-status.tsx';
import { ScopeTalk } from '../features/talk/components/scope-talk.tsx';
import { formatNumber } from '../lib/format.ts';
import { useLiveHints, useWatch } from '../lib/live.ts';
import { queryClient } from '../lib/query-client.ts';

export function loader({ params }: LoaderFunctionArgs) {
  const id = params.scopeId ?? '';
  void queryClient.prefetchQuery(scopeQuery(id));
  void queryClient.prefetchQuery(ownBidQuery(id));
  void queryClient.prefetchQuery(bidDraftQuery(id));
  void queryClient.prefetchQuery(companyQuery);
  return null;
}

/** A scope as a crew reads it, with its bid beside it. */
export default function OpenScopePage() {
  const { t } = useTranslation('scope');
  const { scopeId = '' } = useParams();
  const scope = useQuery(scopeQuery(scopeId));
  useWatch('scope', scopeId);
  useLiveHints({
    scope: (hint) => (hint.scopeId === scopeId ? [scopeKeys.one(scopeId), bidKeys.own(scopeId)] : []),
    own_bid: (hint) => (hint.scopeId === scopeId ? [bidKeys.own(scopeId)] : []),
  });
  if (scope.data !== undefined) return <OpenScope scope={scope.data} onDue={() => void scope.refetch()} />;
  return (
    <Page title={t('body.cuts')}>
      {scope.isError ? (
        <QueryErrorState error={scope.error} onRetry={() => void scope.refetch()} />
      ) : (
        <Loading />
      )}
    </Page>
  );
}

function OpenScope({ scope, onDue }: { scope: ScopeDetailView; onDue: () => void }) {
  const { t } = useTranslation(['scope', 'bid']);
  const { body } = scope;
  if (body === null) return null;
  return (
    <Page
      title={body.title}
      width="wide"
      lead={
        <>
          <ScopeStatusWord status={scope.status} /> {scope.number} · {scope.gc.name} · {body.site.city},{' '}
          {body.site.state}
          {scope.distanceMi !== null && <> · {t('bid:away', { miles: formatNumber(scope.distanceMi, 0) })}</>}
        </>
      }
    >
      <div className={styles.page}>
        <ScopeBody scope={scope} body={body} />
        <div className={styles.aside} id="bidding">
          <div>
            <Text as="div" size="2" color="gray">
              {t(`mode.${body.bidding.mode}`)}, {t('bid:dueAt')}
            </Text>
            <DueTime at={scope.dueAt ?? body.bidding.dueAt} timeZone={body.site.timeZone} onPassed={onDue} />
          </div>
          <BidPanel scope={scope} body={body} />
          <ScopeTalk scopeId={scope.id} gc={scope.gc} />
        </div>
      </div>
      {scope.status === 'open' && (
        <div className={styles.toBid}>
          <DueTime at={scope.dueAt ?? body.bidding.dueAt} timeZone={body.site.timeZone} onPassed={onDue} />
          <Button asChild size="3">
            <a href="#bidding">{t('bid:own.title')}</a>
          </Button>
        </div>
      )}
    </Page>
  );
}
