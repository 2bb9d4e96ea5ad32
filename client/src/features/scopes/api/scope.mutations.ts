import type { FileView } from '@kerfyard/common/files';
import type { ScopeDetailView, ScopeDraft } from '@kerfyard/common/scopes';
import { useMutation, useQueryClient, type QueryClient } from '@tanstack/react-query';
import { api } from '../../../lib/api-client.ts';
import { scopeKeys } from './scope.queries.ts';

/** Begin a draft; the id is made here, so the same press sent twice begins one. */
export function createScope(id: string, draft: ScopeDraft): Promise<ScopeDetailView> {
  return api.post<ScopeDetailView>('/api/scopes', { id, draft }, { idempotencyKey: id });
}

export function saveDraft(scopeId: string, version: number, draft: ScopeDraft): Promise<{ version: number }> {
  return api.put<{ version: number }>(`/api/scopes/${scopeId}/draft`, { version, draft });
}

/** What is cached of a scope follows what was just saved, so that coming back to the page shows it. */
export function rememberDraft(
  client: QueryClient,
  scopeId: string,
  draft: { version: number; body: ScopeDraft },
): void {
  client.setQueryData<ScopeDetailView>(scopeKeys.one(scopeId), (known) => known && { ...known, draft });
  void client.invalidateQueries({ queryKey: scopeKeys.ownLists, refetchType: 'none' });
}

function useScopeMutation<Input>(scopeId: string, mutationFn: (input: Input) => Promise<ScopeDetailView>) {
  const client = useQueryClient();
  return useMutation({
    mutationFn,
    onSuccess: (scope) => {
      client.setQueryData(scopeKeys.one(scopeId), scope);
      return client.invalidateQueries({ queryKey: scopeKeys.ownLists });
    },
  });
}

/** Make the draft's version revision 1; it never changes afterwards. */
export function usePublish(scopeId: string) {
  return useScopeMutation(scopeId, (version: number) =>
    api.post<ScopeDetailView>(`/api/scopes/${scopeId}/publish`, { version }),
  );
}

export function useWithdrawScope(scopeId: string) {
  return useScopeMutation(scopeId, () => api.post<ScopeDetailView>(`/api/scopes/${scopeId}/withdraw`));
}

/** Close without an award; the bidders are told the reason. */
export function useCloseScope(scopeId: string) {
  return useScopeMutation(scopeId, (reason: string) =>
    api.post<ScopeDetailView>(`/api/scopes/${scopeId}/close`, { reason }),
  );
}

/** Throw a draft away. */
export function useDiscardScope(scopeId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: () => api.delete<void>(`/api/scopes/${scopeId}`),
    onSuccess: () => client.invalidateQueries({ queryKey: scopeKeys.ownLists }),
  });
}

function setFiles(client: QueryClient, scopeId: string, files: (known: FileView[]) => FileView[]): void {
  client.setQueryData<ScopeDetailView>(
    scopeKeys.one(scopeId),
    (known) => known && { ...known, files: files(known.files) },
  );
}

/** Show an uploaded file with the draft, or change its caption. */
export function useAttachFile(scopeId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (input: { fileId: string; caption: string }) =>
      api.post<FileView[]>(`/api/scopes/${scopeId}/files`, input),
    onSuccess: (files) => setFiles(client, scopeId, () => files),
  });
}

export function useDetachFile(scopeId: string) {
  const client = useQueryClient();
  return useMutation({
    mutationFn: (fileId: string) => api.delete<void>(`/api/scopes/${scopeId}/files/${fileId}`),
    onSuccess: (_, fileId) =>
      setFiles(client, scopeId, (known) => known.filter((file) => file.id !== fileId)),
  });
}
