import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { answer, server } from '../../lib/api/client';
import { jobKey, jobsKey } from '../../lib/jobs';
import { isUnderWay, type Sheet } from '../../lib/sheets';

const ASK_AGAIN_MS = 1_500;

const sheetsKey = (jobId: string) => ['sheets', jobId] as const;
const at = (id: string) => ({ params: { path: { id } } });

/** The small picture of a page, to choose by. */
export const pagePreview = (sheetId: string, page: number): string =>
  `/api/sheets/${encodeURIComponent(sheetId)}/pages/${page}`;

/** The job's sheets; asked again while the server is at work on any. */
export const sheetsQuery = (jobId: string, initial: readonly Sheet[]) =>
  queryOptions({
    queryKey: sheetsKey(jobId),
    queryFn: async ({ signal }): Promise<readonly Sheet[]> =>
      (await answer(server.GET('/api/jobs/{id}/sheets', { signal, ...at(jobId) }))).items,
    placeholderData: initial,
    refetchInterval: ({ state }) => (state.data?.some(isUnderWay) ? ASK_AGAIN_MS : false),
  });

/** Reads the sheets and what shows them anew. */
export function useRefreshSheets(jobId: string) {
  const client = useQueryClient();
  return () =>
    Promise.all([
      client.invalidateQueries({ queryKey: sheetsKey(jobId) }),
      client.invalidateQueries({ queryKey: jobKey(jobId) }),
      client.invalidateQueries({ queryKey: [...jobsKey, 'list'] }),
    ]);
}

function useSheetChange<V>(jobId: string, change: (value: V) => Promise<unknown>) {
  const refresh = useRefreshSheets(jobId);
  return useMutation({ mutationFn: change, onSuccess: refresh });
}

export const useChoosePage = (jobId: string, sheetId: string) =>
  useSheetChange(jobId, (page: number) =>
    server.POST('/api/sheets/{id}/page', { ...at(sheetId), body: { page } }),
  );

export const useRetrySheet = (jobId: string, sheetId: string) =>
  useSheetChange(jobId, () => server.POST('/api/sheets/{id}/retry', at(sheetId)));

export const useRenameSheet = (jobId: string, sheetId: string) =>
  useSheetChange(jobId, (name: string) =>
    server.PATCH('/api/sheets/{id}', { ...at(sheetId), body: { name } }),
  );

export const useRemoveSheet = (jobId: string, sheetId: string) =>
  useSheetChange(jobId, () => server.DELETE('/api/sheets/{id}', at(sheetId)));
