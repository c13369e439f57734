import { useQuery } from '@tanstack/react-query';
import { meQuery, type Units } from './me';

/** The units this person reads and types lengths in. */
export function useUnits(): Units {
  return useQuery(meQuery).data?.user.preferences.units ?? 'imperial';
}
