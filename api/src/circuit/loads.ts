import type { NormalizedFixture, NormalizedRun } from '@lampwright/geometry/estimate';
import { celsius, meters, ohms, type Volts } from '@lampwright/geometry/units';
import { loopOhms } from './conductors.js';
import { SOURCE, UNREACHED } from './network.js';

/**
 * A run's loads as one table. Each load is seen from its node, its own lead included: the current i(u) of one
 * fixture at node volts u, its slope di/du, and the volts v at the end of the lead. Where the lead allows several
 * v, the highest counts.
 *
 * All kinds share one property that the solver leans on: i(u) / u, the load as a conductance, never rises with u.
 */
export interface LoadTable {
  readonly count: number;
  /** Which fixture of the run each row is; `off` and unreached ones have no row. */
  readonly fixture: Int32Array;
  /** Node number, or SOURCE. */
  readonly node: Int32Array;
  readonly quantity: Float64Array;
  readonly kind: Uint8Array;
  /** Loop ohms of the lead. */
  readonly lead: Float64Array;
  /** VA of a driver; amps per volt^0.55 of a filament; amps of a current. */
  readonly size: Float64Array;
  /** Node volts below which a load acts as a plain conductance. */
  readonly knee: Float64Array;
  /** Siemens of that conductance, lead included; for a resistive load at all volts. */
  readonly siemens: Float64Array;
  /** Results of the last evaluation, for one fixture each: volts at the lead's end, amps, slope. */
  readonly volts: Float64Array;
  readonly amps: Float64Array;
  readonly slope: Float64Array;
}

const CONDUCTANCE = 0;
const DRIVER = 1;
const FILAMENT = 2;
const CURRENT = 3;
type LoadKind = typeof CONDUCTANCE | typeof DRIVER | typeof FILAMENT | typeof CURRENT;

/** Current of a filament ∝ volts^0.55 (lamp rerating handbooks). */
const FILAMENT_EXPONENT = 0.55;
/**
 * v^0.55 is infinitely steep at 0 V, where double precision ends. Below this part of the tap's open volts (some
 * 1e-17 V, where the law gives less than a billionth of the rated current) a filament counts as a plain conductance.
 */
const FILAMENT_KNEE = 1e-18;
/** Below this share of the tap's open volts a `current` load acts as a resistance, so that an answer exists. */
export const CURRENT_KNEE = 0.1;

export function leadOhms(fixture: NormalizedFixture, temperatureC: number): number {
  const { lead } = fixture;
  if (!lead) return 0;
  return loopOhms(lead.conductor, meters(lead.lengthMeters), ohms(lead.extraOhms), celsius(temperatureC));
}

/** `nodeOfFixture` holds node numbers (SOURCE and UNREACHED among them) in the order of the run's fixtures. */
export function buildLoads(
  run: NormalizedRun,
  nodeOfFixture: Int32Array,
  open: Volts,
  temperatureC: number,
): LoadTable {
  const { fixtures } = run;
  const fixture = new Int32Array(fixtures.length);
  let count = 0;
  for (let index = 0; index < fixtures.length; index++) {
    const { load } = fixtures[index]!;
    const draws = load.kind !== 'off' && !(load.kind === 'current' && load.amps === 0);
    if (draws && nodeOfFixture[index] !== UNREACHED) fixture[count++] = index;
  }
  const table: LoadTable = {
    count,
    fixture: fixture.subarray(0, count),
    node: new Int32Array(count),
    quantity: new Float64Array(count),
    kind: new Uint8Array(count),
    lead: new Float64Array(count),
    size: new Float64Array(count),
    knee: new Float64Array(count),
    siemens: new Float64Array(count),
    volts: new Float64Array(count),
    amps: new Float64Array(count),
    slope: new Float64Array(count),
  };
  for (let row = 0; row < count; row++) {
    const index = fixture[row]!;
    const one = fixtures[index]!;
    table.node[row] = nodeOfFixture[index]!;
    table.quantity[row] = one.quantity;
    table.lead[row] = leadOhms(one, temperatureC);
    describeLoad(table, row, one, open);
  }
  return table;
}

function describeLoad(table: LoadTable, row: number, fixture: NormalizedFixture, open: Volts): void {
  const { load } = fixture;
  const lead = table.lead[row]!;
  switch (load.kind) {
    case 'driver': {
      const va = load.watts / load.powerFactor;
      table.kind[row] = DRIVER;
      table.size[row] = va;
      table.siemens[row] = 1 / (lead + load.minVolts ** 2 / va);
      // With a lead so weak that the driver would be past its own nose at minVolts, the nose itself is the knee.
      table.knee[row] =
        load.minVolts ** 2 >= lead * va
          ? load.minVolts + (lead * va) / load.minVolts
          : 2 * Math.sqrt(lead * va);
      return;
    }
    case 'filament':
      table.kind[row] = FILAMENT;
      table.size[row] = load.watts / load.ratedVolts ** (1 + FILAMENT_EXPONENT);
      describeKnee(
        table,
        row,
        FILAMENT_KNEE * open,
        table.size[row]! * (FILAMENT_KNEE * open) ** FILAMENT_EXPONENT,
      );
      return;
    case 'resistive':
      table.kind[row] = CONDUCTANCE;
      table.siemens[row] = 1 / (lead + load.ratedVolts ** 2 / load.watts);
      return;
    case 'current':
      table.kind[row] = CURRENT;
      table.size[row] = load.amps;
      describeKnee(table, row, CURRENT_KNEE * open, load.amps);
      return;
    case 'off':
      return;
  }
}

