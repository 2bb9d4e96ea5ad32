/**
 * The one catalogue of errors: code, HTTP status, and the English sentence a person reads. The client shows
 * the sentence (or its translation under the same code); the server never invents a status elsewhere.
 */
export const errorCatalogue = {
  unreadable_body: { status: 400, message: 'The request could not be read.' },
  bad_signature: { status: 400, message: 'The signature does not match.' },
  unauthenticated: { status: 401, message: 'Please sign in.' },
  wrong_credentials: {
    status: 401,
    message: 'That e-mail and password do not match an account that can sign in.',
  },
  second_factor_needed: { status: 401, message: 'Now the code from your authenticator app.' },
  wrong_code: { status: 401, message: 'That code does not fit, or was used before. Take the next one.' },
  confirm_with_password: { status: 403, message: 'Say again who you are, with your password.' },
  confirm_with_code: {
    status: 403,
    message: 'Say again who you are, with a code from your authenticator app.',
  },
  second_factor_required: {
    status: 403,
    message: 'Set up a second factor before you move money. Your account page does it in a minute.',
  },
  forbidden: { status: 403, message: 'Your role does not allow this.' },
  not_from_here: { status: 403, message: 'The request did not come from this site.' },
  over_limit: { status: 403, message: 'This is above your limit in dollars. Ask an owner of your company.' },
  not_found: { status: 404, message: 'Not found, or not yours to see.' },
  illegal_move: {
    status: 409,
    message: 'This cannot be done in its present state. The page shows the newest state.',
  },
  stale_version: {
    status: 409,
    message: 'Someone changed this meanwhile. Look at the newest version and try again.',
  },
  last_owner: {
    status: 409,
    message: 'A company keeps at least one owner. Make another person owner first.',
  },
  link_used: { status: 409, message: 'This link was used already. A link works once.' },
  link_expired: { status: 409, message: 'This link has run out or was taken back. Ask for a new one.' },
  has_account: {
    status: 409,
    message: 'This address has an account already, and an account belongs to one company.',
  },
  already_awarded: { status: 409, message: 'This scope has been awarded already.' },
  bids_closed: { status: 409, message: 'Bids were due; this one came too late.' },
  not_due_yet: { status: 409, message: 'Sealed bids open at the due time, not before.' },
  stale_revision: { status: 409, message: 'The scope has a newer revision. Look at it, then bid on it.' },
  bid_must_go_down: { status: 409, message: 'A ranked bid can only go down, by at least 1 % and $10.' },
  bid_revisions_used: { status: 409, message: 'A ranked bid can be revised five times.' },
  bid_withdrawn: { status: 409, message: 'A withdrawn ranked bid is final.' },
  window_taken: { status: 409, message: 'That crew or truck is already booked in this window.' },
  lines_not_set_aside: { status: 409, message: 'A visit starts when the money for its lines is set aside.' },
  already_set_aside: {
    status: 409,
    message: 'Money for this line is set aside already, or a payment for it is under way.',
  },
  already_released: { status: 409, message: 'This has been released already.' },
  profile_incomplete: {
    status: 409,
    message: 'Something is missing in the company profile before this step.',
  },
  document_changed: {
    status: 409,
    message: 'The document differs from the one you read. Open it again before signing.',
  },
  key_reused: { status: 409, message: 'This request key was used for something else.' },
  request_running: { status: 409, message: 'The same request is still running.' },
  too_large: { status: 413, message: 'That is too large.' },
  wrong_type: { status: 415, message: 'That kind of file or body is not taken here.' },
  invalid_input: { status: 422, message: 'Some fields need another look.' },
  link_unknown: {
    status: 422,
    message: 'This link is not whole, or not one of ours. Copy all of it from the mail.',
  },
  too_many_requests: { status: 429, message: 'Too many tries. Wait a little.' },
  internal: { status: 500, message: 'Something went wrong on our side. Nothing you typed is lost.' },
  provider_unavailable: {
    status: 503,
    message: 'The payment provider does not answer. Nothing was moved; try again.',
  },
} as const satisfies Record<string, { status: number; message: string }>;

export type ErrorCode = keyof typeof errorCatalogue;

/** One complaint about one field; `path` is dotted (`cuts.2.cut.depthIn`). */
export interface FieldIssue {
  path: string;
  message: string;
}

/** The body of every error answer. */
export interface ErrorBody {
  error: { code: ErrorCode; message: string; fields?: FieldIssue[]; requestId: string };
}
