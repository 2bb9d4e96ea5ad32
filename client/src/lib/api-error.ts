import type { ErrorBody, ErrorCode, FieldIssue } from '@kerfyard/common/errors';

/** What a request can fail with: the server's code, or `offline` when no answer came at all. */
export type ClientErrorCode = ErrorCode | 'offline';

/** Every failed request throws one of these, and nothing else (besides an abort). */
export class ApiError extends Error {
  readonly code: ClientErrorCode;
  /** HTTP status; 0 when there was no answer. */
  readonly status: number;
  readonly fields: FieldIssue[];
  readonly requestId: string | null;

  constructor(parts: {
    code: ClientErrorCode;
    status: number;
    message: string;
    fields?: FieldIssue[] | undefined;
    requestId?: string | undefined;
  }) {
    super(parts.message);
    this.name = 'ApiError';
    this.code = parts.code;
    this.status = parts.status;
    this.fields = parts.fields ?? [];
    this.requestId = parts.requestId ?? null;
  }
}

export function isApiError(error: unknown, code?: ClientErrorCode): error is ApiError {
  return error instanceof ApiError && (code === undefined || error.code === code);
}

/** The error of an answer that is not 2xx. A body that is not ours (a proxy's page) becomes `internal`. */
export function errorFromBody(status: number, body: unknown): ApiError {
  if (isErrorBody(body)) {
    const { code, message, fields, requestId } = body.error;
    return new ApiError({ code, status, message, fields, requestId });
  }
  const code: ErrorCode = status === 401 ? 'unauthenticated' : status === 404 ? 'not_found' : 'internal';
  return new ApiError({ code, status, message: '' });
}

export function offlineError(): ApiError {
  return new ApiError({ code: 'offline', status: 0, message: '' });
}

function isErrorBody(body: unknown): body is ErrorBody {
  if (typeof body !== 'object' || body === null || !('error' in body)) return false;
  const { error } = body;
  return typeof error === 'object' && error !== null && 'code' in error && 'message' in error;
}
