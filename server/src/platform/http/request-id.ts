import type { IncomingMessage, ServerResponse } from 'node:http';
import { newId } from '../ids/ids.ts';

/** Every request gets an id of ours (never the caller's), which every answer repeats. */
export function requestId(_request: IncomingMessage, response: ServerResponse): string {
  const id = newId();
  response.setHeader('X-Request-Id', id);
  return id;
}
