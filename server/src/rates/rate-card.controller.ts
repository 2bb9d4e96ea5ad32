import { Body, Controller, Get, Put } from '@nestjs/common';
import {
  saveRateCardSchema,
  type Actor,
  type RateCardView,
  type SaveRateCard,
} from '@kerfyard/common/people';
import { CurrentActor, Needs, RequestOrigin, type Origin } from '../platform/auth/access.decorators.ts';
import { RateCards } from './rate-cards.ts';

/** Open to either kind of company by the guard, so that a general contractor is told 404 and not that crews have one. */
@Controller('company/rate-card')
export class RateCardController {
  constructor(private readonly cards: RateCards) {}

  @Get()
  @Needs('company.read')
  view(@CurrentActor() actor: Actor): Promise<RateCardView> {
    return this.cards.view(actor);
  }

  @Put()
  @Needs('company.read')
  save(
    @CurrentActor() actor: Actor,
    @Body({ schema: saveRateCardSchema }) input: SaveRateCard,
    @RequestOrigin() origin: Origin,
  ): Promise<RateCardView> {
    return this.cards.save(actor, input, origin);
  }
}
