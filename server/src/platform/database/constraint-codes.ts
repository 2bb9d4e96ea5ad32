import type { ErrorCode } from '@kerfyard/common/errors';
import { AppError } from '../http/app-error.ts';

/** The one place where a constraint's name becomes an answer for people. */
export const constraintCodes: Readonly<Record<string, ErrorCode>> = {
  app_user_email_key: 'has_account',
  award_one_standing: 'already_awarded',
  visit_crew_once: 'window_taken',
  visit_truck_once: 'window_taken',
  funding_line_once: 'already_set_aside',
  release_completion_id_key: 'already_released',
  completion_line_once: 'illegal_move',
  signature_pkey: 'illegal_move',
  message_pkey: 'key_reused',
  ledger_no_overdraft: 'illegal_move',
};

/** Unique and exclusion violations of known constraints as an AppError; anything else is null and stays a fault. */
export function databaseErrorToAppError(error: unknown): AppError | null {
  const original = (error as { original?: { constraint?: unknown } } | null)?.original;
  const name = typeof original?.constraint === 'string' ? original.constraint : '';
  const code = constraintCodes[name];
  return code === undefined ? null : new AppError(code);
}
