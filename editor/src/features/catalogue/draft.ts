import type {
  CatalogueCategory,
  CatalogueItem,
  Conductor,
  FixtureKind,
  Load,
  PartItem,
  Terminal,
  VoltWindow,
} from '@lampwright/geometry/catalogue';

/**
 * An item as a form holds it: flat, every field always there, numbers null while empty and NaN while
 * unreadable. What the category and the choices leave out is not sent. The catalogue's own schema says
 * whether the item made of it is right; `fieldOf` brings its faults back to the form's fields.
 */
export interface Draft {
  name: string;
  note: string;
  // light sources
  loadKind: Load['kind'];
  watts: number | null;
  powerFactor: number | null;
  loadMinVolts: number | null;
  ratedVolts: number | null;
  amps: number | null;
  windowMin: number | null;
  windowMax: number | null;
  hasAim: boolean;
  aimMin: number | null;
  aimMax: number | null;
  lumens: number | null;
  beamDegrees: number | null;
  cctKelvin: number | null;
  peakCandela: number | null;
  smart: boolean;
  // fixtures and lamps
  kind: FixtureKind;
  light: 'integrated' | 'lamp';
  base: string;
  maxWatts: number | null;
  leadLengthMeters: number | null;
  mountingHeightMeters: number | null;
  shieldFactor: number | null;
  wetListed: boolean;
  technology: 'led' | 'halogen' | 'incandescent';
  lifeHours: number | null;
  // cable, and the lead of a fixture
  gauge: string;
  ohmsPerKm: number | null;
  ampacityAmps: number | null;
  directBurial: boolean;
  // transformers
  ratedVA: number | null;
  nominalLineVolts: number | null;
  regulationPercent: number | null;
  ratedAt: 'open' | 'load';
  supply: 'ac' | 'dc';
  windings: { id: string; ratedVA: number | null }[];
  terminals: DraftTerminal[];
  // hubs, connectors, controls, parts
  ways: number | null;
  minConductors: number | null;
  maxConductors: number | null;
  largestAwg: number | null;
  smallestAwg: number | null;
  controlKind: 'timer' | 'photocell' | 'smart-plug';
  inrushAmps: number | null;
  use: PartItem['use'];
}

export interface DraftTerminal {
  type: Terminal['type'];
  id: string;
  volts: number | null;
  winding: string;
  limitAmps: number | null;
  maxConductors: number | null;
}

/** A new item begins with what is usual in the trade. */
export const emptyDraft: Draft = {
  name: '',
  note: '',
  loadKind: 'driver',
  watts: null,
  powerFactor: 0.9,
  loadMinVolts: 9,
  ratedVolts: 12,
  amps: null,
  windowMin: 9,
  windowMax: 15,
  hasAim: true,
  aimMin: 10.5,
  aimMax: 13,
  lumens: null,
  beamDegrees: null,
  cctKelvin: null,
  peakCandela: null,
  smart: false,
  kind: 'path',
  light: 'integrated',
  base: '',
  maxWatts: null,
  leadLengthMeters: 0.9,
  mountingHeightMeters: null,
  shieldFactor: null,
  wetListed: false,
  technology: 'led',
  lifeHours: null,
  gauge: 'awg 18',
  ohmsPerKm: null,
  ampacityAmps: null,
  directBurial: true,
  ratedVA: null,
  nominalLineVolts: 120,
  regulationPercent: 4,
  ratedAt: 'open',
  supply: 'ac',
  windings: [{ id: 'W1', ratedVA: null }],
  terminals: [
    { type: 'common', id: 'C1', volts: null, winding: 'W1', limitAmps: 25, maxConductors: 3 },
    { type: 'tap', id: '12V', volts: 12, winding: 'W1', limitAmps: null, maxConductors: 3 },
  ],
  ways: 4,
  minConductors: 2,
  maxConductors: 4,
  largestAwg: 10,
  smallestAwg: 18,
  controlKind: 'timer',
  inrushAmps: null,
  use: 'ground-stake',
};

export const gauges = [8, 10, 12, 14, 16, 18].map((awg) => ({ value: `awg ${awg}`, label: `${awg} AWG` }));
export const sections = [1.5, 2.5, 4, 6, 10, 16].map((mm2) => ({ value: `mm2 ${mm2}`, label: `${mm2} mm²` }));
export const byResistance = 'ohms';

function gaugeOf(conductor: Conductor): Pick<Draft, 'gauge' | 'ohmsPerKm'> {
  if ('awg' in conductor) return { gauge: `awg ${conductor.awg}`, ohmsPerKm: null };
  if ('mm2' in conductor) return { gauge: `mm2 ${conductor.mm2}`, ohmsPerKm: null };
  return { gauge: byResistance, ohmsPerKm: conductor.ohmsPerKm };
}

