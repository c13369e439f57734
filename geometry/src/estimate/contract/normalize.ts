import type {
  EstimateCable,
  EstimateCommon,
  EstimateFixture,
  EstimateRequest,
  EstimateRun,
  EstimateTap,
  EstimateTransformer,
  EstimateWinding,
  Lead,
  Load,
} from './request.js';

/** The request with every default filled in; this is what the solver takes. */
export interface NormalizedEstimateRequest {
  readonly conductorTemperatureC: number;
  readonly transformers: readonly NormalizedTransformer[];
  readonly runs: readonly NormalizedRun[];
}

export interface NormalizedTransformer {
  readonly id: string;
  readonly ratedVA: number;
  readonly lineVolts: number;
  readonly nominalLineVolts: number;
  readonly regulationPercent: number;
  readonly ratedAt: 'open' | 'load';
  readonly windings: readonly Readonly<EstimateWinding>[];
  readonly taps: readonly Readonly<EstimateTap & { winding: string }>[];
  readonly commons: readonly Readonly<EstimateCommon & { winding: string }>[];
}

export interface NormalizedRun extends Readonly<Omit<EstimateRun, 'cables' | 'fixtures'>> {
  readonly cables: readonly NormalizedCable[];
  readonly fixtures: readonly NormalizedFixture[];
}

export type NormalizedCable = Readonly<EstimateCable & { extraOhms: number }>;
export type NormalizedLead = Readonly<Lead & { extraOhms: number }>;
export type NormalizedLoad =
  | Readonly<Exclude<Load, { kind: 'driver' }>>
  | Readonly<Extract<Load, { kind: 'driver' }> & { powerFactor: number }>;

export interface NormalizedFixture extends Readonly<Omit<EstimateFixture, 'load' | 'lead' | 'quantity'>> {
  readonly quantity: number;
  readonly load: NormalizedLoad;
  readonly lead?: NormalizedLead;
}

/** A transformer without windings has one, of this name and of the transformer's own rating. */
export const DEFAULT_WINDING_ID = 'w1';

const DEFAULT_CONDUCTOR_TEMPERATURE_C = 25;
const DEFAULT_LINE_VOLTS = 120;

/** Fills in defaults; the request must have passed `parseEstimateRequest` (or keep its rules by construction). */
export function normalizeEstimateRequest(request: EstimateRequest): NormalizedEstimateRequest {
  return {
    conductorTemperatureC: request.conductorTemperatureC ?? DEFAULT_CONDUCTOR_TEMPERATURE_C,
    transformers: request.transformers.map(normalizeTransformer),
    runs: request.runs.map((run) => ({
      ...run,
      cables: run.cables.map(normalizeCable),
      fixtures: run.fixtures.map(normalizeFixture),
    })),
  };
}

function normalizeTransformer(transformer: EstimateTransformer): NormalizedTransformer {
  const { id, ratedVA, taps, commons } = transformer;
  const windings = transformer.windings ?? [{ id: DEFAULT_WINDING_ID, ratedVA }];
  const first = windings[0]?.id ?? DEFAULT_WINDING_ID;
  return {
    id,
    ratedVA,
    lineVolts: transformer.lineVolts ?? DEFAULT_LINE_VOLTS,
    nominalLineVolts: transformer.nominalLineVolts ?? DEFAULT_LINE_VOLTS,
    regulationPercent: transformer.regulationPercent ?? 0,
    ratedAt: transformer.ratedAt ?? 'open',
    windings,
    taps: taps.map((tap) => ({ ...tap, winding: tap.winding ?? first })),
    commons: commons.map((common) => ({ ...common, winding: common.winding ?? first })),
  };
}

// Written out key by key: all cables, and all fixtures, then have one shape in memory, which the solver's loops read
// several times faster than objects made by spreading.

function normalizeCable(cable: EstimateCable): NormalizedCable {
  return {
    id: cable.id,
    from: cable.from,
    to: cable.to,
    lengthMeters: cable.lengthMeters,
    conductor: cable.conductor,
    extraOhms: cable.extraOhms ?? 0,
    ampacityAmps: cable.ampacityAmps,
  };
}

function normalizeFixture(fixture: EstimateFixture): NormalizedFixture {
  const { lead } = fixture;
  return {
    id: fixture.id,
    at: fixture.at,
    quantity: fixture.quantity ?? 1,
    load: normalizeLoad(fixture.load),
    lead: lead && {
      conductor: lead.conductor,
      lengthMeters: lead.lengthMeters,
      extraOhms: lead.extraOhms ?? 0,
    },
    window: fixture.window,
    target: fixture.target,
  };
}

function normalizeLoad(load: Load): NormalizedLoad {
  if (load.kind !== 'driver') return load;
  return {
    kind: 'driver',
    watts: load.watts,
    powerFactor: load.powerFactor ?? 1,
    minVolts: load.minVolts,
  };
}