/** Below `volts` at the lead's end, where it draws `amps`, the load is a plain conductance. */
function describeKnee(table: LoadTable, row: number, volts: number, amps: number): void {
  const lead = table.lead[row]!;
  table.siemens[row] = 1 / (lead + volts / amps);
  table.knee[row] = volts + lead * amps;
}

/** The higher v with v + lead × va / v = u; u must be at or above the knee. */
function driverVolts(u: number, va: number, lead: number): number {
  return (u + Math.sqrt(Math.max(0, u * u - 4 * lead * va))) / 2;
}

/** The v with v + lead × size × v^0.55 = u. */
function filamentVolts(u: number, size: number, lead: number): number {
  if (lead === 0) return u;
  const chord = (v: number) => u / (1 + lead * size * v ** (FILAMENT_EXPONENT - 1));
  // The chord step comes from above; Newton on a concave function then lands below the root and rises to it.
  let v = chord(u);
  for (let i = 0; i < 60; i++) {
    const amps = size * v ** FILAMENT_EXPONENT;
    const newton = v - (v + lead * amps - u) / (1 + (lead * FILAMENT_EXPONENT * amps) / v);
    const next = newton > 0 ? newton : chord(v);
    const moved = Math.abs(next - v);
    v = next;
    if (moved <= 1e-15 * u) break;
  }
  return v;
}

/** Fills in volts, amps and slope of one row at node volts u ≥ 0; false if it is on a part that bends downward. */
export function evaluateLoad(table: LoadTable, row: number, u: number): boolean {
  const { volts, amps, slope } = table;
  const lead = table.lead[row]!;
  const size = table.size[row]!;
  const kind = table.kind[row]! as LoadKind;
  switch (kind) {
    case FILAMENT:
      if (u >= table.knee[row]!) {
        const v = filamentVolts(u, size, lead);
        const i = size * v ** FILAMENT_EXPONENT;
        const inner = (FILAMENT_EXPONENT * i) / v;
        volts[row] = v;
        amps[row] = i;
        slope[row] = inner / (1 + lead * inner);
        return false;
      }
      break;
    case DRIVER:
      if (u >= table.knee[row]!) {
        const v = driverVolts(u, size, lead);
        volts[row] = v;
        amps[row] = size / v;
        slope[row] = -size / (v * v - lead * size);
        return true;
      }
      break;
    case CURRENT:
      if (u >= table.knee[row]!) {
        volts[row] = u - lead * size;
        amps[row] = size;
        slope[row] = 0;
        return true;
      }
      break;
    case CONDUCTANCE:
      break;
  }
  const siemens = table.siemens[row]!;
  amps[row] = siemens * u;
  volts[row] = u - lead * siemens * u;
  slope[row] = siemens;
  return kind === CONDUCTANCE;
}

/**
 * A lower bound of the chord slopes (i(w) − i(u)) / (w − u) over all w in (u, top]: how little, or how negatively,
 * the load can resist a rise from u. Reads the table's slope at u, so u must be what was evaluated last.
 */
export function leastChord(table: LoadTable, row: number, u: number, top: number): number {
  const kind = table.kind[row]! as LoadKind;
  switch (kind) {
    case CONDUCTANCE:
      return table.siemens[row]!;
    case FILAMENT: {
      // Concave: no chord is flatter than the tangent at the far end.
      if (top <= u || top < table.knee[row]!) return table.slope[row]!;
      const v = filamentVolts(top, table.size[row]!, table.lead[row]!);
      const inner = FILAMENT_EXPONENT * table.size[row]! * v ** (FILAMENT_EXPONENT - 1);
      return inner / (1 + table.lead[row]! * inner);
    }
    case CURRENT:
      return top < table.knee[row]! ? table.siemens[row]! : 0;
    case DRIVER: {
      const knee = table.knee[row]!;
      // Convex in range: the steepest fall is the tangent at u.
      if (u >= knee) return table.slope[row]!;
      const siemens = table.siemens[row]!;
      if (top < knee) return siemens;
      const change = table.size[row]! / driverVolts(top, table.size[row]!, table.lead[row]!) - siemens * u;
      return change >= 0 ? Math.min(siemens, change / (top - u)) : change / (knee - u);
    }
  }
}

/** Adds up amps and slopes per node; those of loads at the source come back as sums. Node volts must not be below 0. */
export function evaluateLoads(
  table: LoadTable,
  nodeVolts: Float64Array,
  sourceVolts: number,
  nodeAmps: Float64Array,
  nodeSlope: Float64Array,
  atSource: { amps: number; slope: number },
): boolean {
  nodeAmps.fill(0);
  nodeSlope.fill(0);
  let sourceAmps = 0;
  let sourceSlope = 0;
  let convex = true;
  for (let row = 0; row < table.count; row++) {
    const node = table.node[row]!;
    const many = table.quantity[row]!;
    const u = node === SOURCE ? sourceVolts : nodeVolts[node]!;
    convex = evaluateLoad(table, row, u) && convex;
    if (node === SOURCE) {
      sourceAmps += many * table.amps[row]!;
      sourceSlope += many * table.slope[row]!;
    } else {
      nodeAmps[node]! += many * table.amps[row]!;
      nodeSlope[node]! += many * table.slope[row]!;
    }
  }
  atSource.amps = sourceAmps;
  atSource.slope = sourceSlope;
  return convex;
}
