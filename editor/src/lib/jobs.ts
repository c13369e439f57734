import { queryOptions } from '@tanstack/react-query';
import { z } from 'zod';
import { get } from './api/client';
import { clientSchema, propertySchema } from './clients';
import { sheetSchema } from './sheets';
import { siteWalkSchema } from './site-walk';
import { stageSchema } from './stages';

export const jobSchema = z.object({
  id: z.string(),
  name: z.string(),
  stage: stageSchema,
  existingSystem: z.boolean(),
  notes: z.string(),
  siteWalkOn: z.string().nullable(),
  installOn: z.string().nullable(),
  client: clientSchema,
  property: propertySchema,
  /** Null until the form is first saved. */
  siteWalk: siteWalkSchema.nullable(),
  sheets: z.array(sheetSchema),
  createdAt: z.string(),
  updatedAt: z.string(),
  archivedAt: z.string().nullable(),
});
export type Job = z.infer<typeof jobSchema>;

export const jobsKey = ['jobs'] as const;
export const jobKey = (jobId: string) => [...jobsKey, 'one', jobId] as const;
export const jobAddress = (jobId: string) => `/api/jobs/${encodeURIComponent(jobId)}`;

/** One job with its client, property, site walk and sheets. */
export const jobQuery = (jobId: string) =>
  queryOptions({
    queryKey: jobKey(jobId),
    queryFn: ({ signal }) => get(jobAddress(jobId), jobSchema, { signal }),
  });
