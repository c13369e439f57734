import { z } from 'zod';

export const sheetViewSchema = z.enum(['photo', 'plan']);
export type SheetView = z.infer<typeof sheetViewSchema>;

/** A yard photo or plot plan as the server keeps it. */
export const sheetSchema = z.object({
  id: z.string(),
  name: z.string(),
  view: sheetViewSchema,
  status: z.enum(['uploaded', 'processing', 'choose-page', 'ready', 'failed']),
  /** What went wrong, in a sentence. */
  failure: z.string().nullable(),
  /** It failed, and the file is still there to be tried again. */
  canRetry: z.boolean(),
  pageCount: z.number().nullable(),
  page: z.number().nullable(),
  widthPx: z.number().nullable(),
  heightPx: z.number().nullable(),
  imageUrl: z.string().nullable(),
  thumbnailUrl: z.string().nullable(),
  createdAt: z.string(),
});
export type Sheet = z.infer<typeof sheetSchema>;

export const sheetListSchema = z.object({ items: z.array(sheetSchema) });

/** The server is still at work on it: worth asking again. */
export const isUnderWay = (sheet: Sheet): boolean =>
  sheet.status === 'uploaded' || sheet.status === 'processing';
