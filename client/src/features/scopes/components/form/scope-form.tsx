import type { ScopeDetailView } from '@kerfyard/common/scopes';
import { Button, Callout, Flex } from '@radix-ui/themes';
import { useQueryClient } from '@tanstack/react-query';
import { useCallback, useDeferredValue, useEffect, useMemo, useRef, useState } from 'react';
import { FormProvider, useForm, useFormContext, useWatch } from 'react-hook-form';
import { useTranslation } from 'react-i18next';
import { useAnnounce } from '../../../../components/announcer.tsx';
import { FormLabels } from '../../../../components/form/form-labels.ts';
import { FormSummary } from '../../../../components/form/form-summary.tsx';
import { TextField } from '../../../../components/form/fields.tsx';
import formStyles from '../../../../components/form/form.module.css';
import { issuesOf } from '../../../../lib/app-form.ts';
import { dropTail } from '../../../../lib/draft-tail.ts';
import { useCan } from '../../../session/hooks/use-session.ts';
import { usePublish } from '../../api/scope.mutations.ts';
import { scopeKeys, scopeQuery } from '../../api/scope.queries.ts';
import type { DraftCut } from '../../cut-lines.ts';
import { tailKey } from '../../draft-saver.ts';
import { useDraftIssues } from '../../hooks/use-draft-issues.ts';
import { keptTail, useSavedDraft } from '../../hooks/use-saved-draft.ts';
import type { SortedIssues } from '../../issues.ts';
import { fromDraft, toDraft, type ScopeFormValues } from '../../scope-form-values.ts';
import { BiddingFields } from './bidding-fields.tsx';
import { ConditionFields } from './condition-fields.tsx';
import { CutListEditor } from './cut-list-editor.tsx';
import listStyles from './cut-list.module.css';
import { CutQuantities } from './cut-quantities.tsx';
import { MethodPicker } from './method-picker.tsx';
import { PublishBar } from './publish-bar.tsx';
import { ResponsibilityFields } from './responsibility-fields.tsx';
import { ScopeFiles } from './scope-files.tsx';
import styles from './scope-form.module.css';
import { FormSection } from './section.tsx';
import { SiteFields } from './site-fields.tsx';
import { TermFields } from './term-fields.tsx';
import { useCutList, type CutListChange } from './use-cut-list.ts';
import { useSummaryLines } from './use-summary-lines.ts';

export type DraftScope = ScopeDetailView & { draft: NonNullable<ScopeDetailView['draft']> };

/** A scope in the making: kept at the server as it is typed, its quantities live, published in one step. */
export function ScopeForm({ scope, onReload }: { scope: DraftScope; onReload: () => void }) {
  const { t } = useTranslation('scopes');
  const can = useCan();
  const [start] = useState(() => keptTail(scope.id, scope.draft.version) ?? scope.draft.body);
  const form = useForm<ScopeFormValues>({ defaultValues: fromDraft(start) });
  const { lines, change } = useCutList(start.cuts);
  const values = useWatch({ control: form.control }) as ScopeFormValues;
  const typed = useMemo(() => toDraft(values, [...lines]), [values, lines]);
  const { saver, state } = useSavedDraft(scope, typed);
  // What is only shown follows the typing a moment behind when the list is long.
  const settled = useDeferredValue(typed);
  const settledLines = useDeferredValue(lines);
  const { shown, inspect, fromServer } = useDraftIssues(form, settled);
  const labels = useLabels();
  const summary = useSummaryLines(shown.all, labels.texts, lines);
  const [reveals, setReveals] = useState(0);
  const summaryBox = useSummaryFocus(reveals);
  const publish = usePublishing(scope.id, () => saver.flush(), fromServer);
  return (
    <FormProvider {...form}>
      <FormLabels value={labels.context}>
        <form
          noValidate
          className={`${formStyles.form} ${styles.form}`}
          aria-label={t('form.label')}
          onSubmit={(event) => event.preventDefault()}
        >
          <div ref={summaryBox}>
            <FormSummary what={undefined} next={undefined} lines={summary} onChoose={focusField} />
          </div>
          {state.kind === 'conflict' && (
            <Conflict
              scopeId={scope.id}
              keepMine={(version) => saver.keepMine(version)}
              onReload={onReload}
            />
          )}
          <Sections scope={scope} lines={lines} settledLines={settledLines} change={change} shown={shown} />
          <PublishBar
            state={state}
            mayPublish={can('scope.write')}
            due={{
              at: values.bidding.dueAt,
              timeZone: values.site.timeZone === '' ? 'UTC' : values.site.timeZone,
              mode: values.bidding.mode,
            }}
            mayAsk={() => {
              const isWhole = inspect(typed);
              if (!isWhole) setReveals((count) => count + 1);
              return isWhole;
            }}
            onPublish={publish}
          />
        </form>
      </FormLabels>
    </FormProvider>
  );
}

