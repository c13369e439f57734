import { z } from 'zod';

const name = z.string().trim().min(1, { error: 'Please enter a name.' }).max(120);
const email = z.email({ error: 'This is not an e-mail address.' }).max(254);
const phone = z.string().trim().max(40);

export const newClientSchema = z.strictObject({
  name,
  email: email.nullish(),
  phone: phone.nullish(),
});
export type NewClient = z.infer<typeof newClientSchema>;

export const clientEditSchema = z.strictObject({
  name: name.optional(),
  email: email.nullish(),
  phone: phone.nullish(),
});
export type ClientEdit = z.infer<typeof clientEditSchema>;

export const clientListQuerySchema = z.strictObject({
  search: z.string().trim().max(120).optional(),
  archived: z.enum(['true', 'false']).optional(),
  page: z.coerce.number().int().min(1).max(100_000).optional(),
  pageSize: z.coerce.number().int().min(1).max(100).optional(),
});
export type ClientListQuery = z.infer<typeof clientListQuerySchema>;

export const clientSchema = z.strictObject({
  id: z.uuid(),
  name: z.string(),
  email: z.string().nullable(),
  phone: z.string().nullable(),
  createdAt: z.iso.datetime(),
  updatedAt: z.iso.datetime(),
  archivedAt: z.iso.datetime().nullable(),
});
export type Client = z.infer<typeof clientSchema>;

export const clientListSchema = z.strictObject({
  items: z.array(
    clientSchema.extend({
      /** Jobs that are not archived. */
      jobs: z.number().int(),
    }),
  ),
  total: z.number().int(),
  page: z.number().int(),
  pageSize: z.number().int(),
});
export type ClientList = z.infer<typeof clientListSchema>;
