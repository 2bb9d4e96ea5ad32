import { AppError } from '../http/app-error.ts';
import { isGuessable } from './guessable-password.ts';

/**
 * A new password that an acquaintance or a list of leaked ones would not find.
 * @param ownWords name, e-mail, company: what others know about the person
 * @throws AppError invalid_input on the field `password`
 */
export function demandUnguessable(password: string, ownWords: readonly string[]): void {
  if (!isGuessable(password, ownWords)) return;
  throw AppError.field('password', 'This is among the first that are tried. A few unrelated words work well');
}
