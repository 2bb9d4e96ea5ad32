import type { FieldIssue } from '@kerfyard/common/errors';
import { checkDraft, type ScopeDraft } from '@kerfyard/common/scopes';
import { useCallback, useEffect, useMemo, useState } from 'react';
import type { FieldPath, UseFormReturn } from 'react-hook-form';
import { now } from '../../../lib/clock.ts';
import '../../../lib/zod-words.ts';
import { noIssues, sortIssues, type SortedIssues } from '../issues.ts';
import type { ScopeFormValues } from '../scope-form-values.ts';

/**
 * What keeps a draft from being published. Nothing is said before the first try; from then on each complaint goes
 * as soon as it is answered.
 */
export function useDraftIssues(
  form: UseFormReturn<ScopeFormValues>,
  draft: ScopeDraft,
): {
  shown: SortedIssues;
  /** Look the newest draft over: whether it may be published. If not, everything that is wrong is shown. */
  inspect: (newest: ScopeDraft) => boolean;
  /** Complaints only the server has; they stand until something is changed. */
  fromServer: (issues: readonly FieldIssue[]) => void;
} {
  const [isRevealed, setRevealed] = useState(false);
  const [server, setServer] = useState<{ draft: ScopeDraft; issues: readonly FieldIssue[] } | null>(null);
  const shown = useMemo(() => {
    if (!isRevealed) return noIssues;
    const check = checkDraft(draft, now());
    const own = check.ok ? [] : check.issues;
    return sortIssues(server?.draft === draft ? [...server.issues, ...own] : own);
  }, [isRevealed, server, draft]);
  useEffect(() => {
    form.clearErrors();
    for (const { path, message } of shown.fields) {
      form.setError(path as FieldPath<ScopeFormValues>, { type: 'draft', message });
    }
  }, [form, shown]);
  const inspect = useCallback((newest: ScopeDraft) => {
    const { ok } = checkDraft(newest, now());
    if (!ok) setRevealed(true);
    return ok;
  }, []);
  const fromServer = useCallback(
    (issues: readonly FieldIssue[]) => {
      setRevealed(true);
      setServer({ draft, issues });
    },
    [draft],
  );
  return { shown, inspect, fromServer };
}
