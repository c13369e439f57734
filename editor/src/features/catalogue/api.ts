import type { CatalogueCategory, CatalogueItem } from '@lampwright/geometry/catalogue';
import { keepPreviousData, queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { type Answer, answer, server } from '../../lib/api/client';

export type CatalogueEntry = Answer<'/api/catalogue', 'get'>['items'][number];

const catalogueKey = ['catalogue'] as const;

export interface CatalogueAsk {
  readonly category: CatalogueCategory;
  readonly search: string;
  readonly archived: boolean;
}

export const catalogueQuery = ({ category, search, archived }: CatalogueAsk) =>
  queryOptions({
    queryKey: [...catalogueKey, { category, search, archived }],
    queryFn: async ({ signal }) =>
      (
        await answer(
          server.GET('/api/catalogue', {
            signal,
            params: {
              query: { category, search: search || undefined, archived: archived ? 'true' : undefined },
            },
          }),
        )
      ).items,
    placeholderData: keepPreviousData,
  });

/** The whole catalogue; one item of it is found there, since there are a few dozen, not thousands. */
export const wholeCatalogueQuery = queryOptions({
  queryKey: [...catalogueKey, 'all'],
  queryFn: async ({ signal }): Promise<readonly CatalogueEntry[]> => {
    const [current, archived] = await Promise.all([
      answer(server.GET('/api/catalogue', { signal })),
      answer(server.GET('/api/catalogue', { signal, params: { query: { archived: 'true' } } })),
    ]);
    const known = new Map([...current.items, ...archived.items].map((entry) => [entry.id, entry]));
    return [...known.values()];
  },
});

const at = (id: string) => ({ params: { path: { id } } });

function useCatalogueChange<V>(change: (value: V) => Promise<CatalogueEntry>) {
  const cache = useQueryClient();
  return useMutation({
    mutationFn: change,
    onSuccess: () => cache.invalidateQueries({ queryKey: catalogueKey }),
  });
}

export const useAddItem = () =>
  useCatalogueChange((item: CatalogueItem) => answer(server.POST('/api/catalogue', { body: { item } })));

export const useReplaceItem = (id: string) =>
  useCatalogueChange((item: CatalogueItem) =>
    answer(server.PUT('/api/catalogue/{id}', { ...at(id), body: { item } })),
  );

export const useArchiveItem = () =>
  useCatalogueChange((id: string) => answer(server.POST('/api/catalogue/{id}/archive', at(id))));

export const useRestoreItem = () =>
  useCatalogueChange((id: string) => answer(server.POST('/api/catalogue/{id}/restore', at(id))));
