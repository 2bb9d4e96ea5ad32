import { AppError } from '../platform/http/app-error.ts';

export interface LinkStateRow {
  is_used: boolean;
  is_expired: boolean;
}

/**
 * Why a link does not work. Telling is safe: whoever sends a token that was once ours had the mail. A half-copied one
 * fits no row and reads as one that was never ours.
 */
export function deadLink(state: LinkStateRow | null): AppError {
  if (state === null) return new AppError('link_unknown');
  return new AppError(state.is_used ? 'link_used' : state.is_expired ? 'link_expired' : 'link_unknown');
}
