import { Injectable } from '@nestjs/common';
import type { BidTabulationView, OpenedBidView } from '@kerfyard/common/bids';
import { tabulateBids } from '@kerfyard/common/cutting';
import type { Actor } from '@kerfyard/common/people';
import { distanceMiles } from '@kerfyard/common/places';
import type { Plugs, ResponsibilityItem, ScopeBody } from '@kerfyard/common/scopes';
import { Audit } from '../platform/audit/audit.ts';
import type { Origin } from '../platform/auth/access.decorators.ts';
import { toInstant, toNumber } from '../platform/database/codecs.ts';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { shownMiles } from '../scopes/place.ts';
import { requireCompany } from '../scopes/require-company.ts';
import { ScopeEvents } from '../scopes/scope-events.ts';
import { ScopeReader } from '../scopes/scope-reader.ts';
import type { PublishedScope } from '../scopes/scope.rows.ts';
import { AWARDED_BID, COUNT_SEALED, SAVE_PLUGS } from './bid-reader.queries.ts';
import { BidReader, type OpenedBid } from './bid-reader.ts';
import { OpenBids } from './open-bids.ts';

type Answer = BidTabulationView['tabulated'][number]['answers'][string];

/** Bids side by side: the same rows for all, what each leaves out added back at the general contractor's own price. */
@Injectable()
export class Tabulation {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly scopes: ScopeReader,
    private readonly reader: BidReader,
    private readonly opening: OpenBids,
    private readonly events: ScopeEvents,
    private readonly audit: Audit,
  ) {}

  /**
   * Sealed before due: the count and nothing else.
   * @throws AppError not_found for a scope that is not the company's own or not published
   */
  async view(actor: Actor, scopeId: string): Promise<BidTabulationView> {
    await this.ownPublished(actor, scopeId);
    await this.opening.openIfOverdue(scopeId);
    const published = await this.ownPublished(actor, scopeId);
    const [bids, sealed, award] = await Promise.all([
      this.reader.readable(scopeId),
      this.uow.row<{ bids: string }>(null, COUNT_SEALED, [scopeId]),
      this.uow.row<{ bid_id: string }>(null, AWARDED_BID, [scopeId]),
    ]);
    const { scope, body } = published;
    const rows = plugRows(published);
    return {
      mode: scope.mode ?? 'sealed',
      status: scope.status,
      count: bids.length + toNumber(sealed?.bids ?? '0'),
      openedAt: toInstant(scope.opened_at),
      rows,
      bids: bids.map((bid) => toOpenedBid(bid, body)),
      tabulated: tabulate(rows, bids),
      awardedBidId: award?.bid_id ?? null,
    };
  }

  /**
   * Price what bids leave out; items not named count nothing.
   * @throws AppError 422 for an item that is not the crew's or named twice; illegal_move once the scope has ended
   */
  async setPlugs(
    actor: Actor,
    origin: Origin,
    scopeId: string,
    { plugs }: Plugs,
  ): Promise<BidTabulationView> {
    const company = requireCompany(actor, 'general_contractor');
    const bidSeq = await this.uow.run(async (tx) => {
      const scope = await this.scopes.lock(tx, scopeId);
      if (scope.company_id !== company.id || scope.revision === null) throw new AppError('not_found');
      if (scope.status !== 'open' && scope.status !== 'due') throw new AppError('illegal_move');
      const { body } = await this.scopes.published(scopeId, null, tx);
      requirePlugItems(body, plugs);
      await this.uow.rows(tx, SAVE_PLUGS, [scopeId, JSON.stringify(plugs)]);
      await this.audit.write(tx, {
        actor,
        action: 'scope.plugs_set',
        subject: { type: 'scope', id: scopeId },
        detail: { plugs },
        origin,
      });
      return this.events.bumpBids(tx, scopeId);
    });
    this.events.bidsChanged({ id: scopeId, companyId: company.id }, bidSeq);
    return this.view(actor, scopeId);
  }

  private async ownPublished(actor: Actor, scopeId: string): Promise<PublishedScope> {
    const company = requireCompany(actor, 'general_contractor');
    const published = await this.scopes.published(scopeId);
    if (published.scope.company_id !== company.id) throw new AppError('not_found');
    return published;
  }
}

function crewItems(body: ScopeBody): ResponsibilityItem[] {
  return body.responsibilities.filter((row) => row.by === 'crew').map((row) => row.item);
}

function plugRows({ scope, body }: PublishedScope): BidTabulationView['rows'] {
  const cents = new Map(scope.plugs.map((plug) => [plug.item, plug.cents]));
  return crewItems(body).map((item) => ({ item, plugCents: cents.get(item) ?? 0 }));
}

function requirePlugItems(body: ScopeBody, plugs: Plugs['plugs']): void {
  const allowed = new Set<string>(crewItems(body));
  const seen = new Set<string>();
  const fields = plugs.flatMap(({ item }, index) => {
    const isRepeated = seen.has(item);
    seen.add(item);
    const path = `plugs.${index}.item`;
    if (!allowed.has(item)) return [{ path, message: 'The scope does not give this to the crew' }];
    return isRepeated ? [{ path, message: 'Named twice' }] : [];
  });
  if (fields.length > 0) throw new AppError('invalid_input', { fields });
}

function toOpenedBid(bid: OpenedBid, body: ScopeBody): OpenedBidView {
  return {
    id: bid.id,
    crew: bid.crew,
    input: bid.input,
    priced: bid.priced,
    submittedAt: toInstant(bid.submittedAt),
    distanceMi: bid.yard === null ? null : shownMiles(distanceMiles(bid.yard, body.site)),
  };
}

/** Answers of a bid on an older revision may name items the scope has taken back since: they have no row any more. */
function answersOf(bid: OpenedBid, rows: BidTabulationView['rows']): Record<string, Answer> {
  const given = new Map(bid.input.answers.map(({ item, answer }) => [item, answer]));
  return Object.fromEntries(rows.map(({ item }) => [item, given.get(item) ?? 'unclear']));
}

function tabulate(rows: BidTabulationView['rows'], bids: OpenedBid[]): BidTabulationView['tabulated'] {
  const answers = new Map(bids.map((bid) => [bid.id, answersOf(bid, rows)]));
  const tabulated = tabulateBids({
    rows: rows.map(({ item, plugCents }) => ({ id: item, plugCents })),
    bids: bids.map((bid) => ({
      id: bid.id,
      baseCents: bid.priced.totalCents,
      answers: answers.get(bid.id) ?? {},
    })),
  });
  return tabulated.map(({ id, baseCents, plugsCents, unclear, adjustedCents }) => ({
    bidId: id,
    baseCents,
    plugsCents,
    unclear,
    adjustedCents,
    answers: answers.get(id) ?? {},
  }));
}
