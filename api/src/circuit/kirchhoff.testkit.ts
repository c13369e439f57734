import type { Conductor, EstimateAnswer, EstimateRequest, Load } from '@lampwright/geometry/estimate';

/**
 * Checks an answer against the model by reading nothing but the request and the answer: nothing of the solver is
 * used, every current is worked out anew from the answered volts. Returns the worst of each kind of miss.
 */
export interface Misses {
  /** Kirchhoff's current law at a node, amps, currents from volts. */
  nodeAmps: number;
  /** Fixture currents against the load's law at the answered volts, and volts against node volts less lead drop. */
  loadAmps: number;
  leadVolts: number;
  /** Terminal volts against the winding's sag law. */
  terminalVolts: number;
  /** Σ fixture voltAmps + loss against supplied voltAmps, relative, worst transformer. */
  power: number;
}

const CLASS_5: Record<number, number> = { 1.5: 13.3, 2.5: 7.98, 4: 4.95, 6: 3.3, 10: 1.91, 16: 1.21 };

export function ohmsOf(
  cable: { conductor: Conductor; lengthMeters: number; extraOhms?: number | undefined },
  temperature: number,
): number {
  const { conductor } = cable;
  let perKm: number;
  if ('awg' in conductor) {
    const millimetres = 0.127 * 92 ** ((36 - conductor.awg) / 39);
    perKm = (1.02 * 1000) / 58 / (Math.PI * (millimetres / 2) ** 2);
  } else perKm = 'mm2' in conductor ? CLASS_5[conductor.mm2]! : conductor.ohmsPerKm;
  const warm = perKm * (1 + 0.00393 * (temperature - 20));
  return Math.max(1e-6, (2 * warm * cable.lengthMeters) / 1000 + (cable.extraOhms ?? 0));
}

export function loadCurrent(load: Load, v: number, open: number): number {
  switch (load.kind) {
    case 'driver': {
      const va = load.watts / (load.powerFactor ?? 1);
      return v >= load.minVolts ? va / v : (va / load.minVolts ** 2) * v;
    }
    case 'filament':
      return (load.watts / load.ratedVolts) * (v / load.ratedVolts) ** 0.55;
    case 'resistive':
      return v / (load.ratedVolts ** 2 / load.watts);
    case 'current':
      return v >= 0.1 * open ? load.amps : (load.amps * v) / (0.1 * open);
    case 'off':
      return 0;
  }
}

export function openVoltsOf(request: EstimateRequest, run: EstimateRequest['runs'][number]) {
  const transformer = request.transformers.find(({ id }) => id === run.transformerId)!;
  const tap = transformer.taps.find(({ id }) => id === run.tapId)!;
  const g = transformer.regulationPercent ?? 0;
  const atLine = (tap.volts * (transformer.lineVolts ?? 120)) / (transformer.nominalLineVolts ?? 120);
  const atLoad = transformer.ratedAt === 'load';
  const windings = transformer.windings ?? [{ id: 'only', ratedVA: transformer.ratedVA }];
  const winding = windings.find(({ id }) => id === tap.winding) ?? windings[0]!;
  return {
    open: atLoad ? atLine * (1 + g / 100) : atLine,
    sag: (atLoad ? g / (100 + g) : g / 100) / winding.ratedVA,
    winding: `${transformer.id}/${winding.id}`,
  };
}

export function missesOf(request: EstimateRequest, answer: EstimateAnswer): Misses {
  const misses: Misses = { nodeAmps: 0, loadAmps: 0, leadVolts: 0, terminalVolts: 0, power: 0 };
  const worst = (kind: keyof Misses, value: number) => {
    if (!(Math.abs(value) <= misses[kind])) misses[kind] = Math.abs(value);
  };
  const temperature = request.conductorTemperatureC ?? 25;
  const fixtureOf = new Map(answer.fixtures.map((fixture) => [fixture.id, fixture]));
  const cableOf = new Map(answer.cables.map((cable) => [cable.id, cable]));
  const windingVA = new Map<string, number>();
  const used = new Map<string, number>();
  const add = (sums: Map<string, number>, key: string, value: number) =>
    sums.set(key, (sums.get(key) ?? 0) + value);
  request.runs.forEach((run, r) => {
    const { open, winding } = openVoltsOf(request, run);
    const ofRun = answer.runs[r]!;
    const volts = new Map([[run.source, ofRun.terminalVolts]]);
    const inflow = new Map<string, number>();
    for (const cable of run.cables) {
      const { fromVolts, toVolts, dropVolts, amps, lossWatts } = cableOf.get(cable.id)!;
      volts.set(cable.from, fromVolts).set(cable.to, toVolts);
      // Differences of volts lose digits on micro-ohm joints; the answered drop must agree within that loss.
      worst('leadVolts', fromVolts - toVolts - dropVolts);
      worst('nodeAmps', amps - dropVolts / ohmsOf(cable, temperature));
      add(inflow, cable.from, -amps);
      add(inflow, cable.to, amps);
      add(used, run.transformerId, lossWatts);
    }
    for (const fixture of run.fixtures) {
      const got = fixtureOf.get(fixture.id)!;
      const many = fixture.quantity ?? 1;
      const leadOhms = fixture.lead ? ohmsOf(fixture.lead, temperature) : 0;
      worst('loadAmps', got.amps - many * loadCurrent(fixture.load, got.volts, open));
      worst('leadVolts', (volts.get(fixture.at) ?? 0) - got.volts - (leadOhms * got.amps) / many);
      add(inflow, fixture.at, -got.amps);
      add(used, run.transformerId, got.voltAmps + (leadOhms * got.amps ** 2) / many);
    }
    worst('nodeAmps', (inflow.get(run.source) ?? 0) + ofRun.amps);
    for (const [node, amps] of inflow) if (node !== run.source) worst('nodeAmps', amps);
    add(windingVA, winding, ofRun.terminalVolts * ofRun.amps);
  });
  request.runs.forEach((run, r) => {
    const { open, sag, winding } = openVoltsOf(request, run);
    worst('terminalVolts', answer.runs[r]!.terminalVolts - open * (1 - sag * windingVA.get(winding)!));
  });
  for (const { id, voltAmps } of answer.transformers) {
    if (voltAmps > 0) worst('power', (used.get(id) ?? 0) / voltAmps - 1);
  }
  return misses;
}
