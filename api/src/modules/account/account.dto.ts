import { z } from 'zod';
import { emailAddress, givenPassword, newPassword, personName } from '../../access/person-fields.js';
import { preferencesSchema } from '../auth/auth.dto.js';

export const accountEditSchema = z.strictObject({
  name: personName.optional(),
  preferences: preferencesSchema.partial().optional(),
});
export type AccountEdit = z.infer<typeof accountEditSchema>;

export const passwordChangeSchema = z.strictObject({ current: givenPassword, next: newPassword });
export type PasswordChange = z.infer<typeof passwordChangeSchema>;

export const emailChangeSchema = z.strictObject({ password: givenPassword, email: emailAddress });
export type EmailChange = z.infer<typeof emailChangeSchema>;

export const accountDeletionSchema = z.strictObject({ password: givenPassword });
export type AccountDeletion = z.infer<typeof accountDeletionSchema>;

export const sessionSchema = z.strictObject({
  id: z.uuid(),
  /** What the browser called itself at sign-in. */
  userAgent: z.string(),
  createdAt: z.iso.datetime(),
  lastUsedAt: z.iso.datetime(),
  /** The one that asks. */
  current: z.boolean(),
});
export const sessionListSchema = z.strictObject({ items: z.array(sessionSchema) });
export type SessionList = z.infer<typeof sessionListSchema>;
