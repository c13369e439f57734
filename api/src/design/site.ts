import { RunOnBench } from './bench-run.js';
import { ByCost } from './by-cost.js';
import { whyImpossible } from './impossible.js';
import { type Model, meet, modelOf, rangeOfTap } from './model.js';
import { optionOf, type RunOption, type VoltRange } from './options.js';
import type { DesignProblem, DesignSite, SearchControl, SiteDesign, SiteResult } from './problem.js';
import { type CabledRun, landOnTaps } from './taps.js';

/** Choices of cable that are tried on one model before it is given up. */
const MOST_CABLINGS = 2000;

/**
 * The least costly wiring of one transformer's site that keeps every limit. Cables are tried in rising order of
 * their cost, so the first that can be landed is the cheapest; what had to be given up on the way stays as the gap.
 */
export function designSite(problem: DesignProblem, site: DesignSite, control: SearchControl): SiteResult {
  const models = site.models.map((model) => modelOf(model, problem.targetPercent));
  const within = rangeOfAll(models);
  if (!within)
    return { kind: 'impossible', why: { siteId: site.id, reason: 'no-model', runId: null, fixtureIds: [] } };
  const options: (readonly RunOption[])[] = [];
  for (const [i, run] of site.runs.entries()) {
    if (control.stopped()) return { kind: 'unsettled', siteId: site.id, leastMinor: 0 };
    options.push(optionsOf(problem, run, within));
    control.progress((0.8 * (i + 1)) / site.runs.length);
  }
  const search = new SiteSearch(problem, site, models, options, control);
  const result = search.result();
  control.progress(1);
  return result ?? { kind: 'impossible', why: whyImpossible(problem, site, models, options) };
}

/** All volts that any tap of any model may have. */
function rangeOfAll(models: readonly Model[]): VoltRange | null {
  const ranges = models.flatMap((model) => model.taps.map((tap) => rangeOfTap(model, tap)));
  if (ranges.length === 0) return null;
  return {
    from: Math.min(...ranges.map(({ from }) => from)),
    to: Math.max(...ranges.map(({ to }) => to)),
  };
}

function optionsOf(
  { cables, conductorTemperatureC }: DesignProblem,
  run: DesignSite['runs'][number],
  within: VoltRange,
): RunOption[] {
  return cables
    .flatMap((cable, index) => {
      const costMinor = run.costMinor[index] ?? null;
      if (costMinor === null) return [];
      return optionOf(new RunOnBench(run, cable, conductorTemperatureC), costMinor, within, index) ?? [];
    })
    .sort((a, b) => a.costMinor - b.costMinor);
}

class SiteSearch {
  private best: SiteDesign | null = null;
  /** Least cost among the choices that were neither ruled out nor found to work. */
  private unsettledMinor = Number.POSITIVE_INFINITY;

  constructor(
    private readonly problem: DesignProblem,
    private readonly site: DesignSite,
    private readonly models: readonly Model[],
    private readonly options: readonly (readonly RunOption[])[],
    private readonly control: SearchControl,
  ) {}

  /** Null: proven impossible. */
  result(): SiteResult | null {
    const byLeast = this.models
      .map((model) => ({ model, queue: this.cablingsOf(model) }))
      .filter(({ queue }) => queue.byCost.nextCost !== null)
      .sort(
        (a, b) =>
          a.model.source.priceMinor +
          a.queue.byCost.nextCost! -
          (b.model.source.priceMinor + b.queue.byCost.nextCost!),
      );
    for (const { model, queue } of byLeast) this.search(model, queue);
    if (this.best) {
      const leastMinor = Math.min(this.best.costMinor, this.unsettledMinor);
      return { kind: 'designed', design: { ...this.best, leastMinor } };
    }
    if (this.unsettledMinor < Number.POSITIVE_INFINITY)
      return { kind: 'unsettled', siteId: this.site.id, leastMinor: this.unsettledMinor };
    return null;
  }

  /** The options of each run that have a tap on this model, and their choices in rising order of cost. */
  private cablingsOf(model: Model): { options: readonly (readonly RunOption[])[]; byCost: ByCost } {
    const options = this.options.map((list) =>
      list.filter(({ works }) => model.taps.some((tap) => meet(rangeOfTap(model, tap), works))),
    );
    return { options, byCost: new ByCost(options.map((list) => list.map(({ costMinor }) => costMinor))) };
  }

  private search(model: Model, { options, byCost }: ReturnType<SiteSearch['cablingsOf']>): void {
    const { priceMinor } = model.source;
    for (let tried = 0; ; tried++) {
      const next = byCost.nextCost;
      if (next === null) return;
      const costMinor = priceMinor + next;
      if (this.best && costMinor >= this.best.costMinor) return;
      if (tried >= MOST_CABLINGS || this.control.stopped()) {
        this.unsettledMinor = Math.min(this.unsettledMinor, costMinor);
        return;
      }
      const picks = byCost.next()!;
      const runs: CabledRun[] = this.site.runs.map((run, i) => {
        const option = options[i]![picks[i]!]!;
        return { run, option, cable: this.problem.cables[option.cableIndex]! };
      });
      const landed = landOnTaps(model, runs, this.problem.conductorTemperatureC, this.control);
      if (landed === 'none') continue;
      if (landed === 'given-up') {
        this.unsettledMinor = Math.min(this.unsettledMinor, costMinor);
        continue;
      }
      this.best = {
        siteId: this.site.id,
        modelId: model.source.id,
        costMinor,
        leastMinor: costMinor,
        runs: runs.map(({ run, cable }, i) => ({ runId: run.id, cableId: cable.id, ...landed[i]! })),
      };
      return;
    }
  }
}
