import { Injectable } from '@nestjs/common';
import type { Server } from 'socket.io';
import type { ClientToServerEvents, Hint, ServerToClientEvents } from '@kerfyard/common/realtime';

export type LiveServer = Server<ClientToServerEvents, ServerToClientEvents>;

/** Names of rooms. Only the server joins a socket to one, after an access check. */
export const rooms = {
  user: (userId: string) => `user:${userId}`,
  session: (sessionId: string) => `session:${sessionId}`,
  company: (companyId: string) => `company:${companyId}`,
  /** Every signed-in cutting contractor: hears that the list of open scopes changed. */
  crews: 'crews',
  /** Those who look at one scope; its own company hears by its company room as well. */
  scope: (scopeId: string) => `scope:${scopeId}`,
  subcontract: (id: string) => `subcontract:${id}`,
  thread: (id: string) => `thread:${id}`,
} as const;

/** Emits hints (ids and sequence numbers, never rows). Called after `uow.run` has resolved, never inside. */
@Injectable()
export class LiveHints {
  private server: LiveServer | null = null;

  attach(server: LiveServer): void {
    this.server = server;
  }

  emit(to: string | string[], hint: Hint): void {
    this.server?.to(to).emit('hint', hint);
  }

  /** Close the sockets of an ended session. */
  endSession(sessionId: string): void {
    this.server?.to(rooms.session(sessionId)).emit('session_ended');
    this.server?.in(rooms.session(sessionId)).disconnectSockets(true);
  }

  /** Close the sockets of a person whose role changed: they come back as who they are now. */
  reconnect(userId: string): void {
    this.server?.in(rooms.user(userId)).disconnectSockets(true);
  }
}
