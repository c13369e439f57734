import type { CatalogueItem, Conductor, Load, VoltWindow } from '@lampwright/geometry/catalogue';
import { count } from '../../lib/format';
import { controlLabel, kindLabel, partUseLabel, technologyLabel } from './categories';

export function conductorLabel(conductor: Conductor): string {
  if ('awg' in conductor) return `${conductor.awg} AWG`;
  if ('mm2' in conductor) return `${conductor.mm2} mm²`;
  return `${conductor.ohmsPerKm} Ω/km`;
}

/** What it draws: watts of a lamp, amps of a constant current. */
export function loadLabel(load: Load): string {
  switch (load.kind) {
    case 'driver':
    case 'filament':
    case 'resistive':
      return `${load.watts} W`;
    case 'current':
      return `${load.amps} A`;
    case 'off':
      return 'draws nothing';
  }
}

export const windowLabel = ({ minVolts, maxVolts }: VoltWindow): string => `${minVolts} to ${maxVolts} V`;

const joined = (parts: readonly (string | null)[]): string =>
  parts.filter((part) => part !== null && part !== '').join(' · ');

interface Light {
  readonly load: Load;
  readonly lumens: number | null;
  readonly beamDegrees: number | null;
  readonly cctKelvin: number | null;
  readonly smart?: boolean | undefined;
}

const lightLabel = ({ load, lumens, beamDegrees, cctKelvin, smart }: Light): string =>
  joined([
    loadLabel(load),
    lumens === null ? null : `${lumens} lm`,
    beamDegrees === null ? null : `${beamDegrees}°`,
    cctKelvin === null ? null : `${cctKelvin} K`,
    smart ? 'smart' : null,
  ]);

export interface Description {
  /** What sort of thing it is within its category. */
  readonly sort: string;
  /** Its main figures. */
  readonly figures: string;
  /** What it is rated for. */
  readonly rating: string;
}

/** The three cells beside an item's name in the list. */
export function describe(item: CatalogueItem): Description {
  switch (item.category) {
    case 'fixture':
      return item.light === 'integrated'
        ? { sort: kindLabel(item.kind), figures: lightLabel(item), rating: windowLabel(item.window) }
        : {
            sort: kindLabel(item.kind),
            figures: `takes a ${item.base} lamp`,
            rating: item.maxWatts === null ? '' : `up to ${item.maxWatts} W`,
          };
    case 'lamp':
      return {
        sort: `${technologyLabel(item.technology)}, ${item.base}`,
        figures: lightLabel(item),
        rating: windowLabel(item.window),
      };
    case 'cable':
      return {
        sort: item.directBurial ? 'Direct burial' : 'In conduit or above ground',
        figures: conductorLabel(item.conductor),
        rating: item.ampacityAmps === null ? '' : `${item.ampacityAmps} A`,
      };
    case 'transformer': {
      const taps = new Set(item.terminals.flatMap((t) => (t.type === 'tap' ? [t.volts] : [])));
      const commons = item.terminals.filter((t) => t.type === 'common').length;
      return {
        sort: joined([
          item.supply === 'ac' ? 'AC' : 'DC',
          item.windings.length > 1 ? count(item.windings.length, 'winding') : null,
        ]),
        figures: `${[...taps].join(', ')} V · ${count(commons, 'common')}`,
        rating: `${item.ratedVA} VA`,
      };
    }
    case 'hub':
      return { sort: 'Hub', figures: count(item.ways, 'way'), rating: '' };
    case 'connector':
      return {
        sort: item.directBurial ? 'Direct burial' : 'Above ground',
        figures: `${item.minConductors} to ${item.maxConductors} conductors`,
        rating: `${item.smallestAwg} to ${item.largestAwg} AWG`,
      };
    case 'control':
      return {
        sort: controlLabel(item.kind),
        figures: `${item.ratedVA} VA`,
        rating: item.inrushAmps === null ? '' : `${item.inrushAmps} A inrush`,
      };
    case 'part':
      return { sort: partUseLabel(item.use), figures: '', rating: '' };
  }
}

/** What else is known of its light, for the item's own page. */
export function lightFacts(item: CatalogueItem): string[] {
  if (item.category !== 'fixture' && item.category !== 'lamp') return [];
  const facts: string[] = [];
  if ('load' in item) {
    if (item.peakCandela) facts.push(`${item.peakCandela} cd in the middle of its beam`);
    if (item.smart) facts.push('Switched by itself, apart from its feed');
  }
  if (item.category === 'fixture' && item.shieldFactor)
    facts.push(`Holds back ${Math.round(item.shieldFactor * 1000) / 10} % of the light outside of its beam`);
  return facts;
}
