import type { BidListItem } from '@kerfyard/common/bids';
import { Heading, Text } from '@radix-ui/themes';
import { useInfiniteQuery } from '@tanstack/react-query';
import { useTranslation } from 'react-i18next';
import { DueTime } from '../components/countdown.tsx';
import { CutSketch } from '../components/cut-sketch.tsx';
import { ButtonLink, TextLink } from '../components/link.tsx';
import { MoneyText } from '../components/money-text.tsx';
import { MoreButton } from '../components/more-button.tsx';
import { Page } from '../components/page.tsx';
import { EmptyState, Loading, QueryErrorState } from '../components/states.tsx';
import { StatusWord } from '../components/status-word.tsx';
import { bidKeys, bidsQuery } from '../features/bids/api/bids.queries.ts';
import styles from '../features/bids/components/bids.module.css';
import { Outcome } from '../features/bids/components/outcome.tsx';
import { ScopeStatusWord } from '../features/scopes/components/scope-status.tsx';
import { useLiveHints } from '../lib/live.ts';
import { paths } from '../lib/paths.ts';
import { queryClient } from '../lib/query-client.ts';

export function loader() {
  void queryClient.prefetchInfiniteQuery(bidsQuery);
  return null;
}

/** A crew's own bids, and how each came out. */
export default function BidsPage() {
  const { t } = useTranslation('bid');
  const list = useInfiniteQuery(bidsQuery);
  useLiveHints({ own_bid: () => [bidKeys.lists], scope: () => [bidKeys.lists] });
  const bids = list.data?.pages.flatMap((page) => page.items) ?? [];
  return (
    <Page title={t('list.title')} lead={t('list.lead')}>
      {list.isPending && <Loading />}
      {list.isError && <QueryErrorState error={list.error} onRetry={() => void list.refetch()} />}
      {list.isSuccess && bids.length === 0 && (
        <EmptyState
          drawing={<CutSketch cuts={[{ kind: 'line', lengthFt: 30, depthIn: 4, count: 1 }]} look="card" />}
          title={t('list.empty')}
          text={t('list.emptyText')}
          action={<ButtonLink to={paths.openScopes}>{t('list.toOpenScopes')}</ButtonLink>}
        />
      )}
      <ul className={styles.cards}>
        {bids.map((bid) => (
          <li key={bid.id}>
            <BidRow bid={bid} />
          </li>
        ))}
      </ul>
      <MoreButton list={list}>{t('list.more')}</MoreButton>
    </Page>
  );
}

function BidRow({ bid }: { bid: BidListItem }) {
  const { t } = useTranslation('bid');
  return (
    <article className={styles.panel}>
      <div className={styles.between}>
        <Heading as="h2" size="4" weight="medium">
          <TextLink to={paths.openScope(bid.scopeId)} color="gray" highContrast>
            {bid.scopeTitle}
          </TextLink>
        </Heading>
        <MoneyText cents={bid.totalCents} weight="strong" />
      </div>
      <div className={styles.between}>
        <Text size="2" color="gray">
          {bid.scopeNumber} · {bid.gc.name}
        </Text>
        <ScopeStatusWord status={bid.scopeStatus} />
      </div>
      <div className={styles.between}>
        {bid.outcome === null ? (
          <span className={styles.row}>
            <StatusWord tone={bid.status === 'withdrawn' ? 'closed' : 'good'}>
              {t(`own.status.${bid.status}`)}
            </StatusWord>
            {bid.rank !== null && <Text size="2">{t('own.rank', { rank: bid.rank, of: bid.of })}</Text>}
          </span>
        ) : (
          <Outcome outcome={bid.outcome} />
        )}
        {bid.scopeStatus === 'open' && <DueTime at={bid.dueAt} timeZone={bid.timeZone} />}
        {bid.subcontractId !== null && (
          <ButtonLink to={paths.workItem(bid.subcontractId)} variant="soft">
            {t('list.toWork')}
          </ButtonLink>
        )}
      </div>
    </article>
  );
}
