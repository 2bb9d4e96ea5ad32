import { z } from 'zod';

/** One page of a list, read by key: `nextCursor` is opaque and null on the last page. */
export interface Page<Item> {
  items: Item[];
  nextCursor: string | null;
}

export const MAX_PAGE = 100;

/** Query of every list. `limit` is clamped by refusal, not silently: over 100 is an input error. */
export const pageQuerySchema = z.strictObject({
  cursor: z.string().max(400).optional(),
  limit: z.coerce.number().int().min(1).max(MAX_PAGE).default(25),
});
export type PageQuery = z.infer<typeof pageQuerySchema>;

export const idSchema = z.uuid();
/** An instant with its offset; the server answers in UTC with milliseconds. */
export const instantSchema = z.iso.datetime({ offset: true });

/** Text a person types: trimmed, bounded, no control characters but line breaks. */
export function textSchema(max: number, min = 1) {
  return z
    .string()
    .trim()
    .min(min, min === 1 ? 'Write something here' : `At least ${min} characters`)
    .max(max, `At most ${max} characters`)
    .regex(
      /^[^\u0000-\u0009\u000b-\u001f\u007f\u202a-\u202e\u2066-\u2069]*$/,
      'Leave out control characters',
    );
}

/** A person, as others see one. */
export interface PersonView {
  id: string;
  name: string;
}

/** A company, as others see one. */
export interface CompanyView {
  id: string;
  name: string;
}
