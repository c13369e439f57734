import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { act, get, patch, post } from '../../lib/api/client';
import { jobAddress, jobKey, jobsKey } from '../../lib/jobs';
import { isUnderWay, type Sheet, sheetListSchema, sheetSchema } from '../../lib/sheets';

const ASK_AGAIN_MS = 1_500;

const sheetsKey = (jobId: string) => ['sheets', jobId] as const;
const sheetAddress = (sheetId: string) => `/api/sheets/${encodeURIComponent(sheetId)}`;

/** The small picture of a page, to choose by. */
export const pagePreview = (sheetId: string, page: number): string =>
  `${sheetAddress(sheetId)}/pages/${page}`;

/** The job's sheets; asked again while the server is at work on any. */
export const sheetsQuery = (jobId: string, initial: readonly Sheet[]) =>
  queryOptions({
    queryKey: sheetsKey(jobId),
    queryFn: async ({ signal }): Promise<readonly Sheet[]> =>
      (await get(`${jobAddress(jobId)}/sheets`, sheetListSchema, { signal })).items,
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
  useSheetChange(jobId, (page: number) => post(`${sheetAddress(sheetId)}/page`, { page }, sheetSchema));

export const useRetrySheet = (jobId: string, sheetId: string) =>
  useSheetChange(jobId, () => post(`${sheetAddress(sheetId)}/retry`, {}, sheetSchema));

export const useRenameSheet = (jobId: string, sheetId: string) =>
  useSheetChange(jobId, (name: string) => patch(sheetAddress(sheetId), { name }, sheetSchema));

export const useRemoveSheet = (jobId: string, sheetId: string) =>
  useSheetChange(jobId, () => act('DELETE', sheetAddress(sheetId)));
