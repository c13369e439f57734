import { fixtureInitial } from '@lampwright/geometry/catalogue';
import { proposalCautions } from '@lampwright/geometry/cautions';
import type { EveningPlace } from '@lampwright/geometry/light';
import {
  initialOf,
  itemOf,
  PLAN_SCHEMA_VERSION,
  type PlanDocument,
  recordsOf,
  type SheetRecord,
} from '@lampwright/geometry/plan';
import { type Quote, recordGroups, scheduleOf } from '@lampwright/geometry/price';
import { type CompanySettings, regionOf, wordsOf } from '../companies/settings.js';
import type { WorkedQuote } from '../pricing/quotes.js';
import { whatItLights } from './plain-words.js';
import type { ProposalTexts } from './proposals.dto.js';
import type { ProposalWords, RevisionDocument, ShownCombination, ShownLight } from './revision-document.js';

export interface Parties {
  readonly company: { readonly name: string; readonly region: string };
  readonly settings: Pick<CompanySettings, 'units' | 'timeZone' | 'place'>;
  readonly texts: ProposalTexts;
  readonly words: ProposalWords;
  readonly client: { readonly name: string; readonly email: string | null; readonly phone: string | null };
  readonly property: {
    readonly name: string;
    readonly address: string;
    readonly latitude: number | null;
    readonly longitude: number | null;
  };
  readonly job: { readonly id: string; readonly name: string };
}

export interface Standing {
  readonly number: number;
  readonly revision: number;
  readonly changes: RevisionDocument['changes'];
  /** What was approved before, for a change order. */
  readonly agreed: Agreed | null;
  readonly madeAt: Date;
}

export interface Agreed {
  /** All groups that could be chosen then. */
  readonly known: readonly (string | null)[];
  readonly taken: readonly string[];
}

/** Freezes what a quote says, with the words around it, into the document of a revision. No cost gets in. */
export function buildDocument(worked: WorkedQuote, parties: Parties, standing: Standing): RevisionDocument {
  const { plan, quote, book } = worked;
  const { company, texts, client, property, job } = parties;
  const validUntil = new Date(standing.madeAt.getTime() + book.validDays * 86_400_000);
  const sheets = sheetsInUse(plan);
  return {
    form: 1,
    number: standing.number,
    revision: standing.revision,
    changes: standing.changes,
    madeAt: standing.madeAt.toISOString(),
    validUntil: validUntil.toISOString().slice(0, 10),
    currency: quote.currency,
    locale: quote.locale,
    region: regionOf(company.region),
    units: parties.settings.units,
    company: { name: company.name, ...texts.company },
    client: {
      name: client.name,
      email: client.email ?? '',
      phone: client.phone ?? '',
      address: property.address,
    },
    job: { ...job, property: property.name },
    plan: { version: worked.planVersion, schema: PLAN_SCHEMA_VERSION, records: [...plan.values()] },
    sheets: sheets.map(({ id, name, view, widthPx, heightPx }) => ({ id, name, view, widthPx, heightPx })),
    lights: lightsOf(worked),
    evening: eveningOf(parties),
    price: {
      groups: quote.groups.map((group) =>
        group.id === null ? { ...group, name: baseName(group.fixtures) } : group,
      ),
      lines: quote.lines.map(({ key, groupId, section, kind, name, quantity, unit, priceMinor }) => ({
        key,
        groupId,
        section,
        kind,
        name,
        quantity,
        unit,
        priceMinor: book.showLinePrices ? priceMinor : null,
      })),
      discountName: quote.discountName,
      tax: quote.tax,
      stages: worked.pricing.stages ?? book.stages,
      combinations: begunWithAgreed(combinationsOf(worked), worked, standing.agreed),
    },
    words: parties.words,
    cautions: [...proposalCautions(wordsOf(regionOf(company.region)).protectiveDevice)],
    acceptedFaults: worked.faults.flatMap(({ message, acceptance }) =>
      acceptance ? [{ message, reason: acceptance.reason, by: acceptance.by, at: acceptance.at }] : [],
    ),
  };
}

/** Of a degree: about a kilometre. The sun sets there within seconds of the same time, and nobody is pointed at. */
const PLACE_STEPS = 100;

