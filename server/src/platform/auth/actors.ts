import { Injectable } from '@nestjs/common';
import type { Actor } from '@kerfyard/common/people';
import { toNumber } from '../database/codecs.ts';
import { UnitOfWork } from '../database/unit-of-work.ts';
import { SELECT_ACTOR_OF_SESSION, type ActorRow } from './actor.queries.ts';
import { IDLE_SECONDS } from './session-times.ts';

/** Reads who someone is: person, company, role, limits. */
@Injectable()
export class Actors {
  constructor(private readonly uow: UnitOfWork) {}

  /** Whoever a session belongs to, or null when it ended, ran out or the person was deactivated. */
  async ofSession(session: { sid: string; sub: string }): Promise<Actor | null> {
    const bind = [session.sid, session.sub, IDLE_SECONDS];
    const row = await this.uow.row<ActorRow>(null, SELECT_ACTOR_OF_SESSION, bind);
    return row === null ? null : toActor(row, session.sid);
  }
}

function toActor(row: ActorRow, sessionId: string): Actor {
  // Owners have no limits, whatever their row says.
  const limit = (cents: string | null) => (row.role === 'owner' ? null : toNumber(cents));
  return {
    userId: row.user_id,
    sessionId,
    name: row.name,
    isStaff: row.is_staff,
    company: companyOf(row),
    role: row.role,
    limits: {
      signCents: limit(row.sign_limit_cents),
      setAsideCents: limit(row.set_aside_limit_cents),
      changeCents: limit(row.change_limit_cents),
    },
  };
}

function companyOf({ company_id: id, company_kind: kind, company_name: name }: ActorRow): Actor['company'] {
  return id === null || kind === null || name === null ? null : { id, kind, name };
}
