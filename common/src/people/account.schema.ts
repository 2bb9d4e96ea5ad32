import { z } from 'zod';
import { textSchema } from '../api/index.ts';
import { emailSchema, passwordSchema } from './people.schema.ts';

/**
 * The secret of a link in a mail. Any text is taken, so that a half-copied link is answered as such and not as an
 * unreadable request.
 */
export const linkTokenSchema = z.string().trim().min(1).max(400);

export const askResetSchema = z.strictObject({ email: emailSchema });
export type AskReset = z.infer<typeof askResetSchema>;

export const resetPasswordSchema = z.strictObject({ token: linkTokenSchema, password: passwordSchema });
export type ResetPassword = z.infer<typeof resetPasswordSchema>;

export const linkSchema = z.strictObject({ token: linkTokenSchema });
export type LinkUse = z.infer<typeof linkSchema>;

export const changePasswordSchema = z.strictObject({
  current: z.string().min(1, 'Your password').max(128),
  password: passwordSchema,
});
export type ChangePassword = z.infer<typeof changePasswordSchema>;

export const changeEmailSchema = z.strictObject({ email: emailSchema });
export type ChangeEmail = z.infer<typeof changeEmailSchema>;

/** Six digits of an authenticator app, or a recovery code; spaces and dashes are as people like them. */
export const secondFactorCodeSchema = z.string().trim().min(6, 'Six digits, or a recovery code').max(60);

/** Six digits alone: what proves that an authenticator app has the secret. */
export const authenticatorCodeSchema = z
  .string()
  .transform((text) => text.replace(/\s/g, ''))
  .pipe(z.string().regex(/^\d{6}$/, 'Six digits'));

export const setSecondFactorSchema = z.strictObject({ code: authenticatorCodeSchema });
export type SetSecondFactor = z.infer<typeof setSecondFactorSchema>;

export const confirmWithPasswordSchema = z.strictObject({
  password: z.string().min(1, 'Your password').max(128),
});
export const confirmWithCodeSchema = z.strictObject({ code: secondFactorCodeSchema });

/** Says again who one is, before a sensitive act: by password, or by code where there is a second factor. */
export const confirmSchema = z
  .strictObject({
    password: z.string().min(1, 'Your password').max(128).optional(),
    code: secondFactorCodeSchema.optional(),
  })
  .refine(({ password, code }) => (password === undefined) !== (code === undefined), {
    message: 'A password or a code',
    path: ['password'],
  });
export type Confirm = z.infer<typeof confirmSchema>;

export const acceptInvitationSchema = z.strictObject({
  token: linkTokenSchema,
  name: textSchema(120),
  password: passwordSchema,
});
export type AcceptInvitation = z.infer<typeof acceptInvitationSchema>;
