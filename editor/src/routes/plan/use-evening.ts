import { useQuery } from '@tanstack/react-query';
import { useMemo } from 'react';
import { to } from '../../app/paths';
import type { NightHere } from '../../features/plan-editor';
import { jobGroupsQuery } from '../../features/pricing/api';
import type { Job } from '../../lib/jobs';
import { useAbilities, useMe } from '../../lib/me';

const noGroups: Pick<NightHere, 'groups' | 'groupOf'> = { groups: [], groupOf: new Map() };

/** Where the evening of a job is, by the property's place or else the company's, and the groups it is offered in. */
export function useEvening({ id, property, client }: Job): NightHere {
  const { company } = useMe();
  const { editJobs, editPrices } = useAbilities();
  const offered = useQuery({ ...jobGroupsQuery(id), enabled: editPrices }).data ?? noGroups;
  const { latitude, longitude } = property;
  const settings = company?.settings;
  const timeZone = settings?.timeZone ?? 'UTC';
  const companyPlace = settings?.place ?? null;
  return useMemo(() => {
    const own = latitude === null || longitude === null ? null : { latitude, longitude };
    return {
      where: { place: own ?? companyPlace, timeZone },
      placeOf: own !== null ? 'property' : companyPlace !== null ? 'company' : null,
      placeTo: editJobs ? to.client(client.id) : null,
      ...offered,
    };
  }, [latitude, longitude, companyPlace, timeZone, editJobs, client.id, offered]);
}
