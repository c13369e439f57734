import { z } from 'zod';

const fields = {
  name: z.string().trim().min(1, { error: 'Please enter a name.' }).max(120),
  address: z.string().trim().max(400),
  region: z.string().trim().max(80),
  accessNotes: z.string().trim().max(4000),
  /** Degrees north, degrees east (WGS 84). */
  latitude: z.number().min(-90).max(90).nullable(),
  longitude: z.number().min(-180).max(180).nullable(),
};

export const propertyFieldsSchema = z.strictObject({
  name: fields.name,
  address: fields.address,
  region: fields.region.optional(),
  accessNotes: fields.accessNotes.optional(),
  latitude: fields.latitude.optional(),
  longitude: fields.longitude.optional(),
});
export type PropertyFields = z.infer<typeof propertyFieldsSchema>;

export const newPropertySchema = propertyFieldsSchema.extend({ clientId: z.uuid() });
export type NewProperty = z.infer<typeof newPropertySchema>;

export const propertyEditSchema = propertyFieldsSchema.partial();
export type PropertyEdit = z.infer<typeof propertyEditSchema>;

export const propertyListQuerySchema = z.strictObject({ clientId: z.uuid() });
export type PropertyListQuery = z.infer<typeof propertyListQuerySchema>;

export const propertySchema = z.strictObject({
  id: z.uuid(),
  clientId: z.uuid(),
  name: z.string(),
  address: z.string(),
  region: z.string(),
  accessNotes: z.string(),
  latitude: z.number().nullable(),
  longitude: z.number().nullable(),
  createdAt: z.iso.datetime(),
  updatedAt: z.iso.datetime(),
});
export type Property = z.infer<typeof propertySchema>;

export const propertyListSchema = z.strictObject({ items: z.array(propertySchema) });
export type PropertyList = z.infer<typeof propertyListSchema>;
