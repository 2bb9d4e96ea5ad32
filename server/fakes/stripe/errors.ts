/** The part of an error body that a caller may read (docs.stripe.com/api/errors). */
export interface ErrorBody {
  type: 'api_error' | 'card_error' | 'idempotency_error' | 'invalid_request_error';
  message: string;
  code?: string;
  decline_code?: string;
  param?: string;
  charge?: string;
  doc_url?: string;
  request_log_url?: string;
  advice_code?: string;
  payment_intent?: unknown;
  payment_method?: unknown;
}

/** An answer that is not a success. `keepsEffects`: what was changed on the way stays (a declined charge exists). */
export class StripeError extends Error {
  constructor(
    readonly status: number,
    readonly body: ErrorBody,
    readonly keepsEffects = false,
  ) {
    super(body.message);
  }
}

/** 400 `invalid_request_error`. */
export function invalidRequest(message: string, extra: { code?: string; param?: string } = {}): StripeError {
  return new StripeError(400, { type: 'invalid_request_error', message, ...extra });
}

/** 404 for an id in the path; 400 when the id came as the parameter `param`. */
export function resourceMissing(noun: string, id: string, param?: string): StripeError {
  return new StripeError(param === undefined ? 404 : 400, {
    type: 'invalid_request_error',
    code: 'resource_missing',
    message: `No such ${noun}: '${id}'`,
    param: param ?? 'id',
  });
}

/** 400 when a balance does not cover what is asked of it. */
export function balanceInsufficient(message: string): StripeError {
  return invalidRequest(message, { code: 'balance_insufficient' });
}

/** 401 without a usable key. */
export function unauthorized(message: string): StripeError {
  return new StripeError(401, { type: 'invalid_request_error', message });
}

/** Printed form of an error answer. */
export function errorAnswer(error: StripeError): { error: ErrorBody } {
  const { code } = error.body;
  return {
    error: code
      ? { ...error.body, doc_url: `https://stripe.com/docs/error-codes/${code.replaceAll('_', '-')}` }
      : error.body,
  };
}
