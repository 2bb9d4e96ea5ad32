import { Body, Controller, Delete, Get, HttpCode, HttpStatus, Param, Post, Put } from '@nestjs/common';
import { idSchema } from '@kerfyard/common/api';
import {
  editMemberSchema,
  inviteSchema,
  type Actor,
  type EditMember,
  type Invite,
  type PeopleView,
} from '@kerfyard/common/people';
import {
  CurrentActor,
  Needs,
  RecentSignIn,
  RequestOrigin,
  type Origin,
} from '../platform/auth/access.decorators.ts';
import { Idempotent } from '../platform/idempotency/idempotent.decorator.ts';
import { ChangeMember } from './change-member.ts';
import { Invitations } from './invite.ts';
import { ListPeople } from './list-people.ts';

@Controller('company')
export class MembersController {
  constructor(
    private readonly people: ListPeople,
    private readonly members: ChangeMember,
    private readonly invitations: Invitations,
  ) {}

  @Get('people')
  @Needs('company.read')
  list(@CurrentActor() actor: Actor): Promise<PeopleView> {
    return this.people.list(actor);
  }

  @Put('people/:id')
  @Needs('people.manage')
  @RecentSignIn()
  @HttpCode(HttpStatus.NO_CONTENT)
  edit(
    @CurrentActor() actor: Actor,
    @Param('id', { schema: idSchema }) memberId: string,
    @Body({ schema: editMemberSchema }) input: EditMember,
    @RequestOrigin() origin: Origin,
  ): Promise<void> {
    return this.members.edit(actor, input, { memberId, origin });
  }

  @Post('people/:id/deactivate')
  @Needs('people.manage')
  @RecentSignIn()
  @HttpCode(HttpStatus.NO_CONTENT)
  deactivate(
    @CurrentActor() actor: Actor,
    @Param('id', { schema: idSchema }) memberId: string,
    @RequestOrigin() origin: Origin,
  ): Promise<void> {
    return this.members.deactivate(actor, { memberId, origin });
  }

  @Post('people/:id/reactivate')
  @Needs('people.manage')
  @RecentSignIn()
  @HttpCode(HttpStatus.NO_CONTENT)
  reactivate(
    @CurrentActor() actor: Actor,
    @Param('id', { schema: idSchema }) memberId: string,
    @RequestOrigin() origin: Origin,
  ): Promise<void> {
    return this.members.reactivate(actor, { memberId, origin });
  }

  @Delete('people/:id/second-factor')
  @Needs('people.manage')
  @RecentSignIn()
  @HttpCode(HttpStatus.NO_CONTENT)
  removeSecondFactor(
    @CurrentActor() actor: Actor,
    @Param('id', { schema: idSchema }) memberId: string,
    @RequestOrigin() origin: Origin,
  ): Promise<void> {
    return this.members.removeSecondFactor(actor, { memberId, origin });
  }

  @Post('invitations')
  @Needs('people.manage')
  @RecentSignIn()
  @Idempotent()
  invite(
    @CurrentActor() actor: Actor,
    @Body({ schema: inviteSchema }) input: Invite,
    @RequestOrigin() origin: Origin,
  ): Promise<void> {
    return this.invitations.invite(actor, input, origin);
  }

  @Delete('invitations/:id')
  @Needs('people.manage')
  @RecentSignIn()
  @HttpCode(HttpStatus.NO_CONTENT)
  withdraw(
    @CurrentActor() actor: Actor,
    @Param('id', { schema: idSchema }) id: string,
    @RequestOrigin() origin: Origin,
  ): Promise<void> {
    return this.invitations.withdraw(actor, id, origin);
  }
}
