import type { Actor, InvitationOfferView, InvitationView, MemberView, Role } from '@kerfyard/common/people';
import { toInstant, toNumber } from '../platform/database/codecs.ts';
import type { InvitationRow, MemberRow } from './members.queries.ts';

interface LimitColumns {
  role: Role;
  sign_limit_cents: string | null;
  set_aside_limit_cents: string | null;
  change_limit_cents: string | null;
}

/** Limits as they count: an owner has none, whatever the row says. */
export function limitsOf(row: LimitColumns): Actor['limits'] {
  const limit = (cents: string | null) => (row.role === 'owner' ? null : toNumber(cents));
  return {
    signCents: limit(row.sign_limit_cents),
    setAsideCents: limit(row.set_aside_limit_cents),
    changeCents: limit(row.change_limit_cents),
  };
}

/** A colleague: name and role for everyone, the rest for those who manage people. */
export function presentMember(
  row: MemberRow,
  viewer: { userId: string; managesPeople: boolean },
): MemberView {
  const details = { email: row.email, limits: limitsOf(row), hasSecondFactor: row.has_second_factor };
  return {
    id: row.id,
    name: row.name,
    role: row.role,
    isActive: row.is_active,
    isSelf: row.id === viewer.userId,
    details: viewer.managesPeople ? details : null,
  };
}

/** What an owner sees of an invitation; never its token. */
export function presentInvitation(row: InvitationRow): InvitationView {
  return {
    id: row.id,
    email: row.email,
    role: row.role,
    limits: limitsOf(row),
    invitedBy: row.invited_by,
    expiresAt: toInstant(row.expires_at),
    isExpired: row.is_expired,
  };
}

/** What someone who holds the link sees before taking it up. */
export function presentOffer(row: InvitationRow): InvitationOfferView {
  return {
    email: row.email,
    company: { name: row.company_name, kind: row.company_kind },
    invitedBy: row.invited_by,
    role: row.role,
    expiresAt: toInstant(row.expires_at),
    hasAccount: row.has_account,
  };
}
