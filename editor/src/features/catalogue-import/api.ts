import { type QueryClient, queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { type Answer, answer, server } from '../../lib/api/client';
import { fetchOrProblem } from '../../lib/api/transport';
import { upload } from '../../lib/api/upload';
import { useOnce } from '../../lib/once';
import { saveBlob } from '../../lib/save-blob';

export type Table = Answer<'/api/catalogue/tables', 'post'>;
export type Preview = Answer<'/api/catalogue/imports/preview', 'post'>;
export type ImportRow = Preview['rows'][number];
export type DoneImport = Answer<'/api/catalogue/imports', 'get'>['items'][number];
export type FieldName = Table['fields'][number]['name'];
export type Mapping = Table['mapping'];

/** What is asked of the server: the table, which column is what, and which rows are not to be taken. */
export interface ImportAsk {
  readonly fileName: string;
  readonly rows: string[][];
  readonly mapping: Mapping;
  readonly category: DefaultCategory | null;
  readonly leftOut: number[];
}
export type DefaultCategory =
  | 'fixture'
  | 'lamp'
  | 'cable'
  | 'transformer'
  | 'hub'
  | 'connector'
  | 'control'
  | 'part';

const importsKey = ['catalogue', 'imports'] as const;

export const importsQuery = queryOptions({
  queryKey: importsKey,
  queryFn: async ({ signal }) => (await answer(server.GET('/api/catalogue/imports', { signal }))).items,
});

/** Saves the catalogue as a table that can be taken in again. */
export const useSaveCatalogue = () =>
  useMutation({
    mutationFn: async (format: 'csv' | 'xlsx') => {
      const url = new URL(`/api/catalogue/export?format=${format}`, window.location.origin);
      const response = await fetchOrProblem(new Request(url, { credentials: 'same-origin' }));
      saveBlob(await response.blob(), `catalogue.${format}`);
    },
  });

/** Reads a file on the server, which keeps nothing of it. */
export const useReadTable = () =>
  useMutation({
    mutationFn: async (file: File) => {
      const form = new FormData();
      form.set('file', file);
      const signal = new AbortController().signal;
      return (await upload('/api/catalogue/tables', form, { onProgress: () => undefined, signal })) as Table;
    },
  });

/**
 * What taking it in would do. The stamp stands for what is asked: tables are too large to be keys themselves.
 * Not under the key of the catalogue: what is taken in is not to be judged once more.
 */
export const previewQuery = (ask: ImportAsk, stamp: string) =>
  queryOptions({
    queryKey: ['catalogue-import', stamp] as const,
    queryFn: ({ signal }) => answer(server.POST('/api/catalogue/imports/preview', { body: ask, signal })),
    gcTime: 0,
    refetchOnWindowFocus: false,
    refetchOnReconnect: false,
  });

/** Items bring prices, and of both whatever is priced is made. */
const tellOthers = (cache: QueryClient) =>
  Promise.all([
    cache.invalidateQueries({ queryKey: ['catalogue'] }),
    cache.invalidateQueries({ queryKey: ['pricing'] }),
  ]);

export function useTakeImport() {
  const cache = useQueryClient();
  return useOnce(
    (ask: ImportAsk, headers) => answer(server.POST('/api/catalogue/imports', { body: ask, headers })),
    () => tellOthers(cache),
  );
}

export function useUndoImport() {
  const cache = useQueryClient();
  return useMutation({
    mutationFn: (importId: string) =>
      answer(server.POST('/api/catalogue/imports/{importId}/undo', { params: { path: { importId } } })),
    onSuccess: () => tellOthers(cache),
  });
}
