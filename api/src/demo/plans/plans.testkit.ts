import {
  type EstimateAnswer,
  estimateRequestOf,
  normalizeEstimateRequest,
  type PlanFault,
  planFaults,
} from '@lampwright/geometry/estimate';
import { defaultSettings, type PlanDocument, planOf } from '@lampwright/geometry/plan';
import { solveEstimate } from '../../circuit/index.js';
import { starterCatalogue } from '../../modules/catalogue/starter/index.js';
import { PlanBuilder } from '../plan-builder.js';
import type { HARROW_BANK_SHEET } from './harrow-bank.js';
import type { SANDPIPER_ROW_SHEET } from './sandpiper-row.js';

const catalogue = (name: string) => {
  const item = starterCatalogue.find((entry) => entry.name === name);
  if (!item) throw new Error(`The starter catalogue has no "${name}".`);
  return { sourceId: null, item };
};

export interface Drawn {
  readonly plan: PlanDocument;
  readonly builder: PlanBuilder;
  readonly answer: EstimateAnswer;
  readonly faults: PlanFault[];
}

export function drawn(
  draw: (plan: PlanBuilder) => void,
  sheet: typeof HARROW_BANK_SHEET | typeof SANDPIPER_ROW_SHEET,
): Drawn {
  const start = planOf([
    defaultSettings('us'),
    {
      kind: 'sheet',
      id: 'sheet',
      name: 'Sheet',
      order: 0,
      ...sheet,
      pixelsPerPaperMeter: sheet.view === 'plan' ? 200 / 0.0254 : null,
      references: [],
      groundMetersPerPaperMeter: null,
      whiteLux: null,
    },
  ]);
  const builder = new PlanBuilder(start, 'sheet', catalogue, 'demo');
  draw(builder);
  const { plan } = builder;
  const estimate = estimateRequestOf(plan);
  if (!estimate.request) throw new Error('There is nothing to estimate.');
  const answer = solveEstimate(normalizeEstimateRequest(estimate.request));
  return { plan, builder, answer, faults: planFaults(plan, answer, { estimate }) };
}
