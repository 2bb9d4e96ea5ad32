import { useInfiniteQuery } from '@tanstack/react-query';
import { useEffect, useRef } from 'react';
import { useTranslation } from 'react-i18next';
import { useSearchParams, type LoaderFunctionArgs } from 'react-router-dom';
import { useAnnounce } from '../components/announcer.tsx';
import { CutSketch } from '../components/cut-sketch.tsx';
import { MoreButton } from '../components/more-button.tsx';
import { Page } from '../components/page.tsx';
import { EmptyState, Loading, QueryErrorState } from '../components/states.tsx';
import { openScopesKeys, openScopesQuery } from '../features/open-scopes/api/open-scopes.queries.ts';
import { Filters } from '../features/open-scopes/components/filters.tsx';
import styles from '../features/open-scopes/components/open-scopes.module.css';
import { ScopeCard } from '../features/open-scopes/components/scope-card.tsx';
import { readFilter } from '../features/open-scopes/filter-in-address.ts';
import { useLiveHints } from '../lib/live.ts';
import { queryClient } from '../lib/query-client.ts';

export function loader({ request }: LoaderFunctionArgs) {
  void queryClient.prefetchInfiniteQuery(openScopesQuery(readFilter(new URL(request.url).searchParams)));
  return null;
}

/** What a crew may bid on now; new scopes appear by themselves. */
export default function OpenScopesPage() {
  const { t } = useTranslation('open-scopes');
  const [search] = useSearchParams();
  const filter = readFilter(search);
  const list = useInfiniteQuery(openScopesQuery(filter));
  useLiveHints({
    scopes: () => [openScopesKeys.all],
    scope: () => [openScopesKeys.all],
    own_bid: () => [openScopesKeys.all],
  });
  const scopes = list.data?.pages.flatMap((page) => page.items) ?? [];
  useSayNewOnes(scopes.map((scope) => scope.id));
  return (
    <Page title={t('title')} lead={t('lead')} width="wide">
      <Filters filter={filter} />
      {list.isPending && <Loading />}
      {list.isError && <QueryErrorState error={list.error} onRetry={() => void list.refetch()} />}
      {list.isSuccess && scopes.length === 0 && <NoScopes isFiltered={Object.keys(filter).length > 0} />}
      <ul className={styles.cards}>
        {scopes.map((scope) => (
          <li key={scope.id}>
            <ScopeCard scope={scope} />
          </li>
        ))}
      </ul>
      <MoreButton list={list}>{t('more')}</MoreButton>
    </Page>
  );
}

function NoScopes({ isFiltered }: { isFiltered: boolean }) {
  const { t } = useTranslation('open-scopes');
  return (
    <EmptyState
      drawing={
        <CutSketch
          cuts={[
            { kind: 'trench', lengthFt: 20, widthFt: 2, thicknessIn: 6, endCuts: 2, count: 1 },
            { kind: 'core', diameterIn: 6, depthIn: 6, count: 3 },
          ]}
          look="card"
        />
      }
      title={t(isFiltered ? 'empty.filtered' : 'empty.title')}
      text={t(isFiltered ? 'empty.filteredText' : 'empty.text')}
    />
  );
}

/** One sentence when scopes arrive while the page is open; the announcer keeps them apart in time. */
function useSayNewOnes(ids: readonly string[]): void {
  const { t } = useTranslation('open-scopes');
  const announce = useAnnounce();
  const seen = useRef<Set<string> | null>(null);
  useEffect(() => {
    if (ids.length === 0 && seen.current === null) return;
    const known = seen.current;
    const fresh = known === null ? 0 : ids.filter((id) => !known.has(id)).length;
    seen.current = new Set([...(known ?? []), ...ids]);
    if (fresh > 0) announce(t('arrived', { count: fresh }));
  }, [ids, announce, t]);
}
