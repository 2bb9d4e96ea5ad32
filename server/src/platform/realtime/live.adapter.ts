import type { INestApplicationContext } from '@nestjs/common';
import { IoAdapter } from '@nestjs/platform-socket.io';
import { Server } from 'socket.io';
import type { Config } from '../config/config.ts';
import { allowedOrigins, isFromOurPages } from '../http/origins.ts';

export const MAX_MESSAGE_BYTES = 64 * 1024;

type NestServer = ReturnType<IoAdapter['createIOServer']>;

/** Sockets on the app's own port, for the app's own pages, with small messages. */
export class LiveAdapter extends IoAdapter {
  private readonly origins: ReadonlySet<string>;

  constructor(app: INestApplicationContext, config: Config) {
    super(app);
    this.origins = allowedOrigins(config);
  }

  override createIOServer(): NestServer {
    // Ours and not the copy that Nest's adapter brings: one version of the protocol in the whole app.
    const server = new Server(this.httpServer, {
      serveClient: false,
      maxHttpBufferSize: MAX_MESSAGE_BYTES,
      connectTimeout: 10_000,
      // A line that died without closing is noticed within these two together.
      pingInterval: 10_000,
      pingTimeout: 8_000,
      // Browsers open sockets to any host without asking, cookies included: the origin is the only fence.
      allowRequest: (request, decide) => decide(null, isFromOurPages(this.origins, request.headers)),
    });
    return server as unknown as NestServer;
  }
}
