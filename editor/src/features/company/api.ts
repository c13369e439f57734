import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { type Answer, answer, server } from '../../lib/api/client';
import { meKey } from '../../lib/me';
import type { Region } from '../../lib/regions';
import { saveBlob } from '../../lib/save-blob';

export type Company = Answer<'/api/company', 'get'>;
export type CompanySettings = Company['settings'];

const companyKey = ['company'] as const;

export const companyQuery = queryOptions({
  queryKey: companyKey,
  queryFn: ({ signal }) => answer(server.GET('/api/company', { signal })),
});

export interface CompanyEdit {
  readonly name?: string;
  readonly region?: Region;
  readonly settings?: CompanySettings;
}

export function useEditCompany() {
  const cache = useQueryClient();
  return useMutation({
    mutationFn: (edit: CompanyEdit) => answer(server.PATCH('/api/company', { body: edit })),
    onSuccess: async (company) => {
      cache.setQueryData(companyKey, company);
      await cache.invalidateQueries({ queryKey: meKey });
    },
  });
}

/** Fetches everything the company has, as one archive, and hands it to the browser's downloads. */
export const useExportCompany = () =>
  useMutation({
    mutationFn: async () => {
      const { data, response } = await server.POST('/api/company/export', { parseAs: 'blob' });
      if (!(data instanceof Blob)) throw new TypeError('The export came without a file.');
      const name = /filename="([^"]+)"/.exec(response.headers.get('content-disposition') ?? '')?.[1];
      saveBlob(data, name ?? 'company.tar.gz');
    },
  });

/** Deletes the company with everything in it. The person may belong to others, or to none. */
export function useDeleteCompany() {
  const cache = useQueryClient();
  return useMutation({
    mutationFn: (proof: { password: string; name: string }) => server.DELETE('/api/company', { body: proof }),
    onSuccess: async () => {
      cache.removeQueries({ predicate: (query) => query.queryKey[0] !== meKey[0] });
      await cache.refetchQueries({ queryKey: meKey });
    },
  });
}
