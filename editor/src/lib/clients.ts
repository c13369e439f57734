import { queryOptions } from '@tanstack/react-query';
import { z } from 'zod';
import { get } from './api/client';

export const clientSchema = z.object({
  id: z.string(),
  name: z.string(),
  email: z.string().nullable(),
  phone: z.string().nullable(),
  createdAt: z.string(),
  updatedAt: z.string(),
  archivedAt: z.string().nullable(),
});
export type Client = z.infer<typeof clientSchema>;

export const clientListSchema = z.object({
  items: z.array(clientSchema.extend({ jobs: z.number() })),
  total: z.number(),
  page: z.number(),
  pageSize: z.number(),
});

export const propertySchema = z.object({
  id: z.string(),
  clientId: z.string(),
  name: z.string(),
  address: z.string(),
  region: z.string(),
  accessNotes: z.string(),
  latitude: z.number().nullable(),
  longitude: z.number().nullable(),
});
export type Property = z.infer<typeof propertySchema>;

export interface ClientListAsk {
  readonly search?: string;
  readonly page?: number;
  readonly archived?: boolean;
}

export const clientsKey = ['clients'] as const;
export const propertiesKey = ['properties'] as const;

export const clientListQuery = ({ search = '', page = 1, archived = false }: ClientListAsk) =>
  queryOptions({
    queryKey: [...clientsKey, 'list', { search, page, archived }],
    queryFn: ({ signal }) =>
      get('/api/clients', clientListSchema, {
        signal,
        query: { search, page, pageSize: 25, archived: archived ? 'true' : undefined },
      }),
  });

export const clientQuery = (clientId: string) =>
  queryOptions({
    queryKey: [...clientsKey, 'one', clientId],
    queryFn: ({ signal }) => get(`/api/clients/${encodeURIComponent(clientId)}`, clientSchema, { signal }),
  });

export const propertiesQuery = (clientId: string) =>
  queryOptions({
    queryKey: [...propertiesKey, clientId],
    queryFn: async ({ signal }) =>
      (
        await get('/api/properties', z.object({ items: z.array(propertySchema) }), {
          signal,
          query: { clientId },
        })
      ).items,
  });
