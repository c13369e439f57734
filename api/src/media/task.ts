import { z } from 'zod';

/** One piece of work for the decoding child. Paths are absolute; the folder is the task's own. */
export type DecodeTask =
  | {
      readonly kind: 'image';
      readonly input: string;
      readonly folder: string;
      /** A drawing is kept without loss where that is not too large; a photo never needs to be. */
      readonly drawing: boolean;
    }
  | { readonly kind: 'pdf-inspect'; readonly input: string; readonly folder: string }
  | { readonly kind: 'pdf-page'; readonly input: string; readonly folder: string; readonly page: number }
  | {
      readonly kind: 'table';
      readonly input: string;
      readonly folder: string;
      readonly format: 'csv' | 'xlsx';
    };

const px = z.number().int().min(1);
const picture = {
  image: z.string(),
  imageType: z.enum(['image/jpeg', 'image/png']),
  thumbnail: z.string(),
  widthPx: px,
  heightPx: px,
};

/** What the child says. It has handled hostile bytes, so what it says is parsed like any other input. */
export const decodeResultSchema = z.discriminatedUnion('kind', [
  z.strictObject({ kind: z.literal('image'), ...picture, maxRssBytes: z.number() }),
  z.strictObject({
    kind: z.literal('pdf-inspect'),
    pageCount: z.number().int().min(1),
    /** Small pictures of the pages, by page number; a page that takes too long has none. */
    previews: z.array(z.strictObject({ page: px, file: z.string() })),
    maxRssBytes: z.number(),
  }),
  z.strictObject({
    kind: z.literal('pdf-page'),
    ...picture,
    /** Pixels per metre of paper at which the page was drawn. */
    pixelsPerPaperMeter: z.number().positive(),
    maxRssBytes: z.number(),
  }),
  z.strictObject({
    kind: z.literal('table'),
    /** A JSON file: rows of texts, the heads of the columns first. */
    file: z.string(),
    maxRssBytes: z.number(),
  }),
  z.strictObject({ kind: z.literal('refused'), code: z.string(), message: z.string() }),
]);
export type DecodeResult = z.infer<typeof decodeResultSchema>;
export type Decoded<K extends DecodeTask['kind']> = Extract<DecodeResult, { kind: K }>;

/** A file that can't be used, with a sentence for the person who sent it. */
export class DecodeRefusal extends Error {
  constructor(
    readonly code: string,
    message: string,
    /** Trying again with the same file may help. */
    readonly passing = false,
  ) {
    super(message);
  }
}
