import { Body, Controller, Get, HttpCode, Param, Post, Query } from '@nestjs/common';
import { idSchema, type Page } from '@kerfyard/common/api';
import type { Actor } from '@kerfyard/common/people';
import {
  signSchema,
  workQuerySchema,
  type Sign,
  type SubcontractListItem,
  type SubcontractView,
  type WorkQuery,
} from '@kerfyard/common/subcontracts';
import { CurrentActor, Needs, RequestOrigin, type Origin } from '../platform/auth/access.decorators.ts';
import { ListSubcontracts } from './list-subcontracts.ts';
import { SignSubcontract } from './sign-subcontract.ts';
import { ViewSubcontract } from './view-subcontract.ts';

@Controller('subcontracts')
export class SubcontractsController {
  constructor(
    private readonly lists: ListSubcontracts,
    private readonly views: ViewSubcontract,
    private readonly signing: SignSubcontract,
  ) {}

  @Get()
  @Needs('subcontract.read')
  list(
    @CurrentActor() actor: Actor,
    @Query({ schema: workQuerySchema }) query: WorkQuery,
  ): Promise<Page<SubcontractListItem>> {
    return this.lists.page(actor, query);
  }

  @Get(':id')
  @Needs('subcontract.read')
  view(
    @CurrentActor() actor: Actor,
    @Param('id', { schema: idSchema }) id: string,
  ): Promise<SubcontractView> {
    return this.views.view(actor, id);
  }

  @Post(':id/sign')
  @HttpCode(200)
  @Needs('subcontract.sign')
  sign(
    @CurrentActor() actor: Actor,
    @RequestOrigin() origin: Origin,
    @Param('id', { schema: idSchema }) id: string,
    @Body({ schema: signSchema }) input: Sign,
  ): Promise<SubcontractView> {
    return this.signing.sign(actor, origin, id, input);
  }
}
