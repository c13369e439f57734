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
  hoursOf: (schedule: ControlZone['schedule']) => Pick<EveningZone, 'stretch' | 'hours'>,
): EveningZone[] {
  const named = zones.map((zone) => {
    const mine = sources.filter(({ zoneId }) => zoneId === zone.id);
    return { zone, lights: mine.reduce((sum, { quantity }) => sum + quantity, 0), words: wordsOf(mine) };
  });
  return named.map(({ zone, lights, words }) => {
    const alike = named.filter((other) => other.words === words).length > 1;
    // A zone of lamps that switch themselves was given its name by a person.
    const name = zone.kind === 'smart' ? zone.name : alike ? `${words} (${zone.name})` : words;
    return { id: zone.id, name, lights, ...hoursOf(zone.schedule) };
  });
}

/** "Path lights", "Path lights and up-lights". */
function wordsOf(sources: readonly Pick<LightSource, 'kind'>[]): string {
  return capital(listOf([...new Set(sources.map(kindsInWords))]));
}
