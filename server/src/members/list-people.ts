import { Injectable } from '@nestjs/common';
import { may, type Actor, type PeopleView } from '@kerfyard/common/people';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { companyOf } from './member-access.ts';
import { presentInvitation, presentMember } from './members.presenter.ts';
import {
  SELECT_MEMBERS,
  SELECT_WAITING_INVITATIONS,
  type InvitationRow,
  type MemberRow,
} from './members.queries.ts';

@Injectable()
export class ListPeople {
  constructor(private readonly uow: UnitOfWork) {}

  async list(actor: Actor): Promise<PeopleView> {
    const companyId = companyOf(actor);
    const viewer = { userId: actor.userId, managesPeople: may(actor, 'people.manage') };
    const members = await this.uow.rows<MemberRow>(null, SELECT_MEMBERS, [companyId]);
    const invitations = viewer.managesPeople
      ? await this.uow.rows<InvitationRow>(null, SELECT_WAITING_INVITATIONS, [companyId])
      : [];
    return {
      // Those who left are for the ones who can let them back in.
      members: members
        .filter((row) => row.is_active || viewer.managesPeople)
        .map((row) => presentMember(row, viewer)),
      invitations: invitations.map(presentInvitation),
    };
  }
}
