import { useQuery } from '@tanstack/react-query';
import { useState } from 'react';
import { useTranslation } from 'react-i18next';
import { useNavigate, useParams, type LoaderFunctionArgs } from 'react-router-dom';
import { ConfirmDialog } from '../components/confirm-dialog.tsx';
import { Page } from '../components/page.tsx';
import { Loading, QueryErrorState } from '../components/states.tsx';
import { Button } from '@radix-ui/themes';
import { useDiscardScope } from '../features/scopes/api/scope.mutations.ts';
import { scopeKeys, scopeQuery } from '../features/scopes/api/scope.queries.ts';
import { ScopeForm, type DraftScope } from '../features/scopes/components/form/scope-form.tsx';
import { OwnScope } from '../features/scopes/components/own-scope.tsx';
import { ScopeStatusWord } from '../features/scopes/components/scope-status.tsx';
import { useCan } from '../features/session/hooks/use-session.ts';
import { dropTail } from '../lib/draft-tail.ts';
import { useLiveHints, useWatch } from '../lib/live.ts';
import { paths } from '../lib/paths.ts';
import { queryClient } from '../lib/query-client.ts';
import { tailKey } from '../features/scopes/draft-saver.ts';

export function loader({ params }: LoaderFunctionArgs) {
  void queryClient.prefetchQuery(scopeQuery(params.scopeId ?? ''));
  return null;
}

/** One scope of one's own company: its form while it is a draft, afterwards what was published and who bids. */
export default function ScopePage() {
  const { t } = useTranslation('scopes');
  const { scopeId = '' } = useParams();
  const scope = useQuery(scopeQuery(scopeId));
  useWatch('scope', scopeId);
  useLiveHints({
    scope: (hint) => (hint.scopeId === scopeId ? [scopeKeys.one(scopeId)] : []),
    bids: (hint) => (hint.scopeId === scopeId ? [scopeKeys.one(scopeId)] : []),
  });
  if (scope.data !== undefined) {
    const { draft } = scope.data;
    return draft !== null ? (
      <DraftPage key={scopeId} scope={{ ...scope.data, draft }} isFresh={!scope.isFetching} />
    ) : (
      <OwnScope scope={scope.data} onDue={() => void scope.refetch()} />
    );
  }
  return (
    <Page title={t('title')}>
      {scope.isError ? (
        <QueryErrorState error={scope.error} onRetry={() => void scope.refetch()} />
      ) : (
        <Loading />
      )}
    </Page>
  );
}

/** The form begins from what the server has now, not from what this tab saw some time ago. */
function DraftPage({ scope, isFresh }: { scope: DraftScope; isFresh: boolean }) {
  const { t } = useTranslation('scopes');
  const [begun, setBegun] = useState(isFresh ? 1 : 0);
  if (begun === 0 && isFresh) setBegun(1);
  const can = useCan();
  return (
    <Page
      title={scope.draft.body.title.trim() === '' ? t('untitled') : scope.draft.body.title}
      lead={
        <>
          <ScopeStatusWord status={scope.status} /> {scope.number}
        </>
      }
      actions={can('scope.write') ? <Discard scopeId={scope.id} /> : undefined}
    >
      {begun === 0 ? (
        <Loading />
      ) : (
        <ScopeForm key={begun} scope={scope} onReload={() => setBegun((count) => count + 1)} />
      )}
    </Page>
  );
}

function Discard({ scopeId }: { scopeId: string }) {
  const { t } = useTranslation('scopes');
  const discard = useDiscardScope(scopeId);
  const navigate = useNavigate();
  return (
    <ConfirmDialog
      trigger={
        <Button variant="soft" color="gray" size="3">
          {t('form.discard')}
        </Button>
      }
      title={t('form.discardTitle')}
      text={t('form.discardText')}
      confirm={t('form.discard')}
      destructive
      onConfirm={async () => {
        await discard.mutateAsync();
        dropTail(tailKey(scopeId));
        await navigate(paths.scopes);
        queryClient.removeQueries({ queryKey: scopeKeys.one(scopeId) });
      }}
    />
  );
}
