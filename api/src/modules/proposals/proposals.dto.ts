import { z } from 'zod';
import { differencesSchema, proposalWordsSchema, revisionDocumentSchema } from './revision-document.js';

const version = z.number().int().min(0);
const email = z.email({ error: 'Please enter an e-mail address.' }).max(254);

/** The company's side of every proposal. */
export const proposalTextsSchema = z.strictObject({
  words: proposalWordsSchema,
  company: z.strictObject({
    email: z.union([email, z.literal('')]),
    phone: z.string().trim().max(40),
    address: z.string().trim().max(300),
    licence: z.string().trim().max(80),
  }),
  /** Days after sending on which somebody who has not answered is reminded; empty: never. */
  reminderDays: z.array(z.number().int().min(1).max(180)).max(5),
});
export type ProposalTexts = z.infer<typeof proposalTextsSchema>;
export const proposalTextsAnswerSchema = z.strictObject({ version, texts: proposalTextsSchema });
export type ProposalTextsAnswer = z.infer<typeof proposalTextsAnswerSchema>;
export const proposalTextsEditSchema = z.strictObject({ baseVersion: version, texts: proposalTextsSchema });
export type ProposalTextsEdit = z.infer<typeof proposalTextsEditSchema>;

/** What a job says in place of the company's words: only what differs. */
export const jobWordsSchema = proposalWordsSchema.partial();
export type JobWords = z.infer<typeof jobWordsSchema>;

export const proposalStates = [
  'draft',
  'preparing',
  'ready',
  'sent',
  'opened',
  'commented',
  'approved',
  'declined',
  'expired',
  'withdrawn',
] as const;
export const proposalStateSchema = z.enum(proposalStates);
export type ProposalState = z.infer<typeof proposalStateSchema>;

export const revisionSchema = z.strictObject({
  id: z.uuid(),
  revision: z.number().int(),
  state: proposalStateSchema,
  /** It changes an approved one. */
  changeOrder: z.boolean(),
  planVersion: version,
  hash: z.string(),
  totalMinor: z.number().int(),
  progress: z.number().int(),
  failure: z.string().nullable(),
  pdfUrl: z.string().nullable(),
  validUntil: z.iso.date(),
  createdAt: z.iso.datetime(),
  createdBy: z.string(),
  sentAt: z.iso.datetime().nullable(),
  releasedAt: z.iso.datetime().nullable(),
  approval: z
    .strictObject({
      typedName: z.string(),
      at: z.iso.datetime(),
      groups: z.array(z.string()),
      totalMinor: z.number().int(),
      signedPdfUrl: z.string().nullable(),
    })
    .nullable(),
  decline: z.strictObject({ reason: z.string(), at: z.iso.datetime() }).nullable(),
});
export type Revision = z.infer<typeof revisionSchema>;

export const linkSchema = z.strictObject({
  id: z.uuid(),
  name: z.string(),
  email: z.string(),
  createdAt: z.iso.datetime(),
  expiresAt: z.iso.datetime(),
  revokedAt: z.iso.datetime().nullable(),
  openedAt: z.iso.datetime().nullable(),
  remindersSent: z.number().int(),
});
export type ProposalLink = z.infer<typeof linkSchema>;

export const proposalSchema = z.strictObject({
  /** Null before the first revision. */
  number: z.number().int().nullable(),
  state: proposalStateSchema,
  currency: z.string(),
  locale: z.string(),
  /** The plan or the price has changed since the newest revision. */
  stale: z.boolean(),
  /** The words in force, and which of them are the job's own. */
  words: proposalWordsSchema,
  own: z.array(z.string()),
  /** Newest first. */
  revisions: z.array(revisionSchema),
  links: z.array(linkSchema),
});
export type Proposal = z.infer<typeof proposalSchema>;

export const revisionDetailSchema = z.strictObject({
  revision: revisionSchema,
  document: revisionDocumentSchema,
  /** Against the approved revision, or else the one before. */
  differences: differencesSchema.nullable(),
});
export type RevisionDetail = z.infer<typeof revisionDetailSchema>;

export const sendSchema = z.strictObject({
  recipients: z
    .array(z.strictObject({ name: z.string().trim().max(120), email }))
    .min(1, { error: 'Please name somebody to send it to.' })
    .max(5),
  message: z.string().trim().max(4000),
});
export type Send = z.infer<typeof sendSchema>;

export const questionMessageSchema = z.strictObject({
  id: z.uuid(),
  side: z.enum(['homeowner', 'company']),
  authorName: z.string(),
  text: z.string(),
  at: z.iso.datetime(),
});
export const questionSchema = z.strictObject({
  id: z.uuid(),
  /** The light it is pinned to, or a point of a sheet, or neither. */
  recordId: z.string().nullable(),
  sheetId: z.string().nullable(),
  x: z.number().nullable(),
  y: z.number().nullable(),
  revision: z.number().int(),
  resolvedAt: z.iso.datetime().nullable(),
  messages: z.array(questionMessageSchema),
});
export type Question = z.infer<typeof questionSchema>;
export const questionsSchema = z.strictObject({ items: z.array(questionSchema) });
export type Questions = z.infer<typeof questionsSchema>;

export const newMessageSchema = z.strictObject({
  text: z.string().trim().min(1, { error: 'Please write something.' }).max(4000),
});
export type NewMessage = z.infer<typeof newMessageSchema>;
