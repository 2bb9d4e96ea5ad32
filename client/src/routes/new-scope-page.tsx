import { useMutation } from '@tanstack/react-query';
import { useEffect } from 'react';
import { useTranslation } from 'react-i18next';
import { useNavigate } from 'react-router-dom';
import { Page } from '../components/page.tsx';
import { Loading, QueryErrorState } from '../components/states.tsx';
import { createScope } from '../features/scopes/api/scope.mutations.ts';
import { scopeKeys } from '../features/scopes/api/scope.queries.ts';
import { emptyScope, toDraft } from '../features/scopes/scope-form-values.ts';
import { paths } from '../lib/paths.ts';
import { queryClient } from '../lib/query-client.ts';
import { useFormId } from '../lib/use-form-id.ts';

/** Begins a draft and goes to it: from then on everything typed has a place at the server. */
export default function NewScopePage() {
  const { t } = useTranslation('scopes');
  const navigate = useNavigate();
  const { id } = useFormId();
  const begin = useMutation({
    mutationFn: () => createScope(id, toDraft(emptyScope, [])),
    onSuccess: async (scope) => {
      queryClient.setQueryData(scopeKeys.one(id), scope);
      await queryClient.invalidateQueries({ queryKey: scopeKeys.ownLists });
      await navigate(paths.scope(id), { replace: true });
    },
  });
  const { mutate } = begin;
  useEffect(() => mutate(), [mutate]);
  return (
    <Page title={t('begin.title')}>
      {begin.isError ? (
        <QueryErrorState error={begin.error} onRetry={() => mutate()} />
      ) : (
        <Loading what={t('begin.working')} />
      )}
    </Page>
  );
}
