import { keepPreviousData, queryOptions } from '@tanstack/react-query';
import { type Answer, answer, server } from './api/client';

export type Client = Answer<'/api/clients/{id}', 'get'>;
export type Property = Answer<'/api/properties/{id}', 'get'>;

export interface ClientListAsk {
  readonly search?: string;
  readonly page?: number;
  readonly archived?: boolean;
}

export const clientsKey = ['clients'] as const;
export const clientKey = (clientId: string) => [...clientsKey, 'one', clientId] as const;
export const propertiesKey = ['properties'] as const;

const PAGE_SIZE = 25;

export const clientListQuery = ({ search = '', page = 1, archived = false }: ClientListAsk) =>
  queryOptions({
    queryKey: [...clientsKey, 'list', { search, page, archived }],
    queryFn: ({ signal }) =>
      answer(
        server.GET('/api/clients', {
          signal,
          params: {
            query: {
              search: search || undefined,
              page,
              pageSize: PAGE_SIZE,
              archived: archived ? 'true' : undefined,
            },
          },
        }),
      ),
    placeholderData: keepPreviousData,
  });

export const clientQuery = (clientId: string) =>
  queryOptions({
    queryKey: clientKey(clientId),
    queryFn: ({ signal }) =>
      answer(server.GET('/api/clients/{id}', { signal, params: { path: { id: clientId } } })),
  });

export const propertiesQuery = (clientId: string) =>
  queryOptions({
    queryKey: [...propertiesKey, clientId],
    queryFn: async ({ signal }) =>
      (await answer(server.GET('/api/properties', { signal, params: { query: { clientId } } }))).items,
  });
