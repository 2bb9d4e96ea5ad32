import { z } from 'zod';
import { idSchema, MAX_PAGE, pageQuerySchema } from '@kerfyard/common/api';

/** All of a company's threads, or those about one scope. */
export const threadsQuerySchema = pageQuerySchema.extend({ scopeId: idSchema.optional() });
export type ThreadsQuery = z.output<typeof threadsQuerySchema>;

/** Messages page backwards from the newest by their sequence number. */
export const messagesQuerySchema = z.strictObject({
  before: z.coerce.number().int().min(1).max(Number.MAX_SAFE_INTEGER).optional(),
  limit: z.coerce.number().int().min(1).max(MAX_PAGE).default(30),
});
export type MessagesQuery = z.output<typeof messagesQuerySchema>;
