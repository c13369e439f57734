import type { CatalogueItem } from '@lampwright/geometry/catalogue';
import { catalogueItemSchema } from '@lampwright/geometry/catalogue';
import { type PlanDocument, planRecordSchema } from '@lampwright/geometry/plan';
import type { ItemPrice, PriceBook } from '@lampwright/geometry/price';
import { queryOptions, useMutation, useQueryClient } from '@tanstack/react-query';
import { z } from 'zod';
import { type Answer, ApiProblem, answer, server } from '../../lib/api/client';
import type { PricingPort, SaveAnswer } from './store/pricing-store';

export type QuoteAnswer = Answer<'/api/jobs/{jobId}/quote', 'get'>;
export type OpenFault = QuoteAnswer['faults'][number];
export type Obstacle = QuoteAnswer['obstacles'][number];
export type PriceBookAnswer = Answer<'/api/price-book', 'get'>;
export type CataloguePrices = Answer<'/api/catalogue-prices', 'get'>;
export type PriceHistory = Answer<'/api/catalogue/{itemId}/prices', 'get'>;
export type Materials = Answer<'/api/jobs/{jobId}/materials', 'get'>;

const pricingKey = ['pricing'] as const;
const jobPricingKey = (jobId: string) => [...pricingKey, 'job', jobId] as const;
const bookKey = [...pricingKey, 'book'] as const;
const pricesKey = [...pricingKey, 'catalogue'] as const;

const ofJob = (jobId: string) => ({ params: { path: { jobId } } });
const ofItem = (itemId: string) => ({ params: { path: { itemId } } });

export const quoteQuery = (jobId: string) =>
  queryOptions({
    queryKey: [...jobPricingKey(jobId), 'quote'],
    queryFn: ({ signal }) => answer(server.GET('/api/jobs/{jobId}/quote', { ...ofJob(jobId), signal })),
    staleTime: 0,
  });

/** The groups that a job is offered in, and the group of each fixture that is in one. */
export const jobGroupsQuery = (jobId: string) =>
  queryOptions({
    queryKey: [...jobPricingKey(jobId), 'groups'],
    queryFn: async ({ signal }) => {
      const { pricing } = await answer(server.GET('/api/jobs/{jobId}/pricing', { ...ofJob(jobId), signal }));
      return {
        groups: pricing.groups.map(({ id, name, on }) => ({ id, name, on })),
        groupOf: new Map(Object.entries(pricing.members)),
      };
    },
    staleTime: 0,
  });

export const materialsQuery = (jobId: string) =>
  queryOptions({
    queryKey: [...jobPricingKey(jobId), 'materials'],
    queryFn: ({ signal }) => answer(server.GET('/api/jobs/{jobId}/materials', { ...ofJob(jobId), signal })),
    staleTime: 0,
  });

const planSchema = z.object({ version: z.number().int(), records: z.array(planRecordSchema) });
export interface Plan {
  readonly version: number;
  readonly doc: PlanDocument;
}

/** The plan as it is saved, for what of it is shown beside the price. */
export const planQuery = (jobId: string) =>
  queryOptions({
    queryKey: [...jobPricingKey(jobId), 'plan'],
    queryFn: async ({ signal }): Promise<Plan> => {
      const body: unknown = await answer(server.GET('/api/jobs/{jobId}/plan', { ...ofJob(jobId), signal }));
      const { version, records } = read(planSchema, body);
      return { version, doc: new Map(records.map((record) => [record.id, record])) };
    },
    staleTime: 0,
  });

const catalogueSchema = z.object({ items: z.array(z.object({ id: z.string(), item: catalogueItemSchema })) });
export interface CatalogueEntry {
  readonly id: string;
  readonly item: CatalogueItem;
}

export const catalogueQuery = queryOptions({
  queryKey: [...pricingKey, 'items'],
  queryFn: async ({ signal }): Promise<readonly CatalogueEntry[]> =>
    read(catalogueSchema, await answer(server.GET('/api/catalogue', { signal }))).items,
});

