import { Injectable } from '@nestjs/common';
import type { Actor } from '@kerfyard/common/people';
import { nextState } from '@kerfyard/common/state';
import { visitMachine, type VisitView, type VisitWindow } from '@kerfyard/common/visits';
import { MoneyReader } from '../payments/money-reader.ts';
import type { Origin } from '../platform/auth/access.decorators.ts';
import { Clock } from '../platform/clock/clock.ts';
import { UnitOfWork, type Tx } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';
import { Mailer } from '../platform/mail/mailer.ts';
import { MoveVisit, type LockedVisit } from './move-visit.ts';
import {
  CANCEL_VISIT,
  CONFIRM_VISIT,
  FINISH_VISIT,
  LOCK_CREW,
  LOCK_TRUCK,
  START_VISIT,
} from './visit.queries.ts';

/** The moves of a visit after it was proposed. */
@Injectable()
export class VisitsService {
  constructor(
    private readonly moves: MoveVisit,
    private readonly uow: UnitOfWork,
    private readonly clock: Clock,
    private readonly money: MoneyReader,
    private readonly mailer: Mailer,
  ) {}

  /** The general contractor takes one of the windows; no crew and no truck is ever in two places. */
  async confirm(actor: Actor, origin: Origin, visitId: string, window: VisitWindow): Promise<VisitView> {
    const move = {
      actor,
      origin,
      visitId,
      action: 'visit.confirmed',
      permissions: ['visit.confirm'],
    } as const;
    return this.moves.run(move, async (tx, { visit, subcontract }) => {
      requireMove(visit.status, 'confirm');
      if (subcontract.status !== 'active') throw new AppError('illegal_move');
      const chosen = visit.windows.find((offered) => isSame(offered, window));
      if (chosen === undefined) throw AppError.field('window', 'Not one of the windows on offer');
      const now = await this.clock.now(tx);
      if (Date.parse(chosen.endsAt) <= now.getTime())
        throw AppError.field('window', 'This window has passed');
      await this.uow.rows(tx, LOCK_CREW, [visit.crew_id]);
      await this.uow.rows(tx, LOCK_TRUCK, [visit.truck_id]);
      await this.moved(tx, CONFIRM_VISIT, [visitId, chosen.startsAt, chosen.endsAt, actor.userId]);
      await this.mailer.toCompany(tx, 'window_confirmed', subcontract.crew.id, 'visit.work', { visitId });
      return { ...chosen };
    });
  }

  /** The crew is on site: only with the money of every line of the visit set aside. */
  async start(actor: Actor, origin: Origin, visitId: string): Promise<VisitView> {
    const move = { actor, origin, visitId, action: 'visit.started', permissions: ['visit.work'] } as const;
    return this.moves.run(move, async (tx, locked) => {
      requireMove(locked.visit.status, 'start');
      await this.requireSetAside(tx, locked);
      await this.moved(tx, START_VISIT, [visitId]);
      return {};
    });
  }

  async finish(actor: Actor, origin: Origin, visitId: string): Promise<VisitView> {
    const move = { actor, origin, visitId, action: 'visit.finished', permissions: ['visit.work'] } as const;
    return this.moves.run(move, async (tx) => {
      await this.moved(tx, FINISH_VISIT, [visitId]);
      return {};
    });
  }

  /** Either side, until the crew is on site. */
  async cancel(actor: Actor, origin: Origin, visitId: string, reason: string): Promise<VisitView> {
    const permissions = ['visit.propose', 'visit.confirm'] as const;
    const move = { actor, origin, visitId, action: 'visit.cancelled', permissions };
    return this.moves.run(move, async (tx, { visit, subcontract }) => {
      await this.moved(tx, CANCEL_VISIT, [visitId, reason]);
      const [companyId, permission] =
        subcontract.side === 'gc'
          ? ([subcontract.crew.id, 'visit.work'] as const)
          : ([subcontract.gc.id, 'visit.confirm'] as const);
      await this.mailer.toCompany(tx, 'visit_cancelled', companyId, permission, { visitId });
      return { from: visit.status, reason };
    });
  }

  private async requireSetAside(tx: Tx, { visit, subcontract }: LockedVisit): Promise<void> {
    const setAside = await this.money.setAsideLineIds(subcontract.id, tx);
    const isReady = (visit.sov_line_ids ?? []).every((id) => setAside.has(id));
    if (!isReady) throw new AppError('lines_not_set_aside');
  }

  /** A conditional update that must have found its row in the state it starts from. */
  private async moved(tx: Tx, sql: string, bind: readonly unknown[]): Promise<void> {
    if ((await this.uow.row(tx, sql, bind)) === null) throw new AppError('illegal_move');
  }
}

function requireMove(status: LockedVisit['visit']['status'], action: 'confirm' | 'start'): void {
  if (nextState(visitMachine, status, action) === undefined) throw new AppError('illegal_move');
}

function isSame(a: VisitWindow, b: VisitWindow): boolean {
  return Date.parse(a.startsAt) === Date.parse(b.startsAt) && Date.parse(a.endsAt) === Date.parse(b.endsAt);
}
