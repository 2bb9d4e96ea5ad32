import { Body, Controller, Param, Post } from '@nestjs/common';
import { idSchema } from '@kerfyard/common/api';
import { awardSchema, type Award } from '@kerfyard/common/bids';
import type { Actor } from '@kerfyard/common/people';
import { CurrentActor, Needs, RequestOrigin, type Origin } from '../platform/auth/access.decorators.ts';
import { AwardBid } from './award-bid.ts';

@Controller('scopes')
export class AwardsController {
  constructor(private readonly awards: AwardBid) {}

  @Post(':id/award')
  @Needs('scope.award')
  award(
    @CurrentActor() actor: Actor,
    @RequestOrigin() origin: Origin,
    @Param('id', { schema: idSchema }) id: string,
    @Body({ schema: awardSchema }) input: Award,
  ): Promise<{ subcontractId: string }> {
    return this.awards.award(actor, origin, id, input);
  }
}
