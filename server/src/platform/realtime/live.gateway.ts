import { Inject, Logger, type OnApplicationShutdown } from '@nestjs/common';
import {
  ConnectedSocket,
  MessageBody,
  SubscribeMessage,
  WebSocketGateway,
  type OnGatewayConnection,
  type OnGatewayInit,
} from '@nestjs/websockets';
import cookieParser from 'cookie-parser';
import type { Request } from 'express';
import type { Server, Socket } from 'socket.io';
import type { Actor } from '@kerfyard/common/people';
import {
  watchSchema,
  type ClientToServerEvents,
  type ServerToClientEvents,
  type WatchAck,
} from '@kerfyard/common/realtime';
import { SignedIn } from '../auth/access.decorators.ts';
import { AccessTokens } from '../auth/access-tokens.ts';
import { Actors } from '../auth/actors.ts';
import { readCookie } from '../auth/cookies.ts';
import { Sessions } from '../auth/sessions.ts';
import { Clock } from '../clock/clock.ts';
import { CONFIG, type Config } from '../config/config.ts';
import { safeError } from '../logging/safe-error.ts';
import { LiveHints, rooms } from './live-hints.ts';
import { MessageBudget } from './message-budget.ts';
import { WatchAccess } from './watch-access.ts';

interface SocketData {
  actor: Actor;
}
type NoEvents = Record<string, never>;
type LiveSocket = Socket<ClientToServerEvents, ServerToClientEvents, NoEvents, SocketData>;
type LiveSocketServer = Server<ClientToServerEvents, ServerToClientEvents, NoEvents, SocketData>;

/** An ended or run-out session loses its sockets at once when it ended here, else within this time. */
export const SESSION_CHECK_MS = 5_000;
const MAX_WATCHED = 100;

/** The sockets: who connects is checked like a request, rooms are joined by us alone, and only hints go out. */
@WebSocketGateway()
export class LiveGateway
  implements OnGatewayInit<LiveSocketServer>, OnGatewayConnection<LiveSocket>, OnApplicationShutdown
{
  private readonly logger = new Logger(LiveGateway.name);
  private timer: NodeJS.Timeout | null = null;

  constructor(
    @Inject(CONFIG) private readonly config: Config,
    private readonly accessTokens: AccessTokens,
    private readonly actors: Actors,
    private readonly sessions: Sessions,
    private readonly hints: LiveHints,
    private readonly watchAccess: WatchAccess,
    private readonly clock: Clock,
  ) {}

  afterInit(server: LiveSocketServer): void {
    server.engine.use(cookieParser());
    server.use((socket, next) => {
      this.authenticate(socket).then(
        (actor) => {
          if (actor === null) return next(new Error('unauthenticated'));
          socket.data.actor = actor;
          return next();
        },
        (error: unknown) => {
          this.logger.error({ fault: safeError(error) });
          next(new Error('internal'));
        },
      );
    });
    this.hints.attach(server as unknown as Server<ClientToServerEvents, ServerToClientEvents>);
    this.timer = setInterval(() => void this.dropDeadSessions(server), SESSION_CHECK_MS);
    this.timer.unref();
  }

  onApplicationShutdown(): void {
    if (this.timer !== null) clearInterval(this.timer);
  }

  /** Guards do not run on a handshake, so it asks by itself what they ask: the cookie's token and its session's row. */
  private async authenticate(socket: LiveSocket): Promise<Actor | null> {
    const token = readCookie(this.config, socket.request as unknown as Request, 'access');
    const claims = token === null ? null : this.accessTokens.read(token);
    return claims === null ? null : this.actors.ofSession(claims);
  }

  async handleConnection(socket: LiveSocket): Promise<void> {
    const { actor } = socket.data;
    const budget = new MessageBudget();
    socket.use((_packet, next) => {
      if (budget.take(this.clock.wallMs())) next();
      else socket.disconnect(true);
    });
    await socket.join([rooms.user(actor.userId), rooms.session(actor.sessionId)]);
    if (actor.company === null) return;
    await socket.join(rooms.company(actor.company.id));
    if (actor.company.kind === 'cutting_contractor') await socket.join(rooms.crews);
  }

  /** Unknown, foreign and unreadable answer the same. */
  @SubscribeMessage('watch')
  @SignedIn()
  async watch(@ConnectedSocket() socket: LiveSocket, @MessageBody() input: unknown): Promise<WatchAck> {
    const watch = watchSchema.safeParse(input).data;
    if (watch === undefined || socket.rooms.size >= MAX_WATCHED) return { ok: false };
    if (!(await this.watchAccess.allows(socket.data.actor, watch))) return { ok: false };
    // The access check took time: a socket that went meanwhile joins nothing.
    if (socket.connected) await socket.join(rooms[watch.topic](watch.id));
    return { ok: socket.connected };
  }

  @SubscribeMessage('unwatch')
  @SignedIn()
  async unwatch(@ConnectedSocket() socket: LiveSocket, @MessageBody() input: unknown): Promise<void> {
    const watch = watchSchema.safeParse(input).data;
    if (watch !== undefined) await socket.leave(rooms[watch.topic](watch.id));
  }

  private async dropDeadSessions(server: LiveSocketServer): Promise<void> {
    const held = new Set([...server.sockets.sockets.values()].map(({ data }) => data.actor?.sessionId));
    const ids = [...held].filter((id) => id !== undefined);
    if (ids.length === 0) return;
    try {
      for (const sessionId of await this.sessions.dead(ids)) this.hints.endSession(sessionId);
    } catch (error) {
      this.logger.error({ fault: safeError(error) });
    }
  }
}
