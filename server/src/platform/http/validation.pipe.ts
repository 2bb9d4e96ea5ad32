import { Injectable, StandardSchemaValidationPipe, type ArgumentMetadata } from '@nestjs/common';
import type { FieldIssue } from '@kerfyard/common/errors';
import { AppError } from './app-error.ts';

interface SchemaIssue {
  message: string;
  path?: readonly (PropertyKey | { key: PropertyKey })[] | undefined;
  /** zod: the names of unknown fields, reported at their parent. */
  keys?: string[];
}

const MAX_ISSUES = 200;

/**
 * Checks `@Body`, `@Query` and `@Param` against their `schema`, all faults at once. A path parameter of the wrong form
 * names nothing that exists, so it answers as a missing thing does.
 */
@Injectable()
export class ValidationPipe extends StandardSchemaValidationPipe {
  constructor() {
    super({
      exceptionFactory: (issues) =>
        new AppError('invalid_input', { fields: toFieldIssues(issues as readonly SchemaIssue[]) }),
    });
  }

  override async transform<T = unknown>(value: T, metadata: ArgumentMetadata): Promise<T> {
    try {
      return (await super.transform(value, metadata)) as T;
    } catch (error) {
      if (metadata.type === 'param' && error instanceof AppError) throw new AppError('not_found');
      throw error;
    }
  }
}

/** Issues of a schema as the answer carries them: dotted paths, unknown fields one by one. */
export function toFieldIssues(issues: readonly SchemaIssue[]): FieldIssue[] {
  return issues.slice(0, MAX_ISSUES).flatMap((issue) => {
    const path = (issue.path ?? []).map((part) => String(typeof part === 'object' ? part.key : part));
    if (issue.keys === undefined) return [{ path: path.join('.'), message: issue.message }];
    return issue.keys
      .slice(0, MAX_ISSUES)
      .map((key) => ({ path: [...path, key].join('.'), message: 'Not a field here' }));
  });
}
