import { z } from 'zod';
import { roles } from '../../access/permissions.js';
import {
  emailAddress,
  givenPassword,
  lineOfText,
  linkToken,
  newPassword,
  personName,
} from '../../access/person-fields.js';
import { companySettingsSchema, regionalWordsSchema, regionSchema } from '../companies/settings.js';

export const signUpSchema = z.strictObject({
  companyName: lineOfText(120, 'Please enter the name of your company.'),
  name: personName,
  email: emailAddress,
  password: newPassword,
  region: regionSchema.optional(),
});
export type SignUp = z.infer<typeof signUpSchema>;

export const signInSchema = z.strictObject({ email: emailAddress, password: givenPassword });
export type SignIn = z.infer<typeof signInSchema>;

export const forgotPasswordSchema = z.strictObject({ email: emailAddress });
export type ForgotPassword = z.infer<typeof forgotPasswordSchema>;

export const resetPasswordSchema = z.strictObject({ token: linkToken, password: newPassword });
export type ResetPassword = z.infer<typeof resetPasswordSchema>;

export const confirmEmailSchema = z.strictObject({ token: linkToken });
export type ConfirmEmail = z.infer<typeof confirmEmailSchema>;

export const activeCompanySchema = z.strictObject({ companyId: z.uuid() });
export type ActiveCompany = z.infer<typeof activeCompanySchema>;

export const preferencesSchema = z.strictObject({
  units: z.enum(['imperial', 'metric']),
  theme: z.enum(['light', 'dark', 'system']),
});
export type Preferences = z.infer<typeof preferencesSchema>;

const role = z.enum(roles);

/** Who is signed in, the company they act for, and those they may change to. */
export const meSchema = z.strictObject({
  user: z.strictObject({
    id: z.uuid(),
    name: z.string(),
    email: z.string(),
    preferences: preferencesSchema,
  }),
  company: z
    .strictObject({
      id: z.uuid(),
      name: z.string(),
      region: regionSchema,
      settings: companySettingsSchema,
      words: regionalWordsSchema,
    })
    .nullable(),
  role: role.nullable(),
  companies: z.array(z.strictObject({ id: z.uuid(), name: z.string(), role })),
});
export type Me = z.infer<typeof meSchema>;
