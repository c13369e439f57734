import { cutLength } from '../../measure/index.js';
import {
  type CableRecord,
  cablePoints,
  type PlanDocument,
  type PlanRecord,
  recordOf,
  recordsOf,
  type SettingsRecord,
  type SheetRecord,
  settingsOf,
} from '../../plan/index.js';
import { lengthAlong, type MeasuredLength } from '../../sheet/index.js';
import { type Meters, meters } from '../../units/index.js';
import { scaleOfSheet, sheetPoint } from './sheet-scale.js';

/** Why a cable has no length yet. */
export type WaitingFor =
  /** Its sheet has no scale that can be solved. */
  | 'scale'
  /** Part of it is drawn at or above the photo's horizon. */
  | 'horizon';

/** What the length of a cable is made of, as shown in the inspector. */
export interface CableLength {
  /** Along the drawing, with its error; null while that can't be known. */
  readonly plan: MeasuredLength | null;
  /** Measured on site, in place of the drawn length. */
  readonly measuredMeters: Meters | null;
  readonly slackFromMeters: Meters;
  readonly slackToMeters: Meters;
  readonly riseMeters: Meters;
  /** Measured or drawn, plus slack at both ends, plus rise; no waste. Null while it waits. */
  readonly totalMeters: Meters | null;
  readonly waitsFor: WaitingFor | null;
}

interface Remembered {
  readonly from: PlanRecord | undefined;
  readonly to: PlanRecord | undefined;
  readonly sheet: SheetRecord | undefined;
  readonly settings: SettingsRecord;
  readonly length: CableLength;
}

/** By cable record: records never change, so an entry holds until one of the other four does. */
const remembered = new WeakMap<CableRecord, Remembered>();

/**
 * The length of every cable by id. Costs a look at each cable and work only for those whose ends, bends,
 * sheet or settings changed since the last call, so that it can follow a drag.
 */
export function cableLengths(doc: PlanDocument): Map<string, CableLength> {
  const settings = settingsRecordOf(doc);
  const lengths = new Map<string, CableLength>();
  for (const cable of recordsOf(doc, 'cable')) lengths.set(cable.id, remember(doc, cable, settings));
  return lengths;
}

const settingsOfDoc = new WeakMap<PlanDocument, SettingsRecord>();
/** A plan without settings gets the same made-up ones each time it is asked, so that nothing is recomputed. */
function settingsRecordOf(doc: PlanDocument): SettingsRecord {
  let settings = settingsOfDoc.get(doc);
  if (!settings) {
    settings = settingsOf(doc);
    settingsOfDoc.set(doc, settings);
  }
  return settings;
}

function remember(doc: PlanDocument, cable: CableRecord, settings: SettingsRecord): CableLength {
  const from = doc.get(cable.fromId);
  const to = doc.get(cable.toId);
  const sheet = recordOf(doc, cable.sheetId, 'sheet');
  const old = remembered.get(cable);
  if (old && old.from === from && old.to === to && old.sheet === sheet && old.settings === settings)
    return old.length;
  const length = lengthOf(doc, cable, sheet, settings);
  remembered.set(cable, { from, to, sheet, settings, length });
  return length;
}

function lengthOf(
  doc: PlanDocument,
  cable: CableRecord,
  sheet: SheetRecord | undefined,
  settings: SettingsRecord,
): CableLength {
  const scale = sheet && scaleOfSheet(sheet);
  const points = cablePoints(doc, cable);
  const plan = scale?.ok && points ? lengthAlong(scale.scale, points.map(sheetPoint)) : null;
  const parts = {
    planMeters: plan?.meters ?? null,
    measuredMeters: cable.measuredMeters === null ? null : meters(cable.measuredMeters),
    slackFromMeters: meters(cable.slackFromMeters ?? slackAt(doc.get(cable.fromId), settings)),
    slackToMeters: meters(cable.slackToMeters ?? slackAt(doc.get(cable.toId), settings)),
    riseMeters: meters(cable.riseMeters),
  };
  const totalMeters = cutLength(parts);
  const { planMeters: _, ...rest } = parts;
  const waitsFor = totalMeters !== null ? null : scale?.ok ? 'horizon' : 'scale';
  return { plan, ...rest, totalMeters, waitsFor };
}

/** What the plan's settings leave over at an end of that kind. */
function slackAt(end: PlanRecord | undefined, settings: SettingsRecord): number {
  switch (end?.kind) {
    case 'fixture':
      return settings.slackAtFixtureMeters;
    case 'transformer':
    case 'feed':
      return settings.slackAtTransformerMeters;
    default:
      return settings.slackAtJunctionMeters;
  }
}
