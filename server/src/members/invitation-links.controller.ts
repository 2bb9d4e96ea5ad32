import { Body, Controller, HttpCode, HttpStatus, Post } from '@nestjs/common';
import {
  acceptInvitationSchema,
  linkSchema,
  type AcceptInvitation,
  type InvitationOfferView,
  type LinkUse,
} from '@kerfyard/common/people';
import { Public, RequestOrigin, type Origin } from '../platform/auth/access.decorators.ts';
import { AcceptInvitations } from './accept-invitation.ts';

/** Reading is a POST as well: a token in an address would end in logs. */
@Controller('auth/invitation')
@Public()
export class InvitationLinksController {
  constructor(private readonly invitations: AcceptInvitations) {}

  @Post()
  @HttpCode(HttpStatus.OK)
  read(
    @Body({ schema: linkSchema }) { token }: LinkUse,
    @RequestOrigin() origin: Origin,
  ): Promise<InvitationOfferView> {
    return this.invitations.read(token, origin);
  }

  @Post('accept')
  @HttpCode(HttpStatus.NO_CONTENT)
  accept(
    @Body({ schema: acceptInvitationSchema }) input: AcceptInvitation,
    @RequestOrigin() origin: Origin,
  ): Promise<void> {
    return this.invitations.accept(input, origin);
  }
}
