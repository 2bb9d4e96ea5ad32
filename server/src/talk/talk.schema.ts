import { z } from 'zod';
import { MAX_PAGE } from '@kerfyard/common/api';

/** Messages page backwards from the newest by their sequence number. */
export const messagesQuerySchema = z.strictObject({
  before: z.coerce.number().int().min(1).max(Number.MAX_SAFE_INTEGER).optional(),
  limit: z.coerce.number().int().min(1).max(MAX_PAGE).default(30),
});
export type MessagesQuery = z.output<typeof messagesQuerySchema>;
