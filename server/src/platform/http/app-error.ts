import { errorCatalogue, type ErrorCode, type FieldIssue } from '@kerfyard/common/errors';

/** The error services throw; the one filter turns it into the catalogue's answer. */
export class AppError extends Error {
  constructor(
    readonly code: ErrorCode,
    readonly details: { fields?: FieldIssue[]; retryAfterSeconds?: number; message?: string } = {},
  ) {
    super(details.message ?? errorCatalogue[code].message);
    this.name = 'AppError';
  }

  get status(): number {
    return errorCatalogue[this.code].status;
  }

  /** One complaint about one field, as 422. */
  static field(path: string, message: string): AppError {
    return new AppError('invalid_input', { fields: [{ path, message }] });
  }
}
