import { Module } from '@nestjs/common';
import { PeopleModule } from '../people/people.module.ts';
import { AcceptInvitations } from './accept-invitation.ts';
import { ChangeMember } from './change-member.ts';
import { InvitationLinksController } from './invitation-links.controller.ts';
import { Invitations } from './invite.ts';
import { ListPeople } from './list-people.ts';
import { MembersController } from './members.controller.ts';
import { MembersMail } from './members.mail.ts';

@Module({
  imports: [PeopleModule],
  controllers: [MembersController, InvitationLinksController],
  providers: [AcceptInvitations, ChangeMember, Invitations, ListPeople, MembersMail],
})
export class MembersModule {}
