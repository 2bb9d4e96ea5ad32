import { Body, Controller, Get, HttpCode, Param, Post, Put, Query, Res } from '@nestjs/common';
import type { Response } from 'express';
import { idSchema, pageQuerySchema, type Page, type PageQuery } from '@kerfyard/common/api';
import {
  bidDraftSchema,
  bidInputSchema,
  bidPriceInputSchema,
  type BidInput,
  type BidListItem,
  type BidPriceInput,
  type BidPricePreview,
  type BidTabulationView,
  type OwnBidView,
} from '@kerfyard/common/bids';
import type { Actor } from '@kerfyard/common/people';
import { plugsSchema, type Plugs } from '@kerfyard/common/scopes';
import type { z } from 'zod';
import { CurrentActor, Needs, RequestOrigin, type Origin } from '../platform/auth/access.decorators.ts';
import { BidDrafts, type BidDraftView } from './bid-drafts.ts';
import { BidList } from './bid-list.ts';
import { OwnBids } from './own-bid.ts';
import { PreviewPrice } from './preview-price.ts';
import { SubmitBid } from './submit-bid.ts';
import { Tabulation } from './tabulation.ts';
import { WithdrawBid } from './withdraw-bid.ts';

const id = { schema: idSchema };

@Controller()
export class BidsController {
  constructor(
    private readonly pricing: PreviewPrice,
    private readonly submitting: SubmitBid,
    private readonly withdrawing: WithdrawBid,
    private readonly ownBids: OwnBids,
    private readonly drafts: BidDrafts,
    private readonly list: BidList,
    private readonly tabulation: Tabulation,
  ) {}

  @Post('scopes/:id/bid-price')
  @Needs('bid.read')
  @HttpCode(200)
  price(
    @CurrentActor() actor: Actor,
    @Param('id', id) scopeId: string,
    @Body({ schema: bidPriceInputSchema }) input: BidPriceInput,
  ): Promise<BidPricePreview> {
    return this.pricing.preview(actor, scopeId, input);
  }

  @Put('scopes/:id/own-bid')
  @Needs('bid.write')
  submit(
    @CurrentActor() actor: Actor,
    @RequestOrigin() origin: Origin,
    @Param('id', id) scopeId: string,
    @Body({ schema: bidInputSchema }) input: BidInput,
  ): Promise<OwnBidView> {
    return this.submitting.submit(actor, origin, scopeId, input);
  }

  /** `null` when there is no bid: having none is no error, and Nest itself would answer an empty body. */
  @Get('scopes/:id/own-bid')
  @Needs('bid.read')
  async own(
    @CurrentActor() actor: Actor,
    @Param('id', id) scopeId: string,
    @Res() response: Response<OwnBidView | null>,
  ): Promise<void> {
    response.json(await this.ownBids.view(actor, scopeId));
  }

  @Post('scopes/:id/own-bid/withdraw')
  @Needs('bid.write')
  @HttpCode(200)
  withdraw(
    @CurrentActor() actor: Actor,
    @RequestOrigin() origin: Origin,
    @Param('id', id) scopeId: string,
  ): Promise<OwnBidView> {
    return this.withdrawing.withdraw(actor, origin, scopeId);
  }

  @Get('scopes/:id/bid-draft')
  @Needs('bid.read')
  draft(@CurrentActor() actor: Actor, @Param('id', id) scopeId: string): Promise<BidDraftView> {
    return this.drafts.read(actor, scopeId);
  }

  @Put('scopes/:id/bid-draft')
  @Needs('bid.write')
  saveDraft(
    @CurrentActor() actor: Actor,
    @Param('id', id) scopeId: string,
    @Body({ schema: bidDraftSchema }) input: z.output<typeof bidDraftSchema>,
  ): Promise<{ updatedAt: string }> {
    return this.drafts.save(actor, scopeId, input.draft);
  }

  @Get('bids')
  @Needs('bid.read')
  bids(
    @CurrentActor() actor: Actor,
    @Query({ schema: pageQuerySchema }) query: PageQuery,
  ): Promise<Page<BidListItem>> {
    return this.list.own(actor, query);
  }

  @Get('scopes/:id/bids')
  @Needs('bid.tabulate')
  tabulate(@CurrentActor() actor: Actor, @Param('id', id) scopeId: string): Promise<BidTabulationView> {
    return this.tabulation.view(actor, scopeId);
  }

  @Put('scopes/:id/plugs')
  @Needs('scope.write')
  setPlugs(
    @CurrentActor() actor: Actor,
    @RequestOrigin() origin: Origin,
    @Param('id', id) scopeId: string,
    @Body({ schema: plugsSchema }) input: Plugs,
  ): Promise<BidTabulationView> {
    return this.tabulation.setPlugs(actor, origin, scopeId, input);
  }
}
