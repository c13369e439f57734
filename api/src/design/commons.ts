/** What is to be landed on commons: a run's amps, one conductor each. */
export interface Landing {
  readonly runId: string;
  readonly amps: number;
}

/** A common that takes so many amps and conductors. */
export interface OpenCommon {
  readonly id: string;
  readonly limitAmps: number;
  readonly maxConductors: number;
}

/** Ways of landing that are tried before giving up; reached only where limits are nearly full. */
const MOST_TRIES = 200_000;

export type Landed = ReadonlyMap<string, string> | 'none' | 'given-up';

/**
 * Lands every run on a common within all limits, about evenly: the largest first, each where most room is left. Where
 * that runs into a limit, every way is tried.
 */
export function landOnCommons(landings: readonly Landing[], commons: readonly OpenCommon[]): Landed {
  const order = [...landings].sort((a, b) => b.amps - a.amps || (a.runId < b.runId ? -1 : 1));
  return evenly(order, commons) ?? tryAll(order, commons);
}

function evenly(order: readonly Landing[], commons: readonly OpenCommon[]): Map<string, string> | null {
  const loads = commons.map((common) => ({ common, amps: 0, conductors: 0 }));
  const landed = new Map<string, string>();
  for (const { runId, amps } of order) {
    const open = loads.filter(
      (load) => load.conductors < load.common.maxConductors && load.amps + amps <= load.common.limitAmps,
    );
    const [best] = open.sort((a, b) => a.amps - b.amps);
    if (!best) return null;
    best.amps += amps;
    best.conductors += 1;
    landed.set(runId, best.common.id);
  }
  return landed;
}

function tryAll(order: readonly Landing[], commons: readonly OpenCommon[]): Landed {
  const amps = commons.map(() => 0);
  const conductors = commons.map(() => 0);
  const chosen: number[] = [];
  let tries = 0;
  const place = (at: number): boolean => {
    const landing = order[at];
    if (!landing) return true;
    const seen = new Set<string>();
    for (let c = 0; c < commons.length; c++) {
      const common = commons[c]!;
      // Commons that are alike in all that matters need not be tried twice.
      const alike = `${amps[c]} ${conductors[c]} ${common.limitAmps} ${common.maxConductors}`;
      if (seen.has(alike)) continue;
      seen.add(alike);
      if (conductors[c]! >= common.maxConductors || amps[c]! + landing.amps > common.limitAmps) continue;
      tries += 1;
      if (tries > MOST_TRIES) return false;
      amps[c]! += landing.amps;
      conductors[c]! += 1;
      chosen[at] = c;
      if (place(at + 1)) return true;
      amps[c]! -= landing.amps;
      conductors[c]! -= 1;
    }
    return false;
  };
  if (!place(0)) return tries > MOST_TRIES ? 'given-up' : 'none';
  return new Map(order.map(({ runId }, i) => [runId, commons[chosen[i]!]!.id]));
}
