import { queryOptions, useQuery, useSuspenseQuery } from '@tanstack/react-query';
import { z } from 'zod';
import { type Answer, ApiProblem, answer, server } from './api/client';

export const roleSchema = z.enum(['owner', 'designer', 'crew']);
export type Role = z.infer<typeof roleSchema>;

export const unitsSchema = z.enum(['imperial', 'metric']);
export type Units = z.infer<typeof unitsSchema>;
export const themeSchema = z.enum(['light', 'dark', 'system']);
export type ThemeChoice = z.infer<typeof themeSchema>;

export type Me = Answer<'/api/auth/me', 'get'>;

export const meKey = ['me'] as const;

/** Who is signed in, in which company; null when nobody is. */
export const meQuery = queryOptions({
  queryKey: meKey,
  // Takes no abort signal: the router waits for it, and a component that goes away must not cancel that.
  queryFn: async (): Promise<Me | null> => {
    try {
      return await answer(server.GET('/api/auth/me'));
    } catch (error) {
      if (error instanceof ApiProblem && error.status === 401) return null;
      throw error;
    }
  },
  staleTime: 5 * 60_000,
});

/** For pages that stand with and without a sign-in. */
export const useMaybeMe = () => useQuery(meQuery);

/** For pages behind the sign-in: the router has asked before they are shown. */
export function useMe(): Me {
  const { data } = useSuspenseQuery(meQuery);
  if (data === null) throw new ApiProblem(401, 'not-signed-in', 'Please sign in.');
  return data;
}

/** What a role may do on the screen. The server decides; this only hides what it would refuse. */
export interface Abilities {
  readonly editJobs: boolean;
  readonly editCatalogue: boolean;
  readonly editPlan: boolean;
  /** Prices are seen by those who may edit them, and by nobody else. */
  readonly editPrices: boolean;
  readonly editPriceBook: boolean;
  /** Proposals, questions and payments. */
  readonly sell: boolean;
  readonly refund: boolean;
  readonly seeNumbers: boolean;
  readonly survey: boolean;
  readonly editCompany: boolean;
  readonly editMembers: boolean;
}

export function abilitiesOf(role: Role | null): Abilities {
  const planner = role === 'owner' || role === 'designer';
  return {
    editJobs: planner,
    editCatalogue: planner,
    editPlan: planner,
    editPrices: planner,
    editPriceBook: role === 'owner',
    sell: planner,
    refund: role === 'owner',
    seeNumbers: role === 'owner',
    survey: role !== null,
    editCompany: role === 'owner',
    editMembers: role === 'owner',
  };
}

export const useAbilities = (): Abilities => abilitiesOf(useMe().role);