/** Everything a scope says, in the order a crew reads it. */
function Sections(props: {
  scope: DraftScope;
  lines: readonly DraftCut[];
  /** The lines a moment later: what is only shown must not hold up the typing. */
  settledLines: readonly DraftCut[];
  change: (change: CutListChange) => void;
  shown: SortedIssues;
}) {
  const { scope, lines, settledLines, change, shown } = props;
  const { t } = useTranslation('scopes');
  const { control } = useFormContext<ScopeFormValues>();
  return (
    <>
      <FormSection title={t('form.what')}>
        <TextField control={control} name="title" label={t('form.title')} maxLength={140} />
        <TextField
          control={control}
          name="summary"
          label={t('form.summary')}
          hint={t('form.summaryHint')}
          optional
          lines={3}
          maxLength={2000}
        />
      </FormSection>
      <FormSection title={t('site.title')}>
        <SiteFields />
      </FormSection>
      <FormSection title={t('cuts.title')} lead={t('cuts.lead')}>
        <div className={listStyles.grid}>
          <CutListEditor lines={lines} change={change} errors={shown.cuts} error={shown.cutList} />
          <CutQuantities lines={settledLines} />
        </div>
      </FormSection>
      <FormSection title={t('conditions.title')}>
        <ConditionFields lines={settledLines} />
      </FormSection>
      <FormSection title={t('methods.title')} lead={t('methods.lead')}>
        <MethodPicker lines={settledLines} />
      </FormSection>
      <FormSection title={t('files.title')} lead={t('files.lead')}>
        <ScopeFiles scopeId={scope.id} files={scope.files} />
      </FormSection>
      <FormSection title={t('sheet.title')} lead={t('sheet.lead')}>
        <ResponsibilityFields lines={settledLines} errors={shown.sheet} />
      </FormSection>
      <FormSection title={t('terms.title')}>
        <TermFields />
      </FormSection>
      <FormSection title={t('bidding.title')}>
        <BiddingFields />
      </FormSection>
    </>
  );
}

/** Save what is typed, then publish that very version; what the server finds wrong goes beside its field. */
function usePublishing(
  scopeId: string,
  flush: () => Promise<number>,
  onIssues: ReturnType<typeof useDraftIssues>['fromServer'],
): () => Promise<unknown> {
  const { t } = useTranslation('scopes');
  const publish = usePublish(scopeId);
  const announce = useAnnounce();
  return async () => {
    try {
      const version = await flush();
      const published = await publish.mutateAsync(version);
      dropTail(tailKey(scopeId));
      announce(t('publish.done'));
      return published;
    } catch (error) {
      if (issuesOf(error).length > 0) onIssues(issuesOf(error));
      throw error;
    }
  };
}

/** Someone saved the same draft meanwhile: either theirs is loaded, or this one replaces it. */
function Conflict(props: {
  scopeId: string;
  keepMine: (serverVersion: number) => Promise<void>;
  onReload: () => void;
}) {
  const { t } = useTranslation('scopes');
  const client = useQueryClient();
  const [failed, setFailed] = useState(false);
  const keep = async () => {
    try {
      const newest = await client.fetchQuery({ ...scopeQuery(props.scopeId), staleTime: 0 });
      if (newest.draft !== null) await props.keepMine(newest.draft.version);
    } catch {
      setFailed(true);
    }
  };
  const load = async () => {
    dropTail(tailKey(props.scopeId));
    await client.invalidateQueries({ queryKey: scopeKeys.one(props.scopeId) });
    props.onReload();
  };
  return (
    <Callout.Root color="amber" role="alert">
      <Callout.Text>{t(failed ? 'conflict.failed' : 'conflict.what')}</Callout.Text>
      <Flex gap="3" wrap="wrap">
        <Button type="button" size="3" onClick={() => void load()}>
          {t('conflict.load')}
        </Button>
        <Button type="button" size="3" variant="soft" onClick={() => void keep()}>
          {t('conflict.keep')}
        </Button>
      </Flex>
    </Callout.Root>
  );
}

/** Pressing Publish on a draft that is not whole leads to the list of what is missing. */
function useSummaryFocus(reveals: number) {
  const box = useRef<HTMLDivElement>(null);
  useEffect(() => {
    if (reveals === 0) return;
    box.current?.scrollIntoView({ block: 'center' });
    box.current?.querySelector<HTMLElement>('button')?.focus({ preventScroll: true });
  }, [reveals]);
  return box;
}

function useLabels() {
  const [texts, setTexts] = useState<Readonly<Record<string, string>>>({});
  const register = useCallback((name: string, text: string) => {
    setTexts((known) => (known[name] === text ? known : { ...known, [name]: text }));
  }, []);
  const context = useMemo(() => ({ register }), [register]);
  return { texts, context };
}

function focusField(name: string): void {
  const found = document.getElementsByName(name)[0];
  found?.scrollIntoView({ block: 'center' });
  found?.focus({ preventScroll: true });
}
