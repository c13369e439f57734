import type { ControlZone, LightSource, NightScene } from '@lampwright/geometry/light';
import { capital, kindsInWords, listOf } from '../words';

/** Lights of one sheet that are switched together. */
export interface EveningZone {
  readonly id: string;
  /** In the homeowner's words: what the lights are, rather than what feeds them. */
  readonly name: string;
  readonly lights: number;
  /** In minutes of the evening; null: they stay off. */
  readonly stretch: { readonly on: number; readonly off: number } | null;
  /** "sunset to 11:00 PM", or why they stay off. */
  readonly hours: string;
}

export function zonesOf(
  { sources, zones }: Pick<NightScene, 'sources' | 'zones'>,
  /** Names of the groups that lights are offered in. */
  groups: ReadonlyMap<string, string>,
  hoursOf: (schedule: ControlZone['schedule']) => Pick<EveningZone, 'stretch' | 'hours'>,
): EveningZone[] {
  const all = zones.map((zone) => {
    const mine = sources.filter(({ zoneId }) => zoneId === zone.id);
    const others = sources.filter(({ zoneId }) => zoneId !== zone.id);
    const lights = mine.reduce((sum, { quantity }) => sum + quantity, 0);
    // A zone of lamps that switch themselves was given its name by a person.
    const name = zone.kind === 'smart' ? zone.name : (groupOf(mine, others, groups) ?? kindsOf(mine, others));
    return { zone, lights, name };
  });
  const unnamed = all.filter(({ name }) => name === null).length;
  const rest = (zone: ControlZone): string =>
    unnamed < all.length && unnamed === 1 ? 'All other lights' : `Lights of ${zone.name}`;
  return all
    .sort((a, b) => Number(a.name === null) - Number(b.name === null))
    .map(({ zone, lights, name }) => ({
      id: zone.id,
      name: name ?? rest(zone),
      lights,
      ...hoursOf(zone.schedule),
    }));
}

/** The group that all of these are of, and no other is. */
function groupOf(
  mine: readonly LightSource[],
  others: readonly LightSource[],
  groups: ReadonlyMap<string, string>,
): string | null {
  const id = mine[0]?.groupId ?? null;
  if (id === null || mine.some(({ groupId }) => groupId !== id)) return null;
  return others.some(({ groupId }) => groupId === id) ? null : (groups.get(id) ?? null);
}

/** "Path lights", "Path lights and up-lights": where no other light is of these kinds. */
function kindsOf(mine: readonly LightSource[], others: readonly LightSource[]): string | null {
  const kinds = [...new Set(mine.map(({ kind }) => kind))];
  if (kinds.length > 2 || others.some(({ kind }) => kinds.includes(kind))) return null;
  return capital(listOf(kinds.map((kind) => kindsInWords({ kind }))));
}
