import type { CableAnswer } from '@lampwright/geometry/estimate';
import {
  type AreaRecord,
  cablePoints,
  type FaceRecord,
  initialOf,
  itemOf,
  type NoteRecord,
  type PlanDocument,
  type PlanPoint,
  recordOf,
  type TreeRecord,
} from '@lampwright/geometry/plan';
import type { Answers } from './answers';
import { cableColour, cableWeight, type LoadBand, loadBand } from './cable-look';
import type { Point } from './camera';
import type { AreaShape } from './draw/areas';
import type { CableStroke } from './draw/cable';
import type { FaceShape, TreeShape } from './draw/uprights';
import { type FixtureLook, fixtureLook, isFault, unwiredLook } from './fixture-look';
import { tagOf, windowOf } from './names';
import { dimBlue, grey, ink, overRed } from './palette';
import { ampsText, voltsText } from './words';

export interface SceneFixture {
  readonly id: string;
  readonly at: Point;
  readonly look: FixtureLook;
  readonly initial: string;
  /** What its label says when it has one. */
  readonly text: string;
  /** What it says while it is hovered: amps and drop as well. */
  readonly fullText: string;
  /** Why it has a label without being hovered or chosen; null: it has none. */
  readonly standing: 'fault' | 'worst' | 'unwired' | null;
}

export interface SceneCable extends CableStroke {
  readonly id: string;
  readonly fromId: string;
  readonly toId: string;
  readonly via: readonly Point[];
  /** What is said of it while it is hovered. */
  readonly text: string;
}

export interface SceneNode {
  readonly id: string;
  readonly at: Point;
  readonly kind: 'transformer' | 'feed' | 'hub' | 'splice' | 'note';
  readonly label: string;
  /** How its load stands to its limit. */
  readonly band: LoadBand;
}

export interface SceneMeasurement {
  readonly id: string;
  readonly points: readonly Point[];
  readonly text: string;
}

/** What one sheet of a plan shows: plain data in sheet pixels, ready to draw at any camera. */
export interface Scene {
  readonly fixtures: readonly SceneFixture[];
  readonly cables: readonly SceneCable[];
  readonly nodes: readonly SceneNode[];
  readonly areas: readonly AreaShape[];
  readonly faces: readonly FaceShape[];
  readonly trees: readonly TreeShape[];
  readonly measurements: readonly SceneMeasurement[];
}

export const emptyScene: Scene = {
  fixtures: [],
  cables: [],
  nodes: [],
  areas: [],
  faces: [],
  trees: [],
  measurements: [],
};

/** Words that need the sheet's scale and the person's units. */
export interface SceneWords {
  readonly areaText: (area: AreaRecord) => string;
  readonly lengthText: (points: readonly PlanPoint[]) => string;
  readonly heightText: (heightMeters: number) => string;
  /** The length of a cable as the estimate counts it; empty while it has none. */
  readonly cableLength: (cableId: string) => string;
}

/** What is known of a plan's volts: the last answer, and which fixtures no run feeds. */
export interface Readings {
  readonly answers: Answers | null;
  readonly unwired: ReadonlySet<string>;
}

