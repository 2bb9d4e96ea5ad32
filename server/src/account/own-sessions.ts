import { Injectable } from '@nestjs/common';
import type { Actor, SessionEndView, SessionView } from '@kerfyard/common/people';
import type { Origin } from '../platform/auth/access.decorators.ts';
import {
  SELECT_OWN_SESSIONS,
  SELECT_SESSION_END,
  type OwnSessionRow,
  type SessionEndRow,
} from '../platform/auth/session.queries.ts';
import { IDLE_SECONDS } from '../platform/auth/session-times.ts';
import { Sessions } from '../platform/auth/sessions.ts';
import { toInstant } from '../platform/database/codecs.ts';
import { UnitOfWork } from '../platform/database/unit-of-work.ts';
import { AppError } from '../platform/http/app-error.ts';

/** Where one is signed in, and how to end it. */
@Injectable()
export class OwnSessions {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly sessions: Sessions,
  ) {}

  async list(actor: Actor): Promise<SessionView[]> {
    const rows = await this.uow.rows<OwnSessionRow>(null, SELECT_OWN_SESSIONS, [actor.userId, IDLE_SECONDS]);
    return rows.map((row) => ({
      id: row.id,
      isCurrent: row.id === actor.sessionId,
      startedAt: toInstant(row.created_at),
      lastUsedAt: toInstant(row.last_used_at),
      ip: row.ip,
      userAgent: row.user_agent,
    }));
  }

  /** Until when this session lasts unless it is used. */
  async end(actor: Actor): Promise<SessionEndView> {
    const row = await this.uow.row<SessionEndRow>(null, SELECT_SESSION_END, [actor.sessionId, IDLE_SECONDS]);
    if (row === null) throw new AppError('unauthenticated');
    const isFinal = row.expires_at <= row.idle_end;
    return { endsAt: toInstant(isFinal ? row.expires_at : row.idle_end), isFinal };
  }

  /** @throws AppError not_found for another person's session, as for one that is not there */
  async endOne(actor: Actor, sessionId: string, origin: Origin): Promise<void> {
    const ending = { sessionId, because: 'ended_by_hand', origin };
    const isEnded = await this.uow.run((tx) => this.sessions.endOneOf(tx, actor.userId, ending));
    if (!isEnded) throw new AppError('not_found');
  }

  async endOthers(actor: Actor, origin: Origin): Promise<void> {
    const ending = { except: actor.sessionId, because: 'ended_by_hand', origin };
    await this.uow.run((tx) => this.sessions.endAllOf(tx, actor.userId, ending));
  }
}
