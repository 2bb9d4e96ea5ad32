import { Inject, Injectable } from '@nestjs/common';
import type { Actor, Invite } from '@kerfyard/common/people';
import { linkToken } from '../people/link-token.ts';
import { hashToken } from '../people/verify-token.ts';
import { Audit } from '../platform/audit/audit.ts';
import type { Origin } from '../platform/auth/access.decorators.ts';
import { CONFIG, type Config } from '../platform/config/config.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { RateLimits, type Window } from '../platform/limits/rate-limits.ts';
import { companyOf } from './member-access.ts';
import { MembersMail } from './members.mail.ts';
import {
  COUNT_WAITING,
  INSERT_INVITATION,
  LOCK_COMPANY,
  SELECT_MEMBER_BY_EMAIL,
  WITHDRAW_FORMER,
  WITHDRAW_INVITATION,
  type MemberRow,
} from './members.queries.ts';

/** Three days: long enough for a weekend, short enough for a mailbox that changes hands. */
export const INVITATION_SECONDS = 3 * 86_400;
const MAX_WAITING = 200;

const perCompany: readonly Window[] = [
  { hits: 40, seconds: 3_600 },
  { hits: 200, seconds: 86_400 },
];
/** Mails to one address, whoever invites. */
const perEmail: readonly Window[] = [{ hits: 6, seconds: 86_400 }];

/** An owner invites by e-mail. Only one link to an address works at a time. */
@Injectable()
export class Invitations {
  constructor(
    @Inject(CONFIG) private readonly config: Config,
    private readonly uow: UnitOfWork,
    private readonly limits: RateLimits,
    private readonly mail: MembersMail,
    private readonly audit: Audit,
  ) {}

  /** Says nothing about whether the address has an account elsewhere: its mail does, to whoever reads it. */
  async invite(actor: Actor, input: Invite, origin: Origin): Promise<void> {
    const companyId = companyOf(actor);
    await this.limits.take([
      { parts: ['invite', 'company', companyId], windows: perCompany },
      { parts: ['invite', 'e-mail', input.email], windows: perEmail },
    ]);
    await this.uow.run(async (tx) => {
      await this.uow.rows(tx, LOCK_COMPANY, [companyId]);
      await this.demandRoom(tx, companyId, input.email);
      await this.uow.rows(tx, WITHDRAW_FORMER, [companyId, input.email]);
      await this.insert(tx, actor, companyId, input);
      await this.mail.sendInvitation(tx, input.id);
      const { email, role, limits } = input;
      await this.audit.write(tx, {
        actor,
        action: 'invitation.sent',
        subject: { type: 'invitation', id: input.id },
        detail: { email, role, limits },
        origin,
      });
    });
  }

  private async demandRoom(tx: Tx, companyId: string, email: string): Promise<void> {
    const member = await this.uow.row<MemberRow>(tx, SELECT_MEMBER_BY_EMAIL, [companyId, email]);
    if (member !== null) {
      throw AppError.field(
        'email',
        member.is_active
          ? `${member.name} is with you already`
          : `${member.name} was with you: let them back in from the list`,
      );
    }
    const row = await this.uow.row<{ waiting: number }>(tx, COUNT_WAITING, [companyId]);
    if ((row?.waiting ?? 0) >= MAX_WAITING) {
      throw AppError.field('email', `At most ${MAX_WAITING} invitations wait at a time`);
    }
  }

  private async insert(tx: Tx, actor: Actor, companyId: string, input: Invite): Promise<void> {
    const token = linkToken(this.config.signingSecret, 'invitation', input.id);
    const row = await this.uow.row(tx, INSERT_INVITATION, [
      input.id,
      companyId,
      input.email,
      input.role,
      input.limits.signCents,
      input.limits.setAsideCents,
      input.limits.changeCents,
      actor.userId,
      hashToken(token),
      INVITATION_SECONDS,
    ]);
    if (row === null) throw new AppError('key_reused');
  }

  /** @throws AppError not_found for another company's, a used and a missing one alike */
  async withdraw(actor: Actor, invitationId: string, origin: Origin): Promise<void> {
    const companyId = companyOf(actor);
    await this.uow.run(async (tx) => {
      const bind = [companyId, invitationId];
      const row = await this.uow.row<{ email: string }>(tx, WITHDRAW_INVITATION, bind);
      if (row === null) throw new AppError('not_found');
      await this.audit.write(tx, {
        actor,
        action: 'invitation.withdrawn',
        subject: { type: 'invitation', id: invitationId },
        detail: { email: row.email },
        origin,
      });
    });
  }
}
