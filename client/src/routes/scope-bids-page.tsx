import type { BidTabulationView } from '@kerfyard/common/bids';
import type { ScopeBody, ScopeDetailView } from '@kerfyard/common/scopes';
import { Heading, Text } from '@radix-ui/themes';
import { useQuery } from '@tanstack/react-query';
import { useTranslation } from 'react-i18next';
import { useParams, type LoaderFunctionArgs } from 'react-router-dom';
import { DueTime } from '../components/countdown.tsx';
import { ButtonLink } from '../components/link.tsx';
import { Page } from '../components/page.tsx';
import { EmptyState, Loading, QueryErrorState } from '../components/states.tsx';
import { scopeKeys, scopeQuery } from '../features/scopes/api/scope.queries.ts';
import { EndScope } from '../features/scopes/components/end-scope.tsx';
import { ScopeStatusWord } from '../features/scopes/components/scope-status.tsx';
import { useCan } from '../features/session/hooks/use-session.ts';
import {
  tabulationKeys,
  tabulationQuery,
  useSetPlugs,
} from '../features/tabulation/api/tabulation.queries.ts';
import { comparedBids, type ComparedBid } from '../features/tabulation/compare.ts';
import { AwardDialog } from '../features/tabulation/components/award-dialog.tsx';
import { OpenedBid } from '../features/tabulation/components/opened-bid.tsx';
import { PricePicture } from '../features/tabulation/components/price-picture.tsx';
import { SealedCount } from '../features/tabulation/components/sealed-count.tsx';
import { TabulationTable } from '../features/tabulation/components/tabulation-table.tsx';
import styles from '../features/tabulation/components/tabulation.module.css';
import { useLiveHints, useWatch } from '../lib/live.ts';
import { paths } from '../lib/paths.ts';
import { queryClient } from '../lib/query-client.ts';

export function loader({ params }: LoaderFunctionArgs) {
  const id = params.scopeId ?? '';
  void queryClient.prefetchQuery(scopeQuery(id));
  void queryClient.prefetchQuery(tabulationQuery(id));
  return null;
}

/** The bids on one scope: a count while they are sealed, then side by side, and the award. */
export default function ScopeBidsPage() {
  const { t } = useTranslation('tabulation');
  const { scopeId = '' } = useParams();
  const scope = useQuery(scopeQuery(scopeId));
  const bids = useQuery(tabulationQuery(scopeId));
  useWatch('scope', scopeId);
  const keys = [scopeKeys.one(scopeId), tabulationKeys.of(scopeId)];
  useLiveHints({
    scope: (hint) => (hint.scopeId === scopeId ? keys : []),
    bids: (hint) => (hint.scopeId === scopeId ? keys : []),
  });
  const body = scope.data?.body;
  if (scope.data !== undefined && body != null && bids.data !== undefined) {
    return (
      <ScopeBids
        scope={scope.data}
        body={body}
        view={bids.data}
        onDue={() => keys.forEach((queryKey) => void queryClient.invalidateQueries({ queryKey }))}
      />
    );
  }
  const failed = scope.isError ? scope : bids.isError ? bids : null;
  return (
    <Page title={t('title')}>
      {failed === null ? (
        <Loading />
      ) : (
        <QueryErrorState error={failed.error} onRetry={() => void failed.refetch()} />
      )}
    </Page>
  );
}

interface ScopeBidsProps {
  scope: ScopeDetailView;
  body: ScopeBody;
  view: BidTabulationView;
  onDue: () => void;
}

function ScopeBids(props: ScopeBidsProps) {
  const { scope, body, view, onDue } = props;
  const { t } = useTranslation('tabulation');
  const dueAt = scope.dueAt ?? body.bidding.dueAt;
  const { timeZone } = body.site;
  const isSealed = view.mode === 'sealed' && view.status === 'open';
  return (
    <Page
      title={t('pageTitle', { title: body.title })}
      width="wide"
      lead={
        <>
          <ScopeStatusWord status={view.status} /> {scope.number}
        </>
      }
      actions={
        <ButtonLink to={paths.scope(scope.id)} size="3" variant="soft">
          {t('back')}
        </ButtonLink>
      }
    >
      <div className={styles.stack}>
        {isSealed ? (
          <SealedCount count={view.count} dueAt={dueAt} timeZone={timeZone} onDue={onDue} />
        ) : (
          <OpenBids {...props} />
        )}
      </div>
    </Page>
  );
}

function OpenBids({ scope, body, view, onDue }: ScopeBidsProps) {
  const { t } = useTranslation('tabulation');
  const can = useCan();
  const setPlugs = useSetPlugs(scope.id);
  const bids = comparedBids(view);
  const hasEnded = view.status !== 'open' && view.status !== 'due';
  if (bids.length === 0) return <NoBids scope={scope} view={view} />;
  const plug = (item: string, cents: number) =>
    setPlugs.mutateAsync({
      plugs: view.rows.map((row) => ({ item: row.item, cents: row.item === item ? cents : row.plugCents })),
    });
  const award = (compared: ComparedBid) =>
    view.status === 'due' && can('scope.award') ? (
      <AwardDialog scopeId={scope.id} compared={compared} />
    ) : null;
  return (
    <>
      <Standing scope={scope} body={body} view={view} bids={bids} onDue={onDue} />
      <PricePicture bids={bids} />
      <TabulationTable
        view={view}
        bids={bids}
        canPlug={can('scope.write') && !hasEnded}
        onPlug={plug}
        award={award}
      />
      <section className={styles.section} aria-labelledby="one-by-one">
        <Heading as="h2" size="5" weight="medium" id="one-by-one">
          {t('bid.title')}
        </Heading>
        {bids.map(({ bid }) => (
          <OpenedBid key={bid.id} bid={bid} cuts={body.cuts} timeZone={body.site.timeZone} />
        ))}
      </section>
      {can('scope.write') && !hasEnded && (
        <div className={styles.row}>
          <EndScope scope={{ id: scope.id, status: view.status }} />
        </div>
      )}
    </>
  );
}

/** Where the award stands: prices still coming in, waiting for it, or made. */
function Standing({ scope, body, view, bids, onDue }: ScopeBidsProps & { bids: readonly ComparedBid[] }) {
  const { t } = useTranslation('tabulation');
  const can = useCan();
  const winner = bids.find(({ bid }) => bid.id === view.awardedBidId);
  if (winner !== undefined) {
    return (
      <div className={styles.row}>
        <Text weight="medium">{t('award.awardedTo', { crew: winner.bid.crew.name })}</Text>
        {scope.subcontractId !== null && (
          <ButtonLink to={paths.workItem(scope.subcontractId)} size="3">
            {t('award.toWork')}
          </ButtonLink>
        )}
      </div>
    );
  }
  if (view.status === 'open') {
    return (
      <div>
        <Text as="p">{t('live')}</Text>
        <DueTime at={scope.dueAt ?? body.bidding.dueAt} timeZone={body.site.timeZone} onPassed={onDue} />
      </div>
    );
  }
  return view.status === 'due' && !can('scope.award') ? <Text as="p">{t('award.role')}</Text> : null;
}

function NoBids({ scope, view }: { scope: ScopeDetailView; view: BidTabulationView }) {
  const { t } = useTranslation('tabulation');
  const can = useCan();
  const isEarly = view.status === 'open';
  return (
    <EmptyState
      title={t(isEarly ? 'none.early' : 'none.title')}
      text={t(isEarly ? 'none.earlyText' : 'none.text')}
      action={
        !isEarly && can('scope.write') ? (
          <EndScope scope={{ id: scope.id, status: view.status }} />
        ) : undefined
      }
    />
  );
}
