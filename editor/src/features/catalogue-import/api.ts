import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { type Answer, answer, server } from '../../lib/api/client';
import { upload } from '../../lib/api/upload';
import { useOnce } from '../../lib/once';

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

export const previewQuery = (ask: ImportAsk | null, stamp: number) =>
  queryOptions({
    queryKey: [...importsKey, 'preview', stamp] as const,
    enabled: ask !== null,
    queryFn: ({ signal }) => {
      if (!ask) throw new TypeError('There is no table to preview.');
      return answer(server.POST('/api/catalogue/imports/preview', { body: ask, signal }));
    },
    gcTime: 0,
  });

export function useTakeImport() {
  const cache = useQueryClient();
  return useOnce(
    (ask: ImportAsk, headers) => answer(server.POST('/api/catalogue/imports', { body: ask, headers })),
    () => cache.invalidateQueries({ queryKey: ['catalogue'] }),
  );
}

export function useUndoImport() {
  const cache = useQueryClient();
  return useMutation({
    mutationFn: (importId: string) =>
      answer(server.POST('/api/catalogue/imports/{importId}/undo', { params: { path: { importId } } })),
    onSuccess: () => cache.invalidateQueries({ queryKey: ['catalogue'] }),
  });
}
