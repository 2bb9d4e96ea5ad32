import { createServer } from 'node:http';
import type { IncomingMessage, ServerResponse } from 'node:http';
import { closeServer, isFromAnotherSite, listen, sendJson } from '../shared/http.ts';
import { ApiHandler } from './api.ts';
import type { StandInConfig } from './config.ts';
import { handleControl } from './control/control-api.ts';
import { handlePage } from './pages/pages.ts';
import { StandIn } from './stand-in.ts';

export interface RunningStandIn {
  url: string;
  port: number;
  close(): Promise<void>;
}

/** Starts the payment provider's stand-in. Rejects when the port is taken. */
export async function startPaymentStandIn(config: StandInConfig): Promise<RunningStandIn> {
  const standIn = new StandIn(config);
  const api = new ApiHandler(standIn);
  const serve = async (request: IncomingMessage, response: ServerResponse): Promise<void> => {
    const path = request.url ?? '/';
    if (path.startsWith('/v1/')) return api.handle(request, response);
    if (isFromAnotherSite(request)) return sendJson(response, 403, { error: 'not from another site' });
    if (path.startsWith('/_fake/')) return handleControl(standIn, request, response);
    return handlePage(standIn, request, response);
  };
  const server = createServer((request, response) => {
    serve(request, response).catch((error: unknown) => {
      console.error('payment stand-in:', error);
      if (!response.headersSent) response.writeHead(500);
      response.end();
    });
  });
  // Longer than clients keep idle connections, so that none is cut just as it is used again.
  server.keepAliveTimeout = 120_000;
  const port = await listen(server, config.port, config.host);
  const url = `http://${config.host}:${port}`;
  standIn.start(url);
  return {
    url,
    port,
    async close() {
      await closeServer(server);
      standIn.close();
    },
  };
}
