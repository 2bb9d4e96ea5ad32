import { z } from 'zod';
import { idSchema, textSchema } from '../api/index.ts';

/** As-cut of one line of the cut list: as listed, or what was found instead. */
export const asCutSchema = z
  .strictObject({
    cutId: idSchema,
    asListed: z.boolean(),
    /** Only when not as listed. */
    count: z.number().int().min(0).max(10_000).optional(),
    lengthFt: z.number().min(0).max(100_000).optional(),
    depthIn: z.number().min(0).max(240).optional(),
    note: textSchema(500, 0).default(''),
  })
  .refine(
    (row) =>
      row.asListed ||
      row.note.length > 0 ||
      row.count !== undefined ||
      row.lengthFt !== undefined ||
      row.depthIn !== undefined,
    {
      path: ['note'],
      message: 'Say what was cut instead',
    },
  );
export type AsCut = z.output<typeof asCutSchema>;

export const submitCompletionSchema = z.strictObject({
  id: idSchema,
  visitId: idSchema,
  sovLineIds: z.array(idSchema).min(1, 'Choose the lines that are done').max(500),
  asCut: z.array(asCutSchema).max(500),
  photoIds: z.array(idSchema).max(60),
  note: textSchema(2000, 0).default(''),
});
export type SubmitCompletion = z.output<typeof submitCompletionSchema>;
export type SubmitCompletionInput = z.input<typeof submitCompletionSchema>;
