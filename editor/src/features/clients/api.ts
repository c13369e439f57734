import { useMutation, useQueryClient } from '@tanstack/react-query';
import { answer, server } from '../../lib/api/client';
import { type Client, clientKey, clientsKey, propertiesKey } from '../../lib/clients';
import { jobsKey } from '../../lib/jobs';

const at = (id: string) => ({ params: { path: { id } } });

export interface ClientFields {
  readonly name: string;
  readonly email: string | null;
  readonly phone: string | null;
}

export function useAddClient() {
  const cache = useQueryClient();
  return useMutation({
    mutationFn: (fields: ClientFields) => answer(server.POST('/api/clients', { body: fields })),
    onSuccess: () => cache.invalidateQueries({ queryKey: clientsKey }),
  });
}

/** A changed client shows in jobs as well. */
function useClientChange<V>(clientId: string, change: (value: V) => Promise<Client>) {
  const cache = useQueryClient();
  return useMutation({
    mutationFn: change,
    onSuccess: async (client) => {
      cache.setQueryData(clientKey(clientId), client);
      await Promise.all([
        cache.invalidateQueries({ queryKey: [...clientsKey, 'list'] }),
        cache.invalidateQueries({ queryKey: jobsKey }),
      ]);
    },
  });
}

export const useEditClient = (clientId: string) =>
  useClientChange(clientId, (fields: ClientFields) =>
    answer(server.PATCH('/api/clients/{id}', { ...at(clientId), body: fields })),
  );

export const useArchiveClient = (clientId: string) =>
  useClientChange(clientId, () => answer(server.POST('/api/clients/{id}/archive', at(clientId))));

export const useRestoreClient = (clientId: string) =>
  useClientChange(clientId, () => answer(server.POST('/api/clients/{id}/restore', at(clientId))));

export interface PropertyFields {
  readonly name: string;
  readonly address: string;
  readonly region: string;
  readonly accessNotes: string;
  readonly latitude: number | null;
  readonly longitude: number | null;
}

function usePropertyChange<V>(change: (value: V) => Promise<unknown>) {
  const cache = useQueryClient();
  return useMutation({
    mutationFn: change,
    onSuccess: () =>
      Promise.all([
        cache.invalidateQueries({ queryKey: propertiesKey }),
        cache.invalidateQueries({ queryKey: jobsKey }),
      ]),
  });
}

export const useAddProperty = (clientId: string) =>
  usePropertyChange((fields: PropertyFields) =>
    server.POST('/api/properties', { body: { ...fields, clientId } }),
  );

export const useEditProperty = (propertyId: string) =>
  usePropertyChange((fields: PropertyFields) =>
    server.PATCH('/api/properties/{id}', { ...at(propertyId), body: fields }),
  );
