import { capitalised, listed } from '../estimate/index.js';
import {
  type FixtureRecord,
  labelOf,
  lightOf,
  type PlanDocument,
  type RunRecord,
  recordOf,
  recordsOf,
  settingsOf,
  type TransformerRecord,
} from '../plan/index.js';
import { labelsInWords } from '../price/index.js';
import type { ControlZone } from './night-scene.js';

/** The zone of lights that nothing feeds yet; they are shown as the plan's own schedule says. */
export const UNFED_ZONE_ID = 'unfed';

export interface ControlZones {
  /** Those with lights in them: transformers, runs with a switch of their own, zones of smart lamps, what is unfed. */
  readonly zones: readonly ControlZone[];
  /** The zone's id of every fixture. */
  readonly zoneOf: ReadonlyMap<string, string>;
  /** Sentences of what can be switched apart and what can't. */
  readonly together: readonly string[];
}

/**
 * What is switched together. All that hangs on a transformer is, but for runs with a switch of their own and for
 * smart lamps in a zone.
 */
export function controlZonesOf(doc: PlanDocument): ControlZones {
  const settings = settingsOf(doc);
  const feeds = feedsOf(doc);
  const zoneOf = new Map<string, string>();
  const zones = new Map<string, ControlZone>();
  const add = (zone: ControlZone): string => {
    if (!zones.has(zone.id)) zones.set(zone.id, zone);
    return zone.id;
  };
  for (const fixture of recordsOf(doc, 'fixture')) {
    const feed = feeds.get(fixture.id);
    const smart = isSmart(doc, fixture) ? recordOf(doc, fixture.zoneId, 'zone') : undefined;
    if (smart) {
      const { id, name, schedule } = smart;
      zoneOf.set(fixture.id, add({ id, kind: 'smart', name, schedule }));
    } else if (!feed) {
      const { schedule } = settings;
      zoneOf.set(fixture.id, add({ id: UNFED_ZONE_ID, kind: 'feed', name: 'Not wired yet', schedule }));
    } else {
      const { run, transformer } = feed;
      const fromTransformer = transformer.schedule ?? settings.schedule;
      const zone: ControlZone =
        run.schedule === null
          ? {
              id: transformer.id,
              kind: 'feed',
              name: labelOf(transformer, doc),
              schedule: fromTransformer,
            }
          : { id: run.id, kind: 'run', name: capitalised(labelOf(run, doc)), schedule: run.schedule };
      zoneOf.set(fixture.id, add(zone));
    }
  }
  return { zones: [...zones.values()], zoneOf, together: sentencesOf(doc, feeds, zoneOf) };
}

interface Feed {
  readonly run: RunRecord;
  readonly transformer: TransformerRecord;
}

/** The run and transformer of every fixture that cable of a run reaches; of several, the one with the lowest number. */
function feedsOf(doc: PlanDocument): Map<string, Feed> {
  const feeds = new Map<string, Feed>();
  for (const cable of recordsOf(doc, 'cable')) {
    const run = recordOf(doc, cable.runId, 'run');
    const transformer = run && recordOf(doc, run.transformerId, 'transformer');
    if (!transformer) continue;
    for (const end of [cable.fromId, cable.toId]) {
      const known = feeds.get(end);
      if (doc.get(end)?.kind === 'fixture' && (!known || run.number < known.run.number))
        feeds.set(end, { run, transformer });
    }
  }
  return feeds;
}

function isSmart(doc: PlanDocument, fixture: FixtureRecord): boolean {
  return lightOf(doc, fixture)?.smart === true;
}

function sentencesOf(
  doc: PlanDocument,
  feeds: ReadonlyMap<string, Feed>,
  zoneOf: ReadonlyMap<string, string>,
): string[] {
  const sentences: string[] = [];
  const byNumber = <R extends { number: number }>(a: R, b: R) => a.number - b.number;
  const label = (run: RunRecord) => labelOf(run, doc);
  const used = new Set([...feeds.values()].map(({ run }) => run.id));
  const transformers = [...recordsOf(doc, 'transformer')].sort(byNumber);
  const named: string[] = [];
  for (const transformer of transformers) {
    const runs = [...recordsOf(doc, 'run')]
      .filter((run) => run.transformerId === transformer.id && used.has(run.id))
      .sort(byNumber);
    if (runs.length === 0) continue;
    const name = labelOf(transformer, doc);
    named.push(name);
    const shared = runs.filter((run) => run.schedule === null);
    const own = runs.filter((run) => run.schedule !== null);
    const [only] = shared;
    if (shared.length > 1)
      sentences.push(`${capitalised(listed(shared.map(label)))} hang on ${name} and switch together.`);
    else if (only) sentences.push(`${capitalised(label(only))} hangs on ${name} and switches with it.`);
    for (const run of own)
      sentences.push(
        `${capitalised(label(run))} hangs on ${name} with a switch of its own and can be on by itself.`,
      );
  }
  if (named.length > 1) sentences.push(`${listed(named)} can be switched apart from one another.`);
  sentences.push(...smartSentences(doc, feeds, zoneOf));
  const unfed = [...recordsOf(doc, 'fixture')].filter(({ id }) => zoneOf.get(id) === UNFED_ZONE_ID);
  if (unfed.length > 0)
    sentences.push(
      `${lights(doc, unfed)} ${unfed.length === 1 ? 'is' : 'are'} not wired yet; the wiring will say what switches with what.`,
    );
  return sentences;
}

function smartSentences(
  doc: PlanDocument,
  feeds: ReadonlyMap<string, Feed>,
  zoneOf: ReadonlyMap<string, string>,
): string[] {
  const sentences: string[] = [];
  for (const zone of recordsOf(doc, 'zone')) {
    const members = [...recordsOf(doc, 'fixture')].filter(({ zoneId }) => zoneId === zone.id);
    const smart = members.filter(({ id }) => zoneOf.get(id) === zone.id);
    if (members.length === 0) sentences.push(`No light is in ${zone.name} yet.`);
    if (smart.length > 0) {
      const fed = new Set(
        smart.flatMap(({ id }) => {
          const feed = feeds.get(id);
          return feed ? [labelOf(feed.run.schedule === null ? feed.transformer : feed.run, doc)] : [];
        }),
      );
      const apart =
        fed.size === 0
          ? ''
          : ` They switch apart from ${listed([...fed])}, which must stay on for as long as they are to be lit.`;
      sentences.push(`${zone.name} switches by itself: ${lights(doc, smart)}.${apart}`);
    }
    const plain = members.filter(({ id }) => zoneOf.get(id) !== zone.id);
    if (plain.length > 0) {
      const [verb, it, lamp] = plain.length === 1 ? ['is', 'it', 'its lamp'] : ['are', 'they', 'their lamps'];
      sentences.push(
        `${lights(doc, plain)} ${verb} put in ${zone.name}, but ${lamp} can’t switch by ${it === 'it' ? 'itself' : 'themselves'}: ${it} ${verb} on with the feed.`,
      );
    }
  }
  return sentences;
}

function lights(doc: PlanDocument, fixtures: readonly FixtureRecord[]): string {
  return labelsInWords(fixtures.map((fixture) => labelOf(fixture, doc)));
}
