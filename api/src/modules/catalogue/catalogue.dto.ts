import { catalogueItemSchema } from '@lampwright/geometry/catalogue';
import { z } from 'zod';

export const catalogueCategories = [
  'fixture',
  'lamp',
  'cable',
  'transformer',
  'hub',
  'connector',
  'control',
  'part',
] as const;

export const catalogueQuerySchema = z.strictObject({
  category: z.enum(catalogueCategories).optional(),
  search: z.string().trim().max(120).optional(),
  archived: z.enum(['true', 'false']).optional(),
});
export type CatalogueQuery = z.infer<typeof catalogueQuerySchema>;

export const catalogueInputSchema = z.strictObject({ item: catalogueItemSchema });
export type CatalogueInput = z.infer<typeof catalogueInputSchema>;

export const catalogueEntrySchema = z.strictObject({
  id: z.uuid(),
  item: catalogueItemSchema,
  createdAt: z.iso.datetime(),
  updatedAt: z.iso.datetime(),
  archivedAt: z.iso.datetime().nullable(),
});
export type CatalogueEntry = z.infer<typeof catalogueEntrySchema>;

export const catalogueSchema = z.strictObject({ items: z.array(catalogueEntrySchema) });
export type Catalogue = z.infer<typeof catalogueSchema>;
