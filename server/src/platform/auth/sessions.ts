import { Injectable } from '@nestjs/common';
import { Audit } from '../audit/audit.ts';
import { Clock } from '../clock/clock.ts';
import { UnitOfWork, type Tx } from '../database/unit-of-work.ts';
import { newId } from '../ids/ids.ts';
import { LiveHints } from '../realtime/live-hints.ts';
import type { Origin } from './access.decorators.ts';
import { AccessTokens } from './access-tokens.ts';
import type { SessionTokens } from './cookies.ts';
import {
  hasHash,
  newRefreshToken,
  openSuccessor,
  parseRefreshToken,
  sealSuccessor,
  type RefreshToken,
} from './refresh-token.ts';
import {
  END_SESSION,
  END_SESSIONS_OF,
  INSERT_SESSION,
  LOCK_SESSION,
  PROVE_SESSION,
  ROTATE_SESSION,
  SELECT_DEAD_SESSIONS,
  SELECT_OWN_SESSION,
  SELECT_SESSION_STATE,
  TOUCH_SESSION,
  type SessionRow,
} from './session.queries.ts';
import { ABSOLUTE_SECONDS, GRACE_SECONDS, IDLE_SECONDS } from './session-times.ts';

/** Opens, renews and ends sessions. The row is the session; tokens only point at it. */
@Injectable()
export class Sessions {
  constructor(
    private readonly uow: UnitOfWork,
    private readonly accessTokens: AccessTokens,
    private readonly audit: Audit,
    private readonly hints: LiveHints,
    private readonly clock: Clock,
  ) {}

  /** A new session; never one that a browser brought along. */
  async open(tx: Tx, userId: string, origin: Origin): Promise<SessionTokens> {
    const refresh = newRefreshToken(newId());
    await this.uow.rows(tx, INSERT_SESSION, [
      refresh.sessionId,
      userId,
      refresh.hash,
      ABSOLUTE_SECONDS,
      origin.ip,
      origin.userAgent,
    ]);
    return this.tokens(userId, refresh);
  }

  /**
   * New tokens for a refresh token, or null. The token is replaced by its successor; one that was replaced more than
   * the grace ago is in two hands, so its session ends for both.
   */
  async refresh(cookie: string | null, origin: Origin): Promise<SessionTokens | null> {
    const token = parseRefreshToken(cookie);
    if (token === null) return null;
    const result = await this.uow.run((tx) => this.rotate(tx, token, origin));
    if (result === 'reused') {
      this.hints.endSession(token.sessionId);
      return null;
    }
    return result;
  }

  private async rotate(
    tx: Tx,
    token: RefreshToken,
    origin: Origin,
  ): Promise<SessionTokens | 'reused' | null> {
    const session = await this.state(tx, token.sessionId);
    if (session === null || !session.is_live) return null;
    if (hasHash(token, session.refresh_hash)) {
      // Replaced a moment ago: once per grace is enough, and the one before keeps leading to this one.
      if (session.is_in_grace) {
        await this.uow.rows(tx, TOUCH_SESSION, [session.id]);
        return this.tokens(session.user_id, token);
      }
      const successor = newRefreshToken(session.id);
      await this.uow.rows(tx, ROTATE_SESSION, [session.id, successor.hash, sealSuccessor(token, successor)]);
      return this.tokens(session.user_id, successor);
    }
    if (session.is_in_grace && session.successor_sealed !== null && hasHash(token, session.previous_hash)) {
      return this.tokens(session.user_id, openSuccessor(token, session.successor_sealed));
    }
    await this.end(tx, session.id, 'refresh_reused', origin);
    return 'reused';
  }

  /** Ends a session in the transaction; the caller closes its sockets after the commit by `LiveHints.endSession`. */
  async end(tx: Tx, sessionId: string, because: string, origin: Origin): Promise<void> {
    const ended = await this.uow.row<{ user_id: string }>(tx, END_SESSION, [sessionId, because]);
    if (ended === null) return;
    await this.audit.write(tx, {
      actor: null,
      action: 'session.ended',
      subject: { type: 'session', id: sessionId },
      detail: { because, userId: ended.user_id },
      origin,
    });
  }

  /**
   * Ends the session of a refresh token that is really its own (the current or the one just replaced). Whether it did:
   * then the caller closes its sockets after the commit.
   */
  async endHeldBy(tx: Tx, token: RefreshToken, because: string, origin: Origin): Promise<boolean> {
    const session = await this.state(tx, token.sessionId);
    if (session === null) return false;
    if (!hasHash(token, session.refresh_hash) && !hasHash(token, session.previous_hash)) return false;
    await this.end(tx, session.id, because, origin);
    return true;
  }

  /** Ends the session that the browser holds, and its sockets. */
  async signOut(cookie: string | null, origin: Origin): Promise<void> {
    const token = parseRefreshToken(cookie);
    if (token === null) return;
    const isEnded = await this.uow.run((tx) => this.endHeldBy(tx, token, 'signed_out', origin));
    if (isEnded) this.hints.endSession(token.sessionId);
  }

  /** Ends all sessions of a person but one, and their sockets once the transaction has committed. How many. */
  async endAllOf(
    tx: Tx,
    userId: string,
    ending: { except: string | null; because: string; origin: Origin },
  ): Promise<number> {
    const { except, because, origin } = ending;
    const ended = await this.uow.rows<{ id: string }>(tx, END_SESSIONS_OF, [userId, except, because]);
    for (const { id } of ended) {
      await this.audit.write(tx, {
        actor: null,
        action: 'session.ended',
        subject: { type: 'session', id },
        detail: { because, userId },
        origin,
      });
      this.uow.afterCommit(tx, () => this.hints.endSession(id));
    }
    return ended.length;
  }

  /** Ends one session of a person, and its sockets after the commit. Whether it was theirs and open. */
  async endOneOf(
    tx: Tx,
    userId: string,
    ending: { sessionId: string; because: string; origin: Origin },
  ): Promise<boolean> {
    const { sessionId, because, origin } = ending;
    const own = await this.uow.row(tx, SELECT_OWN_SESSION, [sessionId, userId]);
    if (own === null) return false;
    await this.end(tx, sessionId, because, origin);
    this.uow.afterCommit(tx, () => this.hints.endSession(sessionId));
    return true;
  }

  /** The holder of the session has just given a password or a code. */
  async prove(tx: Tx, sessionId: string): Promise<void> {
    await this.uow.rows(tx, PROVE_SESSION, [sessionId]);
  }

  private async state(tx: Tx, sessionId: string): Promise<SessionRow | null> {
    await this.uow.rows(tx, LOCK_SESSION, [sessionId]);
    return this.uow.row<SessionRow>(tx, SELECT_SESSION_STATE, [sessionId, GRACE_SECONDS, IDLE_SECONDS]);
  }

  /** Which of these sessions may no longer hold a socket open. */
  async dead(sessionIds: string[]): Promise<string[]> {
    const rows = await this.uow.rows<{ id: string }>(null, SELECT_DEAD_SESSIONS, [sessionIds, IDLE_SECONDS]);
    return rows.map((row) => row.id);
  }

  private tokens(userId: string, refresh: RefreshToken): SessionTokens {
    return {
      access: this.accessTokens.sign(userId, refresh.sessionId),
      refresh: refresh.text,
      refreshUntil: new Date(this.clock.wallMs() + IDLE_SECONDS * 1_000),
    };
  }
}
