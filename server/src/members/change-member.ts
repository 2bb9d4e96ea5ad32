import { Injectable } from '@nestjs/common';
import type { Actor, EditMember } from '@kerfyard/common/people';
import { ACCOUNT_NOTICE } from '../people/account-notice.ts';
import { Audit } from '../platform/audit/audit.ts';
import type { Origin } from '../platform/auth/access.decorators.ts';
import { SecondFactors } from '../platform/auth/second-factors.ts';
import { Sessions } from '../platform/auth/sessions.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { Mailer } from '../platform/mail/mailer.ts';
import { LiveHints } from '../platform/realtime/live-hints.ts';
import { companyOf, demandAnotherOwner, lockMember } from './member-access.ts';
import { MembersMail } from './members.mail.ts';
import { limitsOf } from './members.presenter.ts';
import { DEACTIVATE, REACTIVATE, UPDATE_MEMBER, WITHDRAW_INVITATIONS_BY } from './members.queries.ts';

interface Change {
  memberId: string;
  origin: Origin;
}

/** What an owner changes about a colleague. A company always keeps an owner who can sign in. */
@Injectable()
export class ChangeMember {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly sessions: Sessions,
    private readonly secondFactors: SecondFactors,
    private readonly mailer: Mailer,
    private readonly hints: LiveHints,
    private readonly mail: MembersMail,
    private readonly audit: Audit,
  ) {}

  /** Role and limits in dollars. Takes effect with the next request of theirs. */
  async edit(actor: Actor, { role, limits }: EditMember, { memberId, origin }: Change): Promise<void> {
    const companyId = companyOf(actor);
    await this.uow.run(async (tx) => {
      const before = await lockMember(this.uow, tx, companyId, memberId);
      const stopsOwning = before.role === 'owner' && role !== 'owner';
      if (stopsOwning && before.is_active) await demandAnotherOwner(this.uow, tx, companyId, memberId);
      await this.uow.rows(tx, UPDATE_MEMBER, [
        companyId,
        memberId,
        role,
        limits.signCents,
        limits.setAsideCents,
        limits.changeCents,
      ]);
      if (stopsOwning) await this.uow.rows(tx, WITHDRAW_INVITATIONS_BY, [companyId, memberId]);
      if (before.role !== role) await this.mail.sendRoleChanged(tx, memberId, role);
      await this.audit.write(tx, {
        actor,
        action: 'member.changed',
        subject: { type: 'user', id: memberId },
        detail: { before: { role: before.role, limits: limitsOf(before) }, after: { role, limits } },
        origin,
      });
      this.uow.afterCommit(tx, () => this.hints.reconnect(memberId));
    });
  }

  /** Ends every session and socket of theirs, and the invitations they sent. What they did stays. */
  async deactivate(actor: Actor, { memberId, origin }: Change): Promise<void> {
    const companyId = companyOf(actor);
    await this.uow.run(async (tx) => {
      const member = await lockMember(this.uow, tx, companyId, memberId);
      if (!member.is_active) throw new AppError('illegal_move');
      if (member.role === 'owner') await demandAnotherOwner(this.uow, tx, companyId, memberId);
      await this.uow.rows(tx, DEACTIVATE, [memberId]);
      await this.uow.rows(tx, WITHDRAW_INVITATIONS_BY, [companyId, memberId]);
      await this.sessions.endAllOf(tx, memberId, { except: null, because: 'deactivated', origin });
      await this.record(tx, actor, { action: 'member.deactivated', memberId, origin });
    });
  }

  /** Lets someone back in, with the role and limits they had. */
  async reactivate(actor: Actor, { memberId, origin }: Change): Promise<void> {
    const companyId = companyOf(actor);
    await this.uow.run(async (tx) => {
      const member = await lockMember(this.uow, tx, companyId, memberId);
      if (member.is_active) throw new AppError('illegal_move');
      await this.uow.rows(tx, REACTIVATE, [memberId]);
      await this.record(tx, actor, { action: 'member.reactivated', memberId, origin });
    });
  }

  /**
   * For a colleague who lost phone and recovery codes: the password alone does again, and they set up a new one. Not for
   * oneself, who has a page for it that asks for a code.
   */
  async removeSecondFactor(actor: Actor, { memberId, origin }: Change): Promise<void> {
    const companyId = companyOf(actor);
    await this.uow.run(async (tx) => {
      await lockMember(this.uow, tx, companyId, memberId);
      if (memberId === actor.userId || !(await this.secondFactors.remove(tx, memberId))) {
        throw new AppError('illegal_move');
      }
      await this.sessions.endAllOf(tx, memberId, { except: null, because: 'second_factor_removed', origin });
      await this.mailer.toUsers(tx, ACCOUNT_NOTICE, [memberId], { what: 'second_factor_removed' });
      await this.record(tx, actor, { action: 'second_factor.removed', memberId, origin });
    });
  }

  private record(
    tx: Tx,
    actor: Actor,
    { action, memberId, origin }: Change & { action: string },
  ): Promise<void> {
    return this.audit.write(tx, { actor, action, subject: { type: 'user', id: memberId }, origin });
  }
}
