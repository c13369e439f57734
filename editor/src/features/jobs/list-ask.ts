import { type Stage, stageSchema } from '../../lib/stages';

export const sorts = ['updated', 'name', 'stage', 'created'] as const;
export type Sort = (typeof sorts)[number];
export type Direction = 'asc' | 'desc';

/** What the job list shows, as its address says; so that it can be linked to, and the back button works. */
export interface ListAsk {
  readonly search: string;
  readonly stage: Stage | null;
  readonly archived: boolean;
  readonly sort: Sort;
  readonly direction: Direction;
  readonly page: number;
}

/** Newest first for times, A first for words. */
export const usualDirection = (sort: Sort): Direction =>
  sort === 'updated' || sort === 'created' ? 'desc' : 'asc';

export function readAsk(params: URLSearchParams): ListAsk {
  const stage = stageSchema.safeParse(params.get('stage'));
  const sort = sorts.find((known) => known === params.get('sort')) ?? 'updated';
  const direction = params.get('direction');
  const page = Number(params.get('page') ?? '1');
  return {
    search: (params.get('search') ?? '').slice(0, 120),
    stage: stage.success ? stage.data : null,
    archived: params.get('archived') === 'true',
    sort,
    direction: direction === 'asc' || direction === 'desc' ? direction : usualDirection(sort),
    page: Number.isInteger(page) && page >= 1 ? page : 1,
  };
}

/** The address for what is asked; what is usual is left out. */
export function writeAsk(ask: ListAsk): URLSearchParams {
  const params = new URLSearchParams();
  if (ask.search !== '') params.set('search', ask.search);
  if (ask.stage !== null) params.set('stage', ask.stage);
  if (ask.archived) params.set('archived', 'true');
  if (ask.sort !== 'updated') params.set('sort', ask.sort);
  if (ask.direction !== usualDirection(ask.sort)) params.set('direction', ask.direction);
  if (ask.page > 1) params.set('page', String(ask.page));
  return params;
}

/** Any change but of the page leads back to the first page. */
export function changeAsk(ask: ListAsk, change: Partial<ListAsk>): ListAsk {
  return { ...ask, page: 1, ...change };
}

/** Pressing a column's head: sort by it, or turn it round. */
export function sortBy(ask: ListAsk, sort: Sort): ListAsk {
  if (ask.sort !== sort) return changeAsk(ask, { sort, direction: usualDirection(sort) });
  return changeAsk(ask, { direction: ask.direction === 'asc' ? 'desc' : 'asc' });
}
