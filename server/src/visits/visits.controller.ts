import { Body, Controller, Get, HttpCode, Param, Post, Query } from '@nestjs/common';
import { idSchema } from '@kerfyard/common/api';
import type { Actor } from '@kerfyard/common/people';
import {
  cancelVisitSchema,
  confirmVisitSchema,
  proposeVisitSchema,
  visitsQuerySchema,
  type ProposeVisit as ProposeVisitInput,
  type VisitsQuery,
  type VisitView,
  type VisitWindow,
} from '@kerfyard/common/visits';
import { CurrentActor, Needs, RequestOrigin, type Origin } from '../platform/auth/access.decorators.ts';
import { ProposeVisit } from './propose-visit.ts';
import { VisitReader } from './visit-reader.ts';
import { VisitsService } from './visits.service.ts';

@Controller('visits')
export class VisitsController {
  constructor(
    private readonly visits: VisitsService,
    private readonly proposals: ProposeVisit,
    private readonly reader: VisitReader,
  ) {}

  @Get()
  @Needs('visit.read')
  list(
    @CurrentActor() actor: Actor,
    @Query({ schema: visitsQuerySchema }) query: VisitsQuery,
  ): Promise<VisitView[]> {
    return this.reader.ofCompany(actor, query);
  }

  @Post()
  @Needs('visit.propose')
  propose(
    @CurrentActor() actor: Actor,
    @RequestOrigin() origin: Origin,
    @Body({ schema: proposeVisitSchema }) input: ProposeVisitInput,
  ): Promise<VisitView> {
    return this.proposals.propose(actor, origin, input);
  }

  @Post(':id/confirm')
  @HttpCode(200)
  @Needs('visit.confirm')
  confirm(
    @CurrentActor() actor: Actor,
    @RequestOrigin() origin: Origin,
    @Param('id', { schema: idSchema }) id: string,
    @Body({ schema: confirmVisitSchema }) input: { window: VisitWindow },
  ): Promise<VisitView> {
    return this.visits.confirm(actor, origin, id, input.window);
  }

  @Post(':id/start')
  @HttpCode(200)
  @Needs('visit.work')
  start(
    @CurrentActor() actor: Actor,
    @RequestOrigin() origin: Origin,
    @Param('id', { schema: idSchema }) id: string,
  ): Promise<VisitView> {
    return this.visits.start(actor, origin, id);
  }

  @Post(':id/finish')
  @HttpCode(200)
  @Needs('visit.work')
  finish(
    @CurrentActor() actor: Actor,
    @RequestOrigin() origin: Origin,
    @Param('id', { schema: idSchema }) id: string,
  ): Promise<VisitView> {
    return this.visits.finish(actor, origin, id);
  }

  /** Either side; which roles of each, the service decides. */
  @Post(':id/cancel')
  @HttpCode(200)
  @Needs('visit.read')
  cancel(
    @CurrentActor() actor: Actor,
    @RequestOrigin() origin: Origin,
    @Param('id', { schema: idSchema }) id: string,
    @Body({ schema: cancelVisitSchema }) input: { reason: string },
  ): Promise<VisitView> {
    return this.visits.cancel(actor, origin, id, input.reason);
  }
}
