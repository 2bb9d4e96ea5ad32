import { Injectable } from '@nestjs/common';
import type { BidInput, PricedBid } from '@kerfyard/common/bids';
import { SIGNING_DAYS } from '@kerfyard/common/subcontracts';
import { Clock } from '../platform/clock/clock.ts';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { toNumber } from '../platform/database/codecs.ts';
import { newId } from '../platform/ids/ids.ts';
import { Storage } from '../platform/storage/storage.ts';
import type { PublishedScope } from '../scopes/scope.rows.ts';
import { scopeNumber } from '../scopes/scope-number.ts';
import type { PaperCompany, PaperFile } from '../subcontracts/paper/paper-input.ts';
import { renderSubcontractPaper } from '../subcontracts/paper/subcontract-paper.ts';
import { endOfDayAfter } from '../subcontracts/site-days.ts';
import { subcontractNumber } from '../subcontracts/subcontract-row.ts';
import { COMPANY_ON_PAPER, FILES_ON_PAPER, NEXT_NUMBER } from './award.queries.ts';
import { scheduleOfValues, type SovRow } from './schedule-of-values.ts';

/** An opened bid, as the driver gives it. */
export interface OpenedBidRow {
  id: string;
  company_id: string;
  company_name: string;
  company_phone: string;
  revision: number;
  version: number;
  input: BidInput;
  priced: PricedBid;
  total_cents: string;
  submitted_at: Date;
}

/** A subcontract that exists only as a stored paper; the award makes it one. */
export interface PreparedPaper {
  subcontractId: string;
  number: number;
  awardedAt: Date;
  signBy: Date;
  sov: SovRow[];
  sha256: string;
  bytes: number;
}

/** Draws up and stores the paper of an award before its transaction, in which no file may be written. */
@Injectable()
export class AwardPaper {
  private readonly running = new Map<string, Promise<PreparedPaper>>();

  constructor(
    private readonly uow: UnitOfWork,
    private readonly clock: Clock,
    private readonly storage: Storage,
  ) {}

  /** Parallel presses for one version of one bid share one paper: drawing it is the costly part. */
  prepare(published: PublishedScope, bid: OpenedBidRow): Promise<PreparedPaper> {
    const key = `${bid.id} ${bid.version}`;
    const running = this.running.get(key);
    if (running !== undefined) return running;
    const paper = this.make(published, bid).finally(() => this.running.delete(key));
    this.running.set(key, paper);
    return paper;
  }

  private async make(published: PublishedScope, bid: OpenedBidRow): Promise<PreparedPaper> {
    const { scope, revision, body } = published;
    const [gc, files, awardedAt, number] = await Promise.all([
      this.uow.row<PaperCompany>(null, COMPANY_ON_PAPER, [scope.company_id]),
      this.uow.rows<PaperFile>(null, FILES_ON_PAPER, [scope.id, revision]),
      this.clock.now(),
      this.reserveNumber(),
    ]);
    if (gc === null) throw new Error('a scope without its company');
    const sov = scheduleOfValues(body.cuts, bid.priced);
    const signBy = endOfDayAfter(awardedAt, SIGNING_DAYS, body.site.timeZone);
    const paper = await renderSubcontractPaper({
      number: subcontractNumber(number),
      scopeNumber: scopeNumber(scope.number),
      revision,
      awardedAt,
      signBy,
      gc,
      crew: { name: bid.company_name, phone: bid.company_phone },
      body,
      bid: bid.input,
      files,
      sov,
      totalCents: toNumber(bid.total_cents),
    });
    const { sha256 } = await this.storage.put(paper);
    return { subcontractId: newId(), number, awardedAt, signBy, sov, sha256, bytes: paper.length };
  }

  private async reserveNumber(): Promise<number> {
    const row = await this.uow.run((tx) => this.uow.row<{ value: string }>(tx, NEXT_NUMBER));
    if (row === null) throw new Error('the counter gave no number');
    return toNumber(row.value);
  }
}
