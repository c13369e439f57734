/**
 * Volts of halogen fixtures on a tree of cable, worked out as one does by hand: currents from the ends to the
 * source, volts from the source to the ends, again until they stand. It shares nothing with the product.
 */
export interface Branch {
  readonly awg: Gauge;
  readonly meters: number;
  /** A fixture at the far end of this length, if any. */
  readonly fixture?: string;
  readonly beyond: readonly Branch[];
}

export type Gauge = 8 | 12 | 18;

/** Ohms of one conductor of a metre at 20 °C: stranded copper, 1/58 Ω·mm²/m (IEC 60028), 2 % for the lay. */
function ohmsPerMeter(awg: Gauge): number {
  // ASTM B258.
  const diameter = 0.127 * 92 ** ((36 - awg) / 39);
  return (1 / 58 / ((Math.PI / 4) * diameter ** 2)) * 1.02;
}

/** 0.00393 a kelvin, from 20 to 25 °C. */
const WARM = 1 + 0.00393 * 5;

const loopOhms = (awg: Gauge, length: number): number => 2 * ohmsPerMeter(awg) * length * WARM;

export interface Halogen {
  readonly watts: number;
  readonly ratedVolts: number;
  readonly lead: { readonly awg: Gauge; readonly meters: number };
}

export interface Supply {
  readonly tapVolts: number;
  readonly ratedVA: number;
  /** The nameplate's volts are open volts; all taps sag by this at full load. */
  readonly regulationPercent: number;
}

/** Volts at the lamp of every fixture. */
export function voltsByHand(supply: Supply, feed: Branch, lamp: Halogen): Map<string, number> {
  const leadOhms = loopOhms(lamp.lead.awg, lamp.lead.meters);
  const volts = new Map<string, number>();
  const current = (name: string): number =>
    (lamp.watts / lamp.ratedVolts) * ((volts.get(name) ?? lamp.ratedVolts) / lamp.ratedVolts) ** 0.55;
  const through = (branch: Branch): number =>
    (branch.fixture === undefined ? 0 : current(branch.fixture)) +
    branch.beyond.reduce((sum, next) => sum + through(next), 0);
  const follow = (branch: Branch, from: number): void => {
    const at = from - loopOhms(branch.awg, branch.meters) * through(branch);
    if (branch.fixture !== undefined) volts.set(branch.fixture, at - leadOhms * current(branch.fixture));
    for (const next of branch.beyond) follow(next, at);
  };
  let terminal = supply.tapVolts;
  for (let round = 0; round < 60; round++) {
    const load = terminal * through(feed);
    terminal = supply.tapVolts * (1 - (supply.regulationPercent / 100) * (load / supply.ratedVA));
    follow(feed, terminal);
  }
  return volts;
}
