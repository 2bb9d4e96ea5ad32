import type { Actor } from '@kerfyard/common/people';
import type { UnitOfWork, Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { COUNT_OTHER_OWNERS, LOCK_COMPANY, SELECT_MEMBER, type MemberRow } from './members.queries.ts';

export function companyOf(actor: Actor): string {
  if (actor.company === null) throw new AppError('forbidden');
  return actor.company.id;
}

/** A colleague under the company's lock, so that two changes to who owns it stand in a row. */
export async function lockMember(
  uow: UnitOfWork,
  tx: Tx,
  companyId: string,
  userId: string,
): Promise<MemberRow> {
  await uow.rows(tx, LOCK_COMPANY, [companyId]);
  const member = await uow.row<MemberRow>(tx, SELECT_MEMBER, [companyId, userId]);
  if (member === null) throw new AppError('not_found');
  return member;
}

/** @throws AppError last_owner when nobody else would own the company */
export async function demandAnotherOwner(
  uow: UnitOfWork,
  tx: Tx,
  companyId: string,
  userId: string,
): Promise<void> {
  const row = await uow.row<{ owners: number }>(tx, COUNT_OTHER_OWNERS, [companyId, userId]);
  if ((row?.owners ?? 0) === 0) throw new AppError('last_owner');
}
