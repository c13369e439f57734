import { z } from 'zod';
import { clientSchema, newClientSchema } from '../clients/clients.dto.js';
import { propertyFieldsSchema, propertySchema } from '../properties/properties.dto.js';
import { sheetSchema } from '../sheets/sheets.dto.js';
import { siteWalkSchema } from './site-walk.dto.js';

/** The eight stages of a job, in order. */
export const jobStages = [
  'enquiry',
  'plan',
  'prove',
  'propose',
  'prepare',
  'install',
  'commission',
  'aftercare',
] as const;
const stage = z.enum(jobStages);
export type JobStage = z.infer<typeof stage>;

const name = z.string().trim().min(1, { error: 'Please enter a name for the job.' }).max(120);
const notes = z.string().max(8000);
const day = z.iso.date({ error: 'A date is written year-month-day, like 2026-05-31.' });
const reference = z.strictObject({ id: z.uuid() });

export const newJobSchema = z.strictObject({
  name,
  client: z.union([reference, newClientSchema]),
  property: z.union([reference, propertyFieldsSchema]),
  existingSystem: z.boolean().optional(),
  notes: notes.optional(),
});
export type NewJob = z.infer<typeof newJobSchema>;

export const jobEditSchema = z.strictObject({
  name: name.optional(),
  stage: stage.optional(),
  notes: notes.optional(),
  siteWalkOn: day.nullish(),
  installOn: day.nullish(),
  existingSystem: z.boolean().optional(),
});
export type JobEdit = z.infer<typeof jobEditSchema>;

export const jobListQuerySchema = z.strictObject({
  search: z.string().trim().max(120).optional(),
  stage: stage.optional(),
  archived: z.enum(['true', 'false']).optional(),
  sort: z.enum(['updated', 'name', 'stage', 'created']).optional(),
  direction: z.enum(['asc', 'desc']).optional(),
  page: z.coerce.number().int().min(1).max(100_000).optional(),
  pageSize: z.coerce.number().int().min(1).max(100).optional(),
});
export type JobListQuery = z.infer<typeof jobListQuerySchema>;

export const jobListSchema = z.strictObject({
  items: z.array(
    z.strictObject({
      id: z.uuid(),
      name: z.string(),
      stage,
      existingSystem: z.boolean(),
      client: z.strictObject({ id: z.uuid(), name: z.string() }),
      property: z.strictObject({ id: z.uuid(), name: z.string(), address: z.string() }),
      thumbnailUrl: z.string().nullable(),
      /** Of the plan, as the server last worked them out; null before it has. */
      faults: z.number().int().nullable(),
      cautions: z.number().int().nullable(),
      fixtures: z.number().int().nullable(),
      updatedAt: z.iso.datetime(),
      archivedAt: z.iso.datetime().nullable(),
    }),
  ),
  total: z.number().int(),
  page: z.number().int(),
  pageSize: z.number().int(),
});
export type JobList = z.infer<typeof jobListSchema>;

export const jobSchema = z.strictObject({
  id: z.uuid(),
  name: z.string(),
  stage,
  existingSystem: z.boolean(),
  notes: z.string(),
  siteWalkOn: z.iso.date().nullable(),
  installOn: z.iso.date().nullable(),
  client: clientSchema,
  property: propertySchema,
  /** Null until the form is first saved. */
  siteWalk: siteWalkSchema.nullable(),
  sheets: z.array(sheetSchema),
  createdAt: z.iso.datetime(),
  updatedAt: z.iso.datetime(),
  archivedAt: z.iso.datetime().nullable(),
});
export type Job = z.infer<typeof jobSchema>;
