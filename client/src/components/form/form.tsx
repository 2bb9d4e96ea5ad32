import { useCallback, useMemo, useState, type ReactNode } from 'react';
import type { FieldErrors, FieldValues, UseFormReturn } from 'react-hook-form';
import { issuesOf, showFieldIssues } from '../../lib/app-form.ts';
import { useErrorWords } from '../../lib/error-words.ts';
import { FormLabels } from './form-labels.ts';
import { FormSummary, type SummaryLine } from './form-summary.tsx';
import styles from './form.module.css';

interface FormProps<Input extends FieldValues, Output> {
  form: UseFormReturn<Input, unknown, Output>;
  /** May throw an ApiError: its field issues go beside their fields, the rest into the summary. */
  onSubmit: (values: Output) => Promise<unknown> | void;
  children: ReactNode;
  label?: string;
}

/** A form that shows what is wrong all at once: beside each field, and summed up and read out above. */
export function Form<Input extends FieldValues, Output>({
  form,
  onSubmit,
  children,
  label,
}: FormProps<Input, Output>) {
  const [labels, setLabels] = useState<Record<string, string>>({});
  const [failure, setFailure] = useState<{ error: unknown; lines: SummaryLine[] } | null>(null);
  const words = useErrorWords();
  const register = useCallback((name: string, text: string) => {
    setLabels((known) => (known[name] === text ? known : { ...known, [name]: text }));
  }, []);
  const context = useMemo(() => ({ register }), [register]);

  const send = async (values: Output) => {
    setFailure(null);
    try {
      await onSubmit(values);
    } catch (error) {
      const rest = showFieldIssues(form, issuesOf(error), Object.keys(labels));
      setFailure({ error, lines: rest.map((issue) => ({ name: null, text: issue.message })) });
    }
  };

  const wrong = linesOf(form.formState.errors, labels);
  const shown = failure === null ? null : words(failure.error);
  return (
    <FormLabels value={context}>
      <form
        noValidate
        aria-label={label}
        className={styles.form}
        onSubmit={(event) => void form.handleSubmit(send, () => setFailure(null))(event)}
      >
        <FormSummary
          what={shown?.what}
          next={shown?.next}
          lines={[...wrong, ...(failure?.lines ?? [])]}
          onChoose={(name) => form.setFocus(name as Parameters<typeof form.setFocus>[0])}
        />
        {children}
      </form>
    </FormLabels>
  );
}

/** All errors of the form, in the order of the fields, each under its field's label. */
function linesOf(errors: FieldErrors, labels: Record<string, string>): SummaryLine[] {
  return Object.entries(labels).flatMap(([name, label]) => {
    const message = messageAt(errors, name);
    return message === undefined
      ? []
      : [{ name, text: `${label}${/[?:]$/.test(label) ? '' : ':'} ${message}` }];
  });
}

function messageAt(errors: FieldErrors, name: string): string | undefined {
  let node: unknown = errors;
  for (const key of name.split('.')) {
    if (typeof node !== 'object' || node === null) return undefined;
    node = (node as Record<string, unknown>)[key];
  }
  const message = (node as { message?: unknown } | undefined)?.message;
  return typeof message === 'string' ? message : undefined;
}
