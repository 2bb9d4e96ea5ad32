import type { ScopeDetailView, ScopeDraft } from '@kerfyard/common/scopes';
import { useQueryClient } from '@tanstack/react-query';
import { useEffect, useState, useSyncExternalStore } from 'react';
import { readTail } from '../../../lib/draft-tail.ts';
import { rememberDraft, saveDraft } from '../api/scope.mutations.ts';
import { DraftSaver, tailKey, type SaveState } from '../draft-saver.ts';
import { fromDraft, toDraft } from '../scope-form-values.ts';

/** The order of a draft's fields as the form writes them, so that the same content is the same text. */
export function asTyped(draft: ScopeDraft): ScopeDraft {
  return toDraft(fromDraft(draft), draft.cuts);
}

/** What this tab has kept of a draft and the server has not: of the same version, or it would undo others' work. */
export function keptTail(scopeId: string, version: number): ScopeDraft | null {
  const tail = readTail(tailKey(scopeId)) as { version?: unknown; draft?: unknown } | null | undefined;
  if (typeof tail !== 'object' || tail === null || tail.version !== version) return null;
  const draft = tail.draft as Partial<ScopeDraft> | null | undefined;
  return typeof draft === 'object' && draft !== null && Array.isArray(draft.cuts)
    ? (draft as ScopeDraft)
    : null;
}

/**
 * Keep a draft saved while it is typed.
 * @param typed the draft as the form has it now
 */
export function useSavedDraft(
  scope: ScopeDetailView & { draft: NonNullable<ScopeDetailView['draft']> },
  typed: ScopeDraft,
): { saver: DraftSaver; state: SaveState } {
  const client = useQueryClient();
  const [saver] = useState(
    () =>
      new DraftSaver({
        scopeId: scope.id,
        version: scope.draft.version,
        draft: asTyped(scope.draft.body),
        send: (version, draft) => saveDraft(scope.id, version, draft),
        onSaved: (version, draft) => rememberDraft(client, scope.id, { version, body: draft }),
      }),
  );
  useEffect(() => saver.change(typed), [saver, typed]);
  useEffect(() => () => saver.leave(), [saver]);
  const state = useSyncExternalStore(saver.subscribe, saver.current);
  return { saver, state };
}
