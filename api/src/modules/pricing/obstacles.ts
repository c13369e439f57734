import { type PlanDocument, recordsOf } from '@lampwright/geometry/plan';
import type { JobPricing, Quote } from '@lampwright/geometry/price';
import { keyOf, type OpenFault } from './fault-keys.js';
import type { JudgedPlan } from './plan-judge.js';
import type { Obstacle } from './pricing.dto.js';

/** How many of a kind are named; the rest are counted. */
const NAMED = 3;

export interface Findings {
  readonly plan: PlanDocument;
  readonly pricing: JobPricing;
  readonly quote: Quote;
  readonly judged: JudgedPlan;
  readonly faults: readonly OpenFault[];
}

/** What stands in the way of a proposal, and where it is mended. */
export function obstaclesOf(findings: Findings): Obstacle[] {
  return [
    ...noFixtures(findings),
    ...openFaults(findings),
    ...unknownLengths(findings),
    ...unpricedLines(findings),
    ...offerRefused(findings),
  ];
}

function noFixtures({ plan }: Findings): Obstacle[] {
  if (!recordsOf(plan, 'fixture').next().done) return [];
  return [{ message: 'The plan has no fixtures yet.', mend: 'plan' }];
}

function openFaults({ faults, judged }: Findings): Obstacle[] {
  const obstacles: Obstacle[] = [];
  if (judged.failure !== null)
    obstacles.push({ message: `The volts could not be worked out: ${judged.failure}`, mend: 'plan' });
  const open = faults.filter(({ acceptance }) => acceptance === null);
  if (open.length > 0) {
    const heading =
      open.length === 1
        ? 'One fault of the plan is neither mended nor accepted'
        : `${open.length} faults of the plan are neither mended nor accepted`;
    obstacles.push({ message: `${heading}. ${some(open.map(({ message }) => message))}`, mend: 'faults' });
  }
  return obstacles;
}

function unknownLengths({ judged: { waiting } }: Findings): Obstacle[] {
  if (waiting.length === 0) return [];
  const message =
    waiting.length === 1
      ? 'The length of one cable is not known yet: set the scale of its sheet, or type its measured length.'
      : `The lengths of ${waiting.length} cables are not known yet: set the scale of their sheet, or type measured lengths.`;
  return [{ message, mend: 'plan' }];
}

function unpricedLines({ quote }: Findings): Obstacle[] {
  const names = [
    ...new Set(quote.lines.filter(({ priceMinor }) => priceMinor === null).map(({ name }) => name)),
  ];
  if (names.length === 0) return [];
  const listed = names.slice(0, NAMED).join('; ');
  const more = names.length > NAMED ? `; and ${names.length - NAMED} more` : '';
  return [
    {
      message: `${names.length === 1 ? 'One thing has' : `${names.length} things have`} no price yet: ${listed}${more}.`,
      mend: 'lines',
    },
  ];
}

/** Only for faults that the whole plan does not have: its own are told, or accepted, already. */
function offerRefused({ pricing, judged, faults }: Findings): Obstacle[] {
  const [offered] = judged.combinations;
  if (!offered || pricing.groups.length === 0) return [];
  const told = new Set(faults.map(({ key }) => key));
  const reasons = offered.faults.filter((fault) => !told.has(keyOf(fault))).map(({ message }) => message);
  const { refusal } = offered;
  if (refusal !== null && refusal !== judged.failure) reasons.unshift(refusal);
  if (reasons.length === 0) return [];
  const names = pricing.groups.filter(({ id }) => offered.groups.includes(id)).map(({ name }) => name);
  const what = names.length === 0 ? 'The base alone' : `The base with ${inWords(names)}`;
  return [{ message: `${what} can’t be offered. ${some(reasons)}`, mend: 'groups' }];
}

function some(sentences: readonly string[]): string {
  const shown = sentences.slice(0, NAMED).join(' ');
  return sentences.length > NAMED ? `${shown} And ${sentences.length - NAMED} more.` : shown;
}

const inWords = (names: readonly string[]): string =>
  names.length < 2 ? (names[0] ?? '') : `${names.slice(0, -1).join(', ')} and ${names.at(-1)}`;
