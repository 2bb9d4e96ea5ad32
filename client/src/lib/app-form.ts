import { zodResolver } from '@hookform/resolvers/zod';
import type { FieldIssue } from '@kerfyard/common/errors';
import {
  useForm,
  type DefaultValues,
  type FieldPath,
  type FieldValues,
  type UseFormReturn,
} from 'react-hook-form';
import type { z } from 'zod';
import { isApiError } from './api-error.ts';
import './zod-words.ts';

/** A form whose values are checked by a schema of `common`, all fields at once, first on submit and then as typed. */
export function useAppForm<Input extends FieldValues, Output extends FieldValues>(options: {
  schema: z.ZodType<Output, Input>;
  defaultValues: DefaultValues<Input>;
}): UseFormReturn<Input, unknown, Output> {
  return useForm<Input, unknown, Output>({
    resolver: zodResolver(options.schema),
    defaultValues: options.defaultValues,
    mode: 'onSubmit',
    reValidateMode: 'onChange',
    shouldFocusError: true,
  });
}

/**
 * Put the server's complaints beside their fields, all at once, and the focus on the first. Issues of fields that the
 * form does not have are returned, to be shown in the summary.
 */
export function showFieldIssues<Input extends FieldValues, Output>(
  form: UseFormReturn<Input, unknown, Output>,
  issues: readonly FieldIssue[],
  knownNames: readonly string[],
): FieldIssue[] {
  const mine = issues.filter((issue) => knownNames.includes(issue.path));
  mine.forEach((issue, index) => {
    form.setError(
      issue.path as FieldPath<Input>,
      { type: 'server', message: issue.message },
      { shouldFocus: index === 0 },
    );
  });
  return issues.filter((issue) => !knownNames.includes(issue.path));
}

/** Whether an error carries field issues. */
export function issuesOf(error: unknown): readonly FieldIssue[] {
  return isApiError(error, 'invalid_input') ? error.fields : [];
}
