import { useInfiniteQuery } from '@tanstack/react-query';
import { useTranslation } from 'react-i18next';
import { useSearchParams, type LoaderFunctionArgs } from 'react-router-dom';
import { CutSketch } from '../components/cut-sketch.tsx';
import { ButtonLink } from '../components/link.tsx';
import { MoreButton } from '../components/more-button.tsx';
import { Page } from '../components/page.tsx';
import { EmptyState, Loading, QueryErrorState } from '../components/states.tsx';
import { ownScopesQuery, scopeKeys } from '../features/scopes/api/scope.queries.ts';
import { OwnScopeCard } from '../features/scopes/components/own-scope-card.tsx';
import listStyles from '../features/scopes/components/own-scopes.module.css';
import { readStatus, StatusFilter } from '../features/scopes/components/status-filter.tsx';
import { useCan } from '../features/session/hooks/use-session.ts';
import { useLiveHints } from '../lib/live.ts';
import { paths } from '../lib/paths.ts';
import { queryClient } from '../lib/query-client.ts';

export function loader({ request }: LoaderFunctionArgs) {
  void queryClient.prefetchInfiniteQuery(ownScopesQuery(readStatus(new URL(request.url).searchParams)));
  return null;
}

/** A general contractor's scopes, newest change first; bid counts are live. */
export default function ScopesPage() {
  const { t } = useTranslation('scopes');
  const [search] = useSearchParams();
  const status = readStatus(search);
  const list = useInfiniteQuery(ownScopesQuery(status));
  const can = useCan();
  const changed = () => [scopeKeys.ownLists];
  useLiveHints({ scopes: changed, scope: changed, bids: changed });
  const scopes = list.data?.pages.flatMap((page) => page.items) ?? [];
  const begin = can('scope.write') ? (
    <ButtonLink to={paths.newScope} size="3">
      {t('new')}
    </ButtonLink>
  ) : undefined;
  return (
    <Page title={t('title')} lead={t('lead')} width="wide" actions={begin}>
      <StatusFilter status={status} />
      {list.isPending && <Loading />}
      {list.isError && <QueryErrorState error={list.error} onRetry={() => void list.refetch()} />}
      {list.isSuccess && scopes.length === 0 && <NoScopes isFiltered={status !== undefined} action={begin} />}
      <ul className={listStyles.cards}>
        {scopes.map((scope) => (
          <li key={scope.id}>
            <OwnScopeCard scope={scope} />
          </li>
        ))}
      </ul>
      <MoreButton list={list}>{t('more')}</MoreButton>
    </Page>
  );
}

function NoScopes({ isFiltered, action }: { isFiltered: boolean; action: React.ReactNode }) {
  const { t } = useTranslation('scopes');
  if (isFiltered) return <EmptyState title={t('empty.filtered')} text={t('empty.filteredText')} />;
  return (
    <EmptyState
      drawing={
        <CutSketch
          look="card"
          cuts={[
            {
              kind: 'opening',
              lengthFt: 8,
              widthFt: 4,
              thicknessIn: 8,
              corners: 'overcut',
              bladeDiameterIn: 24,
              count: 1,
            },
            { kind: 'trench', lengthFt: 16, widthFt: 2, thicknessIn: 6, endCuts: 2, count: 1 },
          ]}
        />
      }
      title={t('empty.title')}
      text={t('empty.text')}
      action={action}
    />
  );
}
