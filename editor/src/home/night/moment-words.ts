import { listOf } from '../words';
import type { Moment, SheetEvening } from './sheet-evening';
import type { EveningZone } from './zones';

/** "dark, lights on": what is seen at a moment, for those who don't see it. `looked`: zones that are looked at. */
export function momentInWords(
  { zones }: Pick<SheetEvening, 'zones'>,
  { clock, sky, on }: Moment,
  looked: (zoneId: string) => boolean,
): string {
  return [clock, skyInWords(sky), lightsOn(zones, (id) => on.has(id) && looked(id))].join(', ');
}

function skyInWords(sky: Moment['sky']): string {
  switch (sky) {
    case 'day':
      return 'daylight';
    case 'dusk':
      return 'dusk';
    case 'dark':
      return 'dark';
  }
}

function lightsOn(zones: SheetEvening['zones'], isOn: (id: string) => boolean): string {
  const lit = zones.filter(({ id }) => isOn(id));
  if (lit.length === 0) return 'lights off';
  if (lit.length === zones.length) return 'lights on';
  return `${listOf(lit.map(({ name }) => name))} on`;
}

/** "Lights on from sunset to 11:00 PM", or why they stay off. */
export const hoursInWords = ({ stretch, hours }: Pick<EveningZone, 'stretch' | 'hours'>): string =>
  stretch ? `Lights on from ${hours}` : hours;
