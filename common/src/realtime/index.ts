import { z } from 'zod';
import { idSchema } from '../api/index.ts';

/**
 * Hints over the socket: ids and sequence numbers, never rows, so a rival's price cannot leak. A client refetches
 * what a hint names; on a gap in `seq` or a reconnect it refetches all active live queries once.
 */
export type Hint =
  | { topic: 'scopes' }
  | { topic: 'scope'; scopeId: string; seq: number }
  | { topic: 'bids'; scopeId: string; seq: number }
  | { topic: 'own_bid'; scopeId: string }
  | { topic: 'subcontract'; subcontractId: string; seq: number }
  | { topic: 'visits' }
  | { topic: 'thread'; threadId: string; seq: number }
  | { topic: 'money'; subcontractId: string };

export const watchSchema = z.discriminatedUnion('topic', [
  z.strictObject({ topic: z.literal('scope'), id: idSchema }),
  z.strictObject({ topic: z.literal('subcontract'), id: idSchema }),
  z.strictObject({ topic: z.literal('thread'), id: idSchema }),
]);
export type Watch = z.infer<typeof watchSchema>;

/** Answer to `watch`: joined, or not (unknown and foreign ids answer the same). */
export interface WatchAck {
  ok: boolean;
}

export interface ServerToClientEvents {
  hint: (hint: Hint) => void;
  /** The session ended elsewhere or ran out; the client signs in again. */
  session_ended: () => void;
}

export interface ClientToServerEvents {
  watch: (watch: Watch, ack: (answer: WatchAck) => void) => void;
  unwatch: (watch: Watch) => void;
}
