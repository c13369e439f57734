import type { LightSource, NightScene } from '@lampwright/geometry/light';
import type { Evening } from '@lampwright/geometry/night';
import { type ZoneLooks, zonesOn } from './moments';

/** Share of its light that each lamp gives, by its id. */
export type Shares = Readonly<Record<string, number>>;

interface Switches {
  readonly looks: ZoneLooks;
  readonly groupsOff: ReadonlySet<string>;
}

/** What shines at a moment. Without a moment: all that is not switched off for looking, as figures are of that. */
export function sharesAt(
  { sources, zones }: NightScene,
  when: { readonly evening: Evening; readonly at: Date } | null,
  { looks, groupsOff }: Switches,
): Shares {
  const lit =
    when === null
      ? new Set(zones.filter(({ id }) => looks.get(id) !== 'off').map(({ id }) => id))
      : zonesOn(when.evening, zones, when.at, looks);
  const shines = ({ zoneId, groupId }: LightSource): boolean =>
    lit.has(zoneId) && (groupId === null || !groupsOff.has(groupId));
  return Object.fromEntries(sources.map((source) => [source.id, shines(source) ? 1 : 0]));
}
