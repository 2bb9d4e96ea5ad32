import { z } from 'zod';
import { idSchema } from '../api/index.ts';
import { emailSchema } from './people.schema.ts';
import { roles } from './roles.ts';

const limitCents = z.number().int().min(0).max(100_000_000_000).nullable();

/** What one person may sign, set aside and approve, in cents; null is unlimited. An owner always is. */
export const limitsSchema = z.strictObject({
  signCents: limitCents,
  setAsideCents: limitCents,
  changeCents: limitCents,
});

export const inviteSchema = z.strictObject({
  id: idSchema,
  email: emailSchema,
  role: z.enum(roles),
  limits: limitsSchema,
});
export type Invite = z.infer<typeof inviteSchema>;

export const editMemberSchema = z.strictObject({ role: z.enum(roles), limits: limitsSchema });
export type EditMember = z.infer<typeof editMemberSchema>;