export function buildScene(
  doc: PlanDocument,
  sheetId: string,
  { answers, unwired }: Readings,
  words: SceneWords,
): Scene {
  const worst = worstOfRuns(doc, answers);
  const fixtures: SceneFixture[] = [];
  const cables: SceneCable[] = [];
  const nodes: SceneNode[] = [];
  const areas: AreaShape[] = [];
  const faces: FaceShape[] = [];
  const trees: TreeShape[] = [];
  const measurements: SceneMeasurement[] = [];
  for (const record of doc.values()) {
    if (!('sheetId' in record) || record.sheetId !== sheetId) continue;
    switch (record.kind) {
      case 'fixture': {
        const window = windowOf(doc, record);
        const reading = answers?.fixtures.get(record.id);
        const look = unwired.has(record.id) ? unwiredLook : fixtureLook(reading, window);
        const tag = tagOf(doc, record);
        const shown =
          reading === undefined || look.kind === 'unwired' ? null : voltsText(reading.volts, window);
        fixtures.push({
          id: record.id,
          at: record.at,
          look,
          initial: initialOf(doc, record),
          fullText:
            reading === undefined || shown === null
              ? look.kind === 'unwired'
                ? `${tag} not wired yet`
                : tag
              : `${tag} ${shown} · ${ampsText(reading.amps)} · ${reading.dropPercent.toFixed(1)} % drop`,
          text: shown === null ? (look.kind === 'unwired' ? `${tag} not wired yet` : tag) : `${tag} ${shown}`,
          standing:
            look.kind === 'unwired'
              ? 'unwired'
              : isFault(look.kind)
                ? 'fault'
                : worst.has(record.id)
                  ? 'worst'
                  : null,
        });
        break;
      }
      case 'cable': {
        const points = cablePoints(doc, record);
        if (points === undefined) break;
        const item = itemOf(doc, record.itemId, 'cable');
        cables.push({
          id: record.id,
          fromId: record.fromId,
          toId: record.toId,
          via: record.via,
          text: cableText(words.cableLength(record.id), answers?.cables.get(record.id)),
          points,
          weight: item === undefined ? 2 : cableWeight(item.conductor),
          colour: cableColour(loadBand(answers?.cables.get(record.id)?.ampacityPercent ?? null)),
          dashed: record.runId === null,
        });
        break;
      }
      case 'transformer':
      case 'feed':
        nodes.push({
          id: record.id,
          at: record.at,
          kind: record.kind,
          label: tagOf(doc, record),
          band: loadBand(
            answers?.transformers.get(record.kind === 'feed' ? record.transformerId : record.id)
              ?.loadPercent ?? null,
          ),
        });
        break;
      case 'junction':
        nodes.push({
          id: record.id,
          at: record.at,
          kind: record.style,
          label: tagOf(doc, record),
          band: 'calm',
        });
        break;
      case 'note':
        nodes.push({ id: record.id, at: record.at, kind: 'note', label: firstLine(record), band: 'calm' });
        break;
      case 'area':
        areas.push({
          id: record.id,
          use: record.use,
          points: record.points,
          label: words.areaText(record),
        });
        break;
      case 'face':
        faces.push({
          id: record.id,
          foot: record.foot,
          top: record.top,
          label: uprightText(doc, record, words),
        });
        break;
      case 'tree':
        trees.push({
          id: record.id,
          foot: record.foot,
          outline: record.outline,
          label: uprightText(doc, record, words),
        });
        break;
      case 'measurement':
        measurements.push({ id: record.id, points: record.points, text: words.lengthText(record.points) });
        break;
    }
  }
  return { fixtures, cables, nodes, areas, faces, trees, measurements };
}

/** Of each run the fixture with the least room between its volts and the edge of its window. */
export function worstOfRuns(doc: PlanDocument, answers: Answers | null): Set<string> {
  const worst = new Map<string, { id: string; room: number }>();
  if (answers === null) return new Set();
  const runs = runOfNodes(doc);
  for (const reading of answers.fixtures.values()) {
    if (reading.state === 'off' || reading.state === 'unwired') continue;
    const fixture = recordOf(doc, reading.id, 'fixture');
    const window = fixture === undefined ? null : windowOf(doc, fixture);
    const run = runs.get(reading.id);
    if (window === null || run === undefined) continue;
    const room = Math.min(reading.volts - window.minVolts, window.maxVolts - reading.volts);
    const before = worst.get(run);
    if (before === undefined || room < before.room) worst.set(run, { id: reading.id, room });
  }
  return new Set([...worst.values()].map((w) => w.id));
}

/** The run whose cable reaches a record, by record id. Where two runs are joined, the first one found. */
export function runOfNodes(doc: PlanDocument): Map<string, string> {
  const runs = new Map<string, string>();
  for (const record of doc.values()) {
    if (record.kind !== 'cable' || record.runId === null) continue;
    if (!runs.has(record.fromId)) runs.set(record.fromId, record.runId);
    if (!runs.has(record.toId)) runs.set(record.toId, record.runId);
  }
  return runs;
}

/** The edge of a fixture's label: the hue of what is wrong, ink for the rest. */
export function labelEdge(look: FixtureLook): string {
  switch (look.kind) {
    case 'dim':
      return dimBlue;
    case 'overdriven':
      return overRed;
    case 'dark':
      return ink;
    case 'in-window':
    case 'off':
    case 'unwired':
    case 'waiting':
      return grey;
  }
}

function cableText(length: string, reading: CableAnswer | undefined): string {
  if (reading === undefined) return length;
  const lost = `${Math.abs(reading.dropVolts).toFixed(2)} V lost`;
  return [length, ampsText(reading.amps), lost].filter(Boolean).join(' · ');
}

function uprightText(doc: PlanDocument, record: FaceRecord | TreeRecord, words: SceneWords): string {
  return [tagOf(doc, record), words.heightText(record.heightMeters)].filter(Boolean).join(' · ');
}

function firstLine(note: NoteRecord): string {
  const line = note.text.split('\n')[0] ?? '';
  return line.length > 32 ? `${line.slice(0, 31)}…` : line;
}
