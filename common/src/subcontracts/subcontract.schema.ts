import { z } from 'zod';
import { pageQuerySchema, textSchema } from '../api/index.ts';

/** A signature: the name as typed, and the hash of the document that was read. */
export const signSchema = z.strictObject({
  name: textSchema(120),
  documentSha256: z.string().regex(/^[0-9a-f]{64}$/),
});
export type Sign = z.output<typeof signSchema>;

export const workQuerySchema = pageQuerySchema.extend({
  status: z.enum(['awaiting_signatures', 'active', 'completed', 'lapsed']).optional(),
});
export type WorkQuery = z.infer<typeof workQuerySchema>;
