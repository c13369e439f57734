import type { Conductor, EstimateFixture, EstimateTransformer } from '@lampwright/geometry/estimate';

/**
 * Wiring to be designed: cable is drawn and transformers stand where they stand; what is to be chosen is each
 * run's tap, common and cable, and each transformer's size. Lengths in metres, money in minor units.
 */
export interface DesignProblem {
  readonly conductorTemperatureC: number;
  /** Most of a transformer's and a winding's rating that may be used, in per cent. */
  readonly targetPercent: number;
  readonly cables: readonly CableChoice[];
  readonly sites: readonly DesignSite[];
}

export interface CableChoice {
  readonly id: string;
  readonly conductor: Conductor;
  /** Left out: as the estimate takes it by the conductor's size. */
  readonly ampacityAmps?: number;
}

/** A place where a transformer stands, with the models that could stand there and the runs that land on it. */
export interface DesignSite {
  readonly id: string;
  readonly models: readonly TransformerModel[];
  readonly runs: readonly DesignRun[];
}

export interface TransformerModel {
  readonly id: string;
  readonly priceMinor: number;
  /** Its own id is not looked at. */
  readonly transformer: Omit<EstimateTransformer, 'id'>;
  /** Conductors that each tap and common takes, by its id; left out: any number. */
  readonly maxConductors: ReadonlyMap<string, number>;
}

export interface DesignRun {
  readonly id: string;
  readonly source: string;
  readonly cables: readonly DesignCable[];
  readonly fixtures: readonly EstimateFixture[];
  /** What the run costs in each cable, in the order of the problem's cables; null: not to be used there. */
  readonly costMinor: readonly (number | null)[];
}

export interface DesignCable {
  readonly id: string;
  readonly from: string;
  readonly to: string;
  readonly lengthMeters: number;
  readonly extraOhms?: number;
}

export interface RunDesign {
  readonly runId: string;
  readonly tapId: string;
  readonly commonId: string;
  readonly cableId: string;
}

export interface SiteDesign {
  readonly siteId: string;
  readonly modelId: string;
  readonly costMinor: number;
  /** No design can cost less than this; equal to the cost where the design is proven to be the least. */
  readonly leastMinor: number;
  readonly runs: readonly RunDesign[];
}

/** Why nothing works at a site. `fixtureIds` is a smallest set that makes it impossible. */
export interface Impossible {
  readonly siteId: string;
  readonly reason: 'no-volts' | 'too-much-load' | 'no-terminals' | 'no-model';
  readonly runId: string | null;
  readonly fixtureIds: readonly string[];
}

export type SiteResult =
  | { readonly kind: 'designed'; readonly design: SiteDesign }
  | { readonly kind: 'impossible'; readonly why: Impossible }
  /** Stopped, or given up, before anything was found or ruled out. */
  | { readonly kind: 'unsettled'; readonly siteId: string; readonly leastMinor: number };

/** What a long search asks of its surroundings. */
export interface SearchControl {
  /** The search ends with the best it has. Asked often; must be cheap. */
  stopped(): boolean;
  /** Share done, 0 to 1, as far as can be told. */
  progress(share: number): void;
}
