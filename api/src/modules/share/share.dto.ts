import { eveningPlaceSchema, nightSceneSchema } from '@lampwright/geometry/light';
import { z } from 'zod';
import { LIGHT_PICTURE } from '../proposals/pictures.js';
import { questionSchema } from '../proposals/proposals.dto.js';
import { differencesSchema, revisionDocumentSchema } from '../proposals/revision-document.js';

/** What the homeowner's page is made from. No cost, no margin, no other recipients. */
export const sharedDueSchema = z.strictObject({
  id: z.uuid(),
  name: z.string(),
  due: z.enum(['approval', 'start', 'finish']),
  /** What is asked for, less what was taken off and what is paid. */
  outstandingMinor: z.number().int(),
  amountMinor: z.number().int(),
  paidMinor: z.number().int(),
  /** The company has asked for it. */
  requested: z.boolean(),
  /** It can be paid now by card. False for one that is asked for where the company takes no cards. */
  payable: z.boolean(),
  /** A payment by card that is not settled yet. */
  pending: z.boolean(),
});

export const sharedPaperSchema = z.strictObject({
  id: z.string(),
  name: z.string(),
  /** Null while it is being made. */
  url: z.string().nullable(),
});

export const sharedPageSchema = z.strictObject({
  state: z.enum(['open', 'approved', 'declined', 'expired', 'withdrawn']),
  /** Whom the link was sent to. */
  recipient: z.string(),
  revisionId: z.uuid(),
  /** Without the plan's records, which the page does not need, and without what it asks for by itself. */
  document: revisionDocumentSchema.omit({ plan: true, evening: true }),
  hash: z.string(),
  /** The one to be seen first leads. */
  pictures: z.array(
    z.strictObject({
      sheetId: z.string(),
      url: z.string(),
      /** A smaller one of the same, and the screens (a media query) that it is enough for at first. */
      light: z.strictObject({ url: z.string(), media: z.string() }),
      widthPx: z.number(),
      heightPx: z.number(),
      /** How many parts of its lights switch apart in its evening; null: it has no lights, or no scale to show them by. */
      night: z.strictObject({ zones: z.number().int().min(1) }).nullable(),
    }),
  ),
  /** Against the approved revision; null where nothing was approved before. */
  differences: differencesSchema.nullable(),
  approval: z
    .strictObject({
      typedName: z.string(),
      at: z.iso.datetime(),
      groups: z.array(z.string()),
      totalMinor: z.number().int(),
      revision: z.number().int(),
    })
    .nullable(),
  decline: z.strictObject({ reason: z.string(), at: z.iso.datetime() }).nullable(),
  /** The sentences to agree to, word for word. */
  sentences: z.strictObject({ approval: z.string(), consent: z.string() }),
  questions: z.array(questionSchema),
  dues: z.array(sharedDueSchema),
  papers: z.array(sharedPaperSchema),
});
export type SharedPage = z.infer<typeof sharedPageSchema>;

/** What the page makes its night pictures from, sheet by sheet; the one to be seen first leads. */
export const sharedNightSchema = z.strictObject({
  evening: eveningPlaceSchema,
  scenes: z.array(nightSceneSchema),
});
export type SharedNight = z.infer<typeof sharedNightSchema>;

/** `width` asks for the light picture. */
export const pictureQuerySchema = z.strictObject({
  width: z.literal(String(LIGHT_PICTURE.edgePx)).optional(),
});
export type PictureQuery = z.infer<typeof pictureQuerySchema>;

export const askSchema = z.strictObject({
  text: z.string().trim().min(1, { error: 'Please write your question.' }).max(4000),
  recordId: z.string().max(64).nullable(),
  point: z.strictObject({ sheetId: z.string().max(64), x: z.number(), y: z.number() }).nullable(),
});
export type Ask = z.infer<typeof askSchema>;

export const approveSchema = z.strictObject({
  /** What was on the screen: refused when it is not the newest any more. */
  revisionId: z.uuid(),
  hash: z.string(),
  groups: z.array(z.string()).max(6),
  totalMinor: z.number().int(),
  typedName: z.string().trim().min(2, { error: 'Please type your full name.' }).max(120),
  agreed: z.literal(true, { error: 'Please confirm that you approve.' }),
  consented: z.literal(true, { error: 'Please confirm that electronic records are fine with you.' }),
});
export type Approve = z.infer<typeof approveSchema>;

export const declineSchema = z.strictObject({
  revisionId: z.uuid(),
  reason: z.string().trim().max(2000),
});
export type Decline = z.infer<typeof declineSchema>;

export const checkoutSchema = z.strictObject({ url: z.string() });
export type Checkout = z.infer<typeof checkoutSchema>;
