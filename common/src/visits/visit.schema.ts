import { z } from 'zod';
import { idSchema, instantSchema, textSchema } from '../api/index.ts';

/** A crew on site from one instant to another: half-open, at most 24 hours. */
export const windowSchema = z
  .strictObject({ startsAt: instantSchema, endsAt: instantSchema })
  .refine((w) => Date.parse(w.endsAt) > Date.parse(w.startsAt), {
    path: ['endsAt'],
    message: 'After the start',
  })
  .refine((w) => Date.parse(w.endsAt) - Date.parse(w.startsAt) <= 24 * 3_600_000, {
    path: ['endsAt'],
    message: 'At most 24 hours',
  });
export type VisitWindow = z.output<typeof windowSchema>;

export const proposeVisitSchema = z.strictObject({
  id: idSchema,
  subcontractId: idSchema,
  crewId: idSchema,
  truckId: idSchema,
  sovLineIds: z.array(idSchema).min(1, 'At least one line of work').max(500),
  windows: z.array(windowSchema).min(1, 'At least one window').max(5, 'At most five windows'),
  note: textSchema(500, 0).default(''),
});
export type ProposeVisit = z.output<typeof proposeVisitSchema>;

export const confirmVisitSchema = z.strictObject({ window: windowSchema });
export const cancelVisitSchema = z.strictObject({ reason: textSchema(500) });

/** Visits of a span of days (a week view asks for one week); at most 62 days. */
export const visitsQuerySchema = z
  .strictObject({ from: instantSchema, to: instantSchema })
  .refine((q) => Date.parse(q.to) > Date.parse(q.from), { path: ['to'], message: 'After the start' })
  .refine((q) => Date.parse(q.to) - Date.parse(q.from) <= 62 * 86_400_000, {
    path: ['to'],
    message: 'At most 62 days',
  });
export type VisitsQuery = z.output<typeof visitsQuerySchema>;
