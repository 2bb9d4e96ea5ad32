import { z } from 'zod';
import { idSchema } from '../api/index.ts';

const sovLineIds = z.array(idSchema).min(1, 'Choose at least one line').max(500);

/** Which lines to set aside and how; the server computes every amount. */
export const setAsideSchema = z.strictObject({ id: idSchema, sovLineIds, method: z.enum(['card']) });
export type SetAside = z.output<typeof setAsideSchema>;

export const setAsideQuoteSchema = z.strictObject({ sovLineIds, method: z.enum(['card']) });

/** Release what a completion was accepted for. */
export const releaseSchema = z.strictObject({ id: idSchema, completionId: idSchema });
export type Release = z.output<typeof releaseSchema>;
