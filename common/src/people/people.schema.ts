import { z } from 'zod';
import { textSchema } from '../api/index.ts';
import { latSchema, lonSchema, zipSchema } from '../places/index.ts';
import { companyKinds } from './roles.ts';

export const emailSchema = z
  .string()
  .trim()
  .toLowerCase()
  .pipe(z.email('An e-mail address such as name@company.example').max(254));

/** 12 to 128 characters, nothing required of their kind; the server also refuses well-known ones. */
export const passwordSchema = z
  .string()
  .min(12, 'At least 12 characters; a sentence works well')
  .max(128, 'At most 128 characters');

export const phoneSchema = z
  .string()
  .trim()
  .regex(/^[+0-9 ().-]{7,25}$/, 'Digits with spaces, dots, dashes or brackets');

export const signUpSchema = z.strictObject({
  name: textSchema(120),
  email: emailSchema,
  password: passwordSchema,
  company: z.strictObject({
    kind: z.enum(companyKinds),
    name: textSchema(160),
    phone: phoneSchema,
  }),
});
export type SignUp = z.infer<typeof signUpSchema>;

export const signInSchema = z.strictObject({
  email: emailSchema,
  password: z.string().min(1, 'Your password').max(128),
  /** Of the second factor, where there is one: six digits, or a recovery code. */
  code: z.string().trim().min(6, 'Six digits, or a recovery code').max(60).optional(),
});
export type SignIn = z.infer<typeof signInSchema>;

export const verifyEmailSchema = z.strictObject({ token: z.string().min(20).max(100) });
export type VerifyEmail = z.infer<typeof verifyEmailSchema>;

/** Methods a crew offers; the engine's method codes. */
export const methods = [
  'flat_saw',
  'wall_saw',
  'hand_saw',
  'ring_saw',
  'chain_saw',
  'wire_saw',
  'core_drill',
  'stitch_drill',
  'joint_saw',
] as const;
export type Method = (typeof methods)[number];

export const editCompanySchema = z.strictObject({
  name: textSchema(160),
  phone: phoneSchema,
  /** The rest is for cutting contractors: where the trucks start and how far they go. */
  yard: z.strictObject({ zip: zipSchema, lat: latSchema, lon: lonSchema }).nullable(),
  serviceRadiusMi: z.number().int().min(1).max(1000).nullable(),
  methods: z.array(z.enum(methods)).max(methods.length),
});
export type EditCompany = z.infer<typeof editCompanySchema>;

export const unitNameSchema = z.strictObject({ id: z.uuid(), name: textSchema(80) });
/** A crew (people who go out together) or a truck: what a visit books. */
export type NewUnit = z.infer<typeof unitNameSchema>;
