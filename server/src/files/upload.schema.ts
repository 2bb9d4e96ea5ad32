import { z } from 'zod';
import type { FileKind } from '@kerfyard/common/files';
import { AppError } from '../platform/http/app-error.ts';

const uploadFieldsSchema = z.strictObject({
  kind: z.enum(['photo', 'drawing', 'document']),
  /** Set by the interceptor over whatever was sent: what the request's key stands for. */
  files: z.array(z.unknown()),
});

/**
 * The text fields of an upload, which are there only once the interceptor has read the body.
 * @throws AppError 422 naming each field that is missing, unknown or wrong
 */
export function readUploadFields(body: unknown): { kind: FileKind } {
  const parsed = uploadFieldsSchema.safeParse(body);
  if (parsed.success) return parsed.data;
  const fields = parsed.error.issues.map((issue) => ({ path: issue.path.join('.'), message: issue.message }));
  throw new AppError('invalid_input', { fields });
}

export const fileQuerySchema = z.strictObject({ size: z.enum(['thumb', 'full']).default('full') });
export type FileQuery = z.output<typeof fileQuerySchema>;
