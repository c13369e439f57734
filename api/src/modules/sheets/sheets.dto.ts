import { z } from 'zod';

const name = z.string().trim().min(1, { error: 'Please enter a name for the sheet.' }).max(120);

export const sheetViews = ['photo', 'plan'] as const;
export type SheetView = (typeof sheetViews)[number];

/** A file as it lies in the temporary folder. */
export interface ReceivedFile {
  readonly path: string;
  readonly size: number;
  readonly originalname: string;
}
const isReceived = (file: unknown): file is ReceivedFile =>
  typeof file === 'object' && file !== null && 'path' in file && 'size' in file && 'originalname' in file;

/** The form of an upload, with the file as the interceptor received it. */
export const sheetUploadSchema = z.strictObject({
  view: z.enum(sheetViews),
  name: name.optional(),
  file: z
    .custom<ReceivedFile>(isReceived, { error: 'Please choose a file.' })
    .meta({ type: 'string', format: 'binary' }),
});
export type SheetUpload = z.infer<typeof sheetUploadSchema>;

export const sheetEditSchema = z.strictObject({ name });
export type SheetEdit = z.infer<typeof sheetEditSchema>;

export const sheetPageSchema = z.strictObject({ page: z.number().int().min(1).max(10_000) });
export type SheetPage = z.infer<typeof sheetPageSchema>;

export const sheetSchema = z.strictObject({
  id: z.uuid(),
  name: z.string(),
  view: z.enum(sheetViews),
  status: z.enum(['uploaded', 'processing', 'choose-page', 'ready', 'failed']),
  /** What went wrong, in a sentence. */
  failure: z.string().nullable(),
  /** The uploaded file is still there, and trying again may help. */
  canRetry: z.boolean(),
  pageCount: z.number().int().nullable(),
  page: z.number().int().nullable(),
  widthPx: z.number().int().nullable(),
  heightPx: z.number().int().nullable(),
  pixelsPerPaperMeter: z.number().nullable(),
  imageUrl: z.string().nullable(),
  thumbnailUrl: z.string().nullable(),
  createdAt: z.iso.datetime(),
});
export type Sheet = z.infer<typeof sheetSchema>;

export const sheetListSchema = z.strictObject({ items: z.array(sheetSchema) });
export type SheetList = z.infer<typeof sheetListSchema>;