/** Where the sun sets: at the property, or about where the company works; its clocks are the company's. */
function eveningOf({ property, settings }: Parties): EveningPlace {
  const { latitude, longitude } = property;
  const place = latitude !== null && longitude !== null ? { latitude, longitude } : settings.place;
  const roughly = (degrees: number) => Math.round(degrees * PLACE_STEPS) / PLACE_STEPS;
  return {
    place: place && { latitude: roughly(place.latitude), longitude: roughly(place.longitude) },
    timeZone: settings.timeZone,
  };
}

/** What is always in, in words that need no plan. */
const baseName = (lights: number): string =>
  lights === 0 ? 'Transformer, control and wiring' : 'Transformer, wiring and the lights always in';

/** Sheets on which something stands, in their order. */
function sheetsInUse(plan: PlanDocument): SheetRecord[] {
  const used = new Set([...recordsOf(plan, 'fixture')].map(({ sheetId }) => sheetId));
  return [...recordsOf(plan, 'sheet')].filter(({ id }) => used.has(id)).sort((a, b) => a.order - b.order);
}

function lightsOf({ plan, pricing, volts }: WorkedQuote): ShownLight[] {
  const groups = recordGroups(plan, pricing);
  const schedule = new Map(scheduleOf(plan).map((row) => [row.recordId, row]));
  return [...recordsOf(plan, 'fixture')].map((fixture) => {
    const item = itemOf(plan, fixture.itemId, 'fixture');
    const row = schedule.get(fixture.id);
    const initial = item ? fixtureInitial(item.kind) : initialOf(plan, fixture);
    const lamp = row?.lamp ? `, with ${row.lamp}` : '';
    return {
      recordId: fixture.id,
      sheetId: fixture.sheetId,
      ...fixture.at,
      tag: `${initial}${fixture.number}`,
      initial,
      kind: item?.kind ?? '',
      name: `${item?.name ?? 'Light'}${lamp}`,
      // What the designer called it says it best: "Old oak".
      lights: fixture.name || (item ? whatItLights(item.kind) : ''),
      quantity: fixture.quantity,
      groupId: groups.get(fixture.id) ?? null,
      technical: {
        volts: volts.get(fixture.id) ?? null,
        watts: row?.watts ?? null,
        lumens: row?.lumens ?? null,
        beamDegrees: row?.beamDegrees ?? null,
        cctKelvin: row?.cctKelvin ?? null,
      },
    };
  });
}

/** Every combination with its sums, whether it can be taken, and why not in a homeowner's words. */
export function combinationsOf({ quote, checks }: Pick<WorkedQuote, 'quote' | 'checks'>): ShownCombination[] {
  const byGroups = new Map(checks.map((check) => [check.groups.join(' '), check]));
  return quote.combinations.map((totals) => {
    const offerable = byGroups.get(totals.groups.join(' '))?.offerable ?? false;
    return { ...totals, offerable, reason: offerable ? '' : reasonAgainst(quote, totals.groups) };
  });
}

function reasonAgainst({ groups }: Quote, taken: readonly string[]): string {
  const lights = groups.reduce(
    (sum, { id, fixtures }) => (id === null || taken.includes(id) ? sum + fixtures : sum),
    0,
  );
  return lights === 0
    ? 'There would be no light in it. Please take at least one part with lights.'
    : 'With these lights alone the wiring would not feed every lamp as it should. Ask us, and we will change the plan.';
}

/**
 * The first combination is the one that is offered. A change order offers what was approved, with those of the
 * new groups that the company takes: beside any other choice, what it costs more would tell nothing.
 */
function begunWithAgreed(
  combinations: ShownCombination[],
  { quote }: WorkedQuote,
  agreed: Agreed | null,
): ShownCombination[] {
  if (agreed === null) return combinations;
  const priced = new Set(combinations[0]?.groups);
  const wanted = quote.groups.flatMap(({ id }) => {
    if (id === null) return [];
    return (agreed.known.includes(id) ? agreed.taken.includes(id) : priced.has(id)) ? [id] : [];
  });
  const first = combinations.find(
    ({ groups }) => groups.length === wanted.length && wanted.every((id) => groups.includes(id)),
  );
  return first?.offerable ? [first, ...combinations.filter((one) => one !== first)] : combinations;
}
