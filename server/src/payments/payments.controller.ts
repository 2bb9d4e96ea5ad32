import { Body, Controller, Get, Header, HttpCode, Param, Post, Query } from '@nestjs/common';
import { z } from 'zod';
import { idSchema } from '@kerfyard/common/api';
import {
  releaseSchema,
  setAsideQuoteSchema,
  setAsideSchema,
  type BooksView,
  type FundingView,
  type Release,
  type ReleaseView,
  type SetAside,
  type SetAsideQuote,
  type StatementView,
} from '@kerfyard/common/payments';
import type { Actor } from '@kerfyard/common/people';
import {
  CurrentActor,
  Needs,
  RecentSignIn,
  RequestOrigin,
  type Origin,
} from '../platform/auth/access.decorators.ts';
import { Payouts } from './payouts.ts';
import { Reconciliation, type Difference } from './reconcile.ts';
import { ReleaseService } from './releases.ts';
import { SetAsideService } from './set-aside.ts';
import { StaffBooks } from './staff-books.ts';
import { Statements } from './statements.ts';

const statementQuerySchema = z.strictObject({ subcontractId: idSchema.optional() });
type StatementQuery = z.infer<typeof statementQuerySchema>;

@Controller()
export class PaymentsController {
  constructor(
    private readonly setAside: SetAsideService,
    private readonly releases: ReleaseService,
    private readonly payouts: Payouts,
    private readonly statements: Statements,
    private readonly books: StaffBooks,
    private readonly reconciliation: Reconciliation,
  ) {}

  /** What it would cost to set these lines aside; nothing is stored. */
  @Post('subcontracts/:id/set-aside-quote')
  @HttpCode(200)
  @Needs('money.set_aside')
  quote(
    @CurrentActor() actor: Actor,
    @Param('id', { schema: idSchema }) id: string,
    @Body({ schema: setAsideQuoteSchema }) input: Omit<SetAside, 'id'>,
  ): Promise<SetAsideQuote> {
    return this.setAside.quote(actor, id, input);
  }

  @Post('subcontracts/:id/set-aside')
  @Needs('money.set_aside')
  @RecentSignIn('money_movers')
  request(
    @CurrentActor() actor: Actor,
    @RequestOrigin() origin: Origin,
    @Param('id', { schema: idSchema }) id: string,
    @Body({ schema: setAsideSchema }) input: SetAside,
  ): Promise<FundingView> {
    return this.setAside.request(actor, origin, id, input);
  }

  @Post('releases')
  @Needs('money.release')
  @RecentSignIn('money_movers')
  release(
    @CurrentActor() actor: Actor,
    @RequestOrigin() origin: Origin,
    @Body({ schema: releaseSchema }) input: Release,
  ): Promise<ReleaseView> {
    return this.releases.release(actor, origin, input);
  }

  @Post('company/payouts')
  @HttpCode(200)
  @Needs('money.payout')
  @RecentSignIn('money_movers')
  onboard(@CurrentActor() actor: Actor): Promise<{ url: string }> {
    return this.payouts.onboardingUrl(actor);
  }

  /** Read the payout account again at the provider, after coming back from its page. */
  @Post('company/payouts/refresh')
  @HttpCode(204)
  @Needs('money.payout')
  refresh(@CurrentActor() actor: Actor): Promise<void> {
    return this.payouts.refresh(actor);
  }

  @Get('payments/statement')
  @Header('Cache-Control', 'no-store')
  @Needs('money.read')
  statement(
    @CurrentActor() actor: Actor,
    @Query({ schema: statementQuerySchema }) query: StatementQuery,
  ): Promise<StatementView> {
    return this.statements.statement(actor, query.subcontractId ?? null);
  }

  @Get('staff/books')
  @Needs('staff.read')
  readBooks(): Promise<BooksView> {
    return this.books.read();
  }

  /** Compare with the provider now; what differs is an incident from then on. */
  @Post('staff/books/reconcile')
  @HttpCode(200)
  @Needs('staff.read')
  async reconcile(): Promise<{ differences: Difference[] }> {
    return { differences: await this.reconciliation.run() };
  }
}
