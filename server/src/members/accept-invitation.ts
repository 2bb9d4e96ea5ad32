import { Injectable } from '@nestjs/common';
import type { AcceptInvitation, InvitationOfferView } from '@kerfyard/common/people';
import { Accounts } from '../people/accounts.ts';
import { deadLink } from '../people/link-state.ts';
import { CLOSE_SIGN_UPS } from '../people/people.queries.ts';
import { hashToken } from '../people/verify-token.ts';
import { Audit } from '../platform/audit/audit.ts';
import type { Origin } from '../platform/auth/access.decorators.ts';
import { Passwords } from '../platform/auth/passwords.ts';
import { demandUnguessable } from '../platform/auth/unguessable.ts';
import { toNumber } from '../platform/database/codecs.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { RateLimits, type Window } from '../platform/limits/rate-limits.ts';
import { MembersMail } from './members.mail.ts';
import { presentOffer } from './members.presenter.ts';
import {
  LOCK_INVITATION,
  SELECT_INVITATION_BY_TOKEN,
  USE_INVITATION,
  type InvitationRow,
} from './members.queries.ts';

/** An office may take up several invitations at once. */
const perAddress: readonly Window[] = [
  { hits: 30, seconds: 600 },
  { hits: 200, seconds: 86_400 },
];

/** The other end of an invitation: whoever holds its link reads what is offered and takes it up, once. */
@Injectable()
export class AcceptInvitations {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly limits: RateLimits,
    private readonly passwords: Passwords,
    private readonly accounts: Accounts,
    private readonly mail: MembersMail,
    private readonly audit: Audit,
  ) {}

  async read(token: string, origin: Origin): Promise<InvitationOfferView> {
    await this.limits.take([{ parts: ['read-invitation', origin.ip], windows: perAddress }]);
    return presentOffer(await this.open(null, hashToken(token)));
  }

  /** Makes the person, whose address the link proves. Does not sign in. Of two at once one wins. */
  async accept(input: AcceptInvitation, origin: Origin): Promise<void> {
    await this.limits.take([{ parts: ['accept-invitation', origin.ip], windows: perAddress }]);
    const passwordHash = await this.passwords.hash(input.password);
    const tokenHash = hashToken(input.token);
    await this.uow.run(async (tx) => {
      await this.uow.rows(tx, LOCK_INVITATION, [tokenHash]);
      const invitation = await this.open(tx, tokenHash);
      demandUnguessable(input.password, [input.name, invitation.email, invitation.company_name]);
      const person = { name: input.name, email: invitation.email, passwordHash };
      const userId = await this.accounts.createPerson(tx, person);
      if (userId === null) throw new AppError('has_account');
      await this.join(tx, userId, invitation);
      await this.audit.write(tx, {
        actor: null,
        action: 'invitation.accepted',
        subject: { type: 'user', id: userId },
        detail: { companyId: invitation.company_id, role: invitation.role, invitationId: invitation.id },
        origin,
      });
    });
  }

  private async join(tx: Tx, userId: string, invitation: InvitationRow): Promise<void> {
    await this.accounts.addMember(tx, userId, {
      companyId: invitation.company_id,
      role: invitation.role,
      signLimitCents: toNumber(invitation.sign_limit_cents),
      setAsideLimitCents: toNumber(invitation.set_aside_limit_cents),
      changeLimitCents: toNumber(invitation.change_limit_cents),
    });
    await this.uow.rows(tx, USE_INVITATION, [invitation.id, userId]);
    await this.uow.rows(tx, CLOSE_SIGN_UPS, [invitation.email]);
    const data = { companyId: invitation.company_id, memberId: userId };
    await this.mail.sendAccepted(tx, invitation.invited_by_id, data);
  }

  private async open(tx: Tx | null, tokenHash: Buffer): Promise<InvitationRow> {
    const row = await this.uow.row<InvitationRow>(tx, SELECT_INVITATION_BY_TOKEN, [tokenHash]);
    if (row === null) throw deadLink(null);
    const isExpired = row.is_expired || row.is_withdrawn;
    if (row.is_used || isExpired) throw deadLink({ is_used: row.is_used, is_expired: isExpired });
    return row;
  }
}