export const priceBookQuery = queryOptions({
  queryKey: bookKey,
  queryFn: ({ signal }) => answer(server.GET('/api/price-book', { signal })),
});

export const cataloguePricesQuery = queryOptions({
  queryKey: pricesKey,
  queryFn: ({ signal }) => answer(server.GET('/api/catalogue-prices', { signal })),
});

export const priceHistoryQuery = (itemId: string) =>
  queryOptions({
    queryKey: [...pricesKey, 'history', itemId],
    queryFn: async ({ signal }) =>
      (await answer(server.GET('/api/catalogue/{itemId}/prices', { ...ofItem(itemId), signal }))).items,
  });

/** Prices are made of the book and the items: whatever is priced is worked out anew. */
export function useSaveBook() {
  const cache = useQueryClient();
  return useMutation({
    mutationFn: (edit: { baseVersion: number; book: PriceBook }) =>
      answer(server.PUT('/api/price-book', { body: edit })),
    onSuccess: async (saved) => {
      cache.setQueryData(bookKey, saved);
      await cache.invalidateQueries({ queryKey: [...pricingKey, 'job'] });
    },
  });
}

export function useSetItemPrice(itemId: string) {
  const cache = useQueryClient();
  return useMutation({
    mutationFn: (price: ItemPrice) =>
      answer(server.PUT('/api/catalogue/{itemId}/price', { ...ofItem(itemId), body: { price } })),
    onSuccess: (prices) => {
      cache.setQueryData(pricesKey, prices);
      return Promise.all([
        cache.invalidateQueries({ queryKey: [...pricesKey, 'history', itemId] }),
        cache.invalidateQueries({ queryKey: [...pricingKey, 'job'] }),
      ]);
    },
  });
}

export function useAcceptFault(jobId: string) {
  const cache = useQueryClient();
  return useMutation({
    mutationFn: (body: { faultKey: string; message: string; reason: string }) =>
      answer(server.POST('/api/jobs/{jobId}/fault-acceptances', { ...ofJob(jobId), body })),
    onSettled: () => cache.invalidateQueries(quoteQuery(jobId)),
  });
}

export function useWithdrawAcceptance(jobId: string) {
  const cache = useQueryClient();
  return useMutation({
    mutationFn: (acceptanceId: string) =>
      server.DELETE('/api/jobs/{jobId}/fault-acceptances/{acceptanceId}', {
        params: { path: { jobId, acceptanceId } },
      }),
    onSettled: () => cache.invalidateQueries(quoteQuery(jobId)),
  });
}

/** The routes that the store of a job's pricing works with. */
export function httpPort(jobId: string): PricingPort {
  return {
    load: () => answer(server.GET('/api/jobs/{jobId}/pricing', ofJob(jobId))),
    async save(baseVersion, pricing) {
      try {
        const body = { baseVersion, pricing };
        const at = await answer(server.PUT('/api/jobs/{jobId}/pricing', { ...ofJob(jobId), body }));
        return { is: 'saved', at };
      } catch (error) {
        return failedSave(error);
      }
    },
  };
}

/** What a failed save means for what is unsent. */
export function failedSave(error: unknown): SaveAnswer {
  if (!(error instanceof ApiProblem))
    return { is: 'waiting', message: 'Something went wrong in this window.' };
  if (error.status === 409 && error.code === 'pricing-conflict') return { is: 'conflict' };
  // No answer, nobody signed in, too many at once, or a server in trouble: all pass.
  const passes = error.status === 0 || error.status === 401 || error.status === 429 || error.status >= 500;
  return { is: passes ? 'waiting' : 'refused', message: error.detail };
}

function read<T>(schema: z.ZodType<T>, body: unknown): T {
  const parsed = schema.safeParse(body);
  if (parsed.success) return parsed.data;
  throw new ApiProblem(
    200,
    'unreadable-answer',
    'The server answered in a way that this window does not understand. Reload the page: it may be out of date.',
  );
}
