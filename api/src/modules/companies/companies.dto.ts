import { z } from 'zod';
import { givenPassword, lineOfText } from '../../access/person-fields.js';
import {
  companySettingsEditSchema,
  companySettingsSchema,
  regionalWordsSchema,
  regionSchema,
} from './settings.js';

const name = lineOfText(120, 'Please enter the name of your company.');

export const companySchema = z.strictObject({
  id: z.uuid(),
  name: z.string(),
  region: regionSchema,
  settings: companySettingsSchema,
  words: regionalWordsSchema,
  createdAt: z.iso.datetime(),
});
export type Company = z.infer<typeof companySchema>;

export const companyEditSchema = z.strictObject({
  name: name.optional(),
  region: regionSchema.optional(),
  settings: companySettingsEditSchema.optional(),
});
export type CompanyEdit = z.infer<typeof companyEditSchema>;

/** The name is typed once more, so that nobody deletes another company than they think. */
export const companyDeletionSchema = z.strictObject({ password: givenPassword, name: z.string().trim() });
export type CompanyDeletion = z.infer<typeof companyDeletionSchema>;
