import { type PlanDocument, recordsOf } from '@lampwright/geometry/plan';
import { emptyPricing, type Group, type JobPricing, type ManualLine } from '@lampwright/geometry/price';

/** Lights that the homeowner may take or leave: those of one run, by its name on the plan. */
export interface DemoGroup extends Group {
  readonly run: string;
}

export interface DemoPricing {
  readonly groups: readonly DemoGroup[];
  readonly manualLines: readonly ManualLine[];
}

export const harrowBankPricing: DemoPricing = {
  groups: [
    {
      id: 'path',
      run: 'Path',
      name: 'Path to the patio',
      description: 'Five lights beside the stepping stones, so that the way across the lawn is safe to walk.',
      on: true,
    },
    {
      id: 'shrubs',
      run: 'Shrub bed',
      name: 'Shrub bed',
      description: 'Four up-lights among the shrubs, seen from the patio and the kitchen.',
      on: true,
    },
    {
      id: 'tree',
      run: 'Wall and tree',
      name: 'Wall and tree',
      description: 'The house wall, two shrubs beside it and the big tree behind the pond.',
      on: false,
    },
  ],
  manualLines: [],
};

/** The front walk is the old system, which stays: it is in the base. */
export const sandpiperRowPricing: DemoPricing = {
  groups: [
    {
      id: 'west',
      run: 'West bed',
      name: 'West bed',
      description: 'Four small lights on the planting along the west wall.',
      on: true,
    },
    {
      id: 'north',
      run: 'North bed',
      name: 'North bed',
      description: 'Four trees at the back of the lot, seen across the pool.',
      on: true,
    },
    {
      id: 'patio',
      run: 'Patio and maple',
      name: 'Patio and maple',
      description: 'Low light at the edges of the patio, and the maple beside it from two sides.',
      on: false,
    },
  ],
  manualLines: [
    {
      id: 'old-transformer',
      groupId: null,
      kind: 'labour',
      name: 'Taking down the old 200 VA transformer',
      quantity: 1,
      unit: 'each',
      costMinor: 6500,
      priceMinor: null,
      taxable: false,
    },
  ],
};

/**
 * The pricing of a job on its plan as it is now. Null where the plan has none of the runs any more.
 * @param controlId the control of every transformer; null: the company's
 */
export function demoJobPricing(
  plan: PlanDocument,
  { groups, manualLines }: DemoPricing,
  controlId: string | null,
): JobPricing | null {
  const members: Record<string, string> = {};
  for (const { id, run } of groups) for (const fixture of fixturesOfRun(plan, run)) members[fixture] = id;
  if (Object.keys(members).length === 0) return null;
  const transformers = [...recordsOf(plan, 'transformer')];
  return {
    ...emptyPricing,
    groups: groups.map(({ run: _, ...group }) => group),
    members,
    manualLines: [...manualLines],
    controls: controlId === null ? {} : Object.fromEntries(transformers.map(({ id }) => [id, controlId])),
  };
}

function fixturesOfRun(plan: PlanDocument, name: string): Set<string> {
  const runs = new Set([...recordsOf(plan, 'run')].filter((run) => run.name === name).map(({ id }) => id));
  const fixtures = new Set<string>();
  for (const { runId, fromId, toId } of recordsOf(plan, 'cable'))
    if (runId !== null && runs.has(runId))
      for (const end of [fromId, toId]) if (plan.get(end)?.kind === 'fixture') fixtures.add(end);
  return fixtures;
}
