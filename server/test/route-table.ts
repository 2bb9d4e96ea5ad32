import { execFile } from 'node:child_process';
import { join } from 'node:path';
import { promisify } from 'node:util';

export interface RouteArgument {
  kind: 'body' | 'query' | 'param';
  name: string | null;
  hasSchema: boolean;
  /** Places in its schema where unknown fields pass. */
  loose: string[];
}

export interface Route {
  handler: string;
  method: 'get' | 'post' | 'put' | 'patch' | 'delete';
  path: string;
  access: { kind: 'public' } | { kind: 'signed_in' } | { kind: 'permission'; name: string } | null;
  arguments: RouteArgument[];
  isIdempotent: boolean;
}

export interface SocketMessage {
  handler: string;
  message: string;
  access: Route['access'];
}

/** Every route and socket handler of the built server, from its decorators. */
export async function readRouteTable(): Promise<{ routes: Route[]; messages: SocketMessage[] }> {
  const { stdout } = await promisify(execFile)(process.execPath, [join(__dirname, 'list-routes.mjs')], {
    maxBuffer: 10_000_000,
  });
  return JSON.parse(stdout) as { routes: Route[]; messages: SocketMessage[] };
}

export const routeName = (route: Pick<Route, 'method' | 'path'>): string =>
  `${route.method.toUpperCase()} ${route.path}`;