function loadDraft(load: Load): Partial<Draft> {
  switch (load.kind) {
    case 'driver':
      return {
        loadKind: 'driver',
        watts: load.watts,
        powerFactor: load.powerFactor ?? null,
        loadMinVolts: load.minVolts,
      };
    case 'filament':
    case 'resistive':
      return { loadKind: load.kind, watts: load.watts, ratedVolts: load.ratedVolts };
    case 'current':
      return { loadKind: 'current', amps: load.amps };
    case 'off':
      return { loadKind: 'off' };
  }
}

interface Light {
  readonly load: Load;
  readonly window: VoltWindow;
  readonly target: VoltWindow | null;
  readonly lumens: number | null;
  readonly beamDegrees: number | null;
  readonly cctKelvin: number | null;
  readonly peakCandela?: number | null | undefined;
  readonly smart?: boolean | undefined;
}

const lightDraft = (light: Light): Partial<Draft> => ({
  ...loadDraft(light.load),
  windowMin: light.window.minVolts,
  windowMax: light.window.maxVolts,
  hasAim: light.target !== null,
  aimMin: light.target?.minVolts ?? null,
  aimMax: light.target?.maxVolts ?? null,
  lumens: light.lumens,
  beamDegrees: light.beamDegrees,
  cctKelvin: light.cctKelvin,
  peakCandela: light.peakCandela ?? null,
  smart: light.smart ?? false,
});

const terminalDraft = (terminal: Terminal): DraftTerminal => ({
  type: terminal.type,
  id: terminal.id,
  volts: terminal.type === 'tap' ? terminal.volts : null,
  winding: terminal.winding,
  limitAmps: terminal.limitAmps,
  maxConductors: terminal.maxConductors,
});

/** The form's fields for an item there is. */
export function draftOf(item: CatalogueItem): Draft {
  const draft = { ...emptyDraft, name: item.name, note: item.note ?? '' };
  switch (item.category) {
    case 'fixture': {
      const { kind, lead, mountingHeightMeters, shieldFactor = null, wetListed } = item;
      const common = {
        ...draft,
        kind,
        mountingHeightMeters,
        shieldFactor,
        wetListed,
        leadLengthMeters: lead.lengthMeters,
        ...gaugeOf(lead.conductor),
      };
      return item.light === 'integrated'
        ? { ...common, light: 'integrated', ...lightDraft(item) }
        : { ...common, light: 'lamp', base: item.base, maxWatts: item.maxWatts };
    }
    case 'lamp':
      return {
        ...draft,
        ...lightDraft(item),
        base: item.base,
        technology: item.technology,
        lifeHours: item.lifeHours,
      };
    case 'cable':
      return {
        ...draft,
        ...gaugeOf(item.conductor),
        ampacityAmps: item.ampacityAmps,
        directBurial: item.directBurial,
      };
    case 'transformer': {
      const { ratedVA, nominalLineVolts, regulationPercent, ratedAt, supply } = item;
      return {
        ...draft,
        ratedVA,
        nominalLineVolts,
        regulationPercent,
        ratedAt,
        supply,
        windings: item.windings.map((winding) => ({ ...winding })),
        terminals: item.terminals.map(terminalDraft),
      };
    }
    case 'hub':
      return { ...draft, ways: item.ways };
    case 'connector': {
      const { minConductors, maxConductors, largestAwg, smallestAwg, directBurial } = item;
      return { ...draft, minConductors, maxConductors, largestAwg, smallestAwg, directBurial };
    }
    case 'control':
      return { ...draft, controlKind: item.kind, ratedVA: item.ratedVA, inrushAmps: item.inrushAmps };
    case 'part':
      return { ...draft, use: item.use };
  }
}

/** The form's field for a path within the item. */
export function fieldOf(path: string, category: CatalogueCategory): string {
  const known: Readonly<Record<string, string>> = {
    'load.kind': 'loadKind',
    'load.watts': 'watts',
    'load.powerFactor': 'powerFactor',
    'load.minVolts': 'loadMinVolts',
    'load.ratedVolts': 'ratedVolts',
    'load.amps': 'amps',
    'window.minVolts': 'windowMin',
    'window.maxVolts': 'windowMax',
    'target.minVolts': 'aimMin',
    'target.maxVolts': 'aimMax',
    'lead.lengthMeters': 'leadLengthMeters',
    'lead.conductor': 'gauge',
    'lead.conductor.ohmsPerKm': 'ohmsPerKm',
    conductor: 'gauge',
    'conductor.ohmsPerKm': 'ohmsPerKm',
  };
  if (category === 'control' && path === 'kind') return 'controlKind';
  return known[path] ?? path;
}
