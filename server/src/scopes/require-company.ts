import type { Actor, CompanyKind } from '@kerfyard/common/people';
import { AppError } from '../platform/http/app-error.ts';

/** The actor's company when it is of this kind. @throws AppError forbidden */
export function requireCompany(actor: Actor, kind: CompanyKind): NonNullable<Actor['company']> {
  if (actor.company === null || actor.company.kind !== kind) throw new AppError('forbidden');
  return actor.company;
}
