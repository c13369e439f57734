import { z } from 'zod';
import { MAX_CELL_CHARACTERS, MAX_TABLE_COLUMNS, MAX_TABLE_ROWS } from '../../media/limits.js';
import { catalogueCategories } from '../catalogue/catalogue.dto.js';
import { type FieldName, fieldNames } from '../catalogue/table/fields.js';

/** The form, as multer hands it on. */
export const tableUploadSchema = z.object({
  file: z.object(
    { path: z.string(), size: z.number(), originalname: z.string() },
    { error: 'Please choose a file.' },
  ),
});
export type TableUpload = z.infer<typeof tableUploadSchema>;

const cell = z.string().max(MAX_CELL_CHARACTERS);
const column = z
  .number()
  .int()
  .min(0)
  .max(MAX_TABLE_COLUMNS - 1);
const fieldName = z.enum(fieldNames as [FieldName, ...FieldName[]]);

/** A file as it was read, with what its columns seem to be. */
export const tableSchema = z.strictObject({
  fileName: z.string(),
  columns: z.array(z.string()),
  rows: z.array(z.array(z.string())),
  /** Column by field; null: none. */
  mapping: z.record(fieldName, column.nullable()),
  fields: z.array(
    z.strictObject({
      name: fieldName,
      header: z.string(),
      money: z.boolean(),
    }),
  ),
  /** Whether whoever asks may bring prices; otherwise columns of money are left out. */
  pricesTaken: z.boolean(),
});
export type Table = z.infer<typeof tableSchema>;

export const importSchema = z.strictObject({
  fileName: z.string().trim().min(1).max(200),
  rows: z.array(z.array(cell).max(MAX_TABLE_COLUMNS)).min(1).max(MAX_TABLE_ROWS),
  mapping: z.partialRecord(fieldName, column.nullable()),
  /** The category of rows that do not say theirs; null: such rows must be about an item that is there. */
  category: z.enum(catalogueCategories).nullable(),
  /** Rows, counted from 0, that are not to be taken. */
  leftOut: z.array(z.number().int().min(0)).max(MAX_TABLE_ROWS),
});
export type Import = z.infer<typeof importSchema>;

export const importRowSchema = z.strictObject({
  /** Counted from 0, without the heads. */
  row: z.number().int(),
  action: z.enum(['add', 'change', 'same', 'fault', 'left-out']),
  name: z.string(),
  itemId: z.string().nullable(),
  changes: z.array(z.strictObject({ field: z.string(), was: z.string(), now: z.string() })),
  faults: z.array(z.strictObject({ column: z.number().int().nullable(), detail: z.string() })),
});
export type ImportRow = z.infer<typeof importRowSchema>;

const counts = {
  added: z.number().int(),
  changed: z.number().int(),
  same: z.number().int(),
  faults: z.number().int(),
  leftOut: z.number().int(),
};
export const previewSchema = z.strictObject({ ...counts, rows: z.array(importRowSchema) });
export type Preview = z.infer<typeof previewSchema>;

const summary = z.strictObject(counts);
export const doneImportSchema = z.strictObject({
  id: z.uuid(),
  fileName: z.string(),
  at: z.iso.datetime(),
  by: z.string(),
  undoneAt: z.iso.datetime().nullable(),
  summary,
});
export type DoneImport = z.infer<typeof doneImportSchema>;
export const doneImportsSchema = z.strictObject({ items: z.array(doneImportSchema) });
export type DoneImports = z.infer<typeof doneImportsSchema>;

export const undoneSchema = z.strictObject({
  /** Items that somebody changed since, and which so stay as they are. */
  kept: z.array(z.string()),
});
export type Undone = z.infer<typeof undoneSchema>;

export const exportQuerySchema = z.strictObject({ format: z.enum(['csv', 'xlsx']) });
export type ExportQuery = z.infer<typeof exportQuerySchema>;
