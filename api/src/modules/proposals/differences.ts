import { scaleOfSheet, sheetPoint } from '@lampwright/geometry/estimate';
import { frozenRecord } from './frozen-plan.js';
import type { Differences, RevisionDocument, ShownLight, ShownLine } from './revision-document.js';

/** A light that lies nearer to where it was than this was not moved on purpose. */
const MOVED_METERS = 0.05;
/** The same where the sheet has no scale. */
const MOVED_PIXELS = 2;

/** What the homeowner gets otherwise by the later revision: lights, lines and the total as offered. */
export function differencesOf(before: RevisionDocument, after: RevisionDocument): Differences {
  const was = new Map(before.lights.map((light) => [light.recordId, light]));
  const now = new Map(after.lights.map((light) => [light.recordId, light]));
  const named = ({ recordId, tag, name }: ShownLight) => ({ recordId, tag, name });
  const moved: Differences['moved'] = [];
  const replaced: Differences['replaced'] = [];
  for (const light of after.lights) {
    const old = was.get(light.recordId);
    if (!old) continue;
    const by = movedBy(before, old, after, light);
    if (by !== null) moved.push({ ...named(light), meters: by.meters });
    const [wasText, nowText] = [whatItIs(old), whatItIs(light)];
    if (wasText !== nowText)
      replaced.push({ recordId: light.recordId, tag: light.tag, was: wasText, now: nowText });
  }
  return {
    added: after.lights.filter(({ recordId }) => !was.has(recordId)).map(named),
    removed: before.lights.filter(({ recordId }) => !now.has(recordId)).map(named),
    moved,
    replaced,
    lines: linesOf(before.price.lines, after.price.lines),
    wasTotalMinor: agreedTotal(before, after) ?? offeredTotal(before),
    nowTotalMinor: offeredTotal(after),
  };
}

/** What was agreed, of the parts taken, where the later one is a change order to the earlier one; null otherwise. */
const agreedTotal = ({ revision }: RevisionDocument, { changes }: RevisionDocument): number | null =>
  changes?.revision === revision ? changes.totalMinor : null;

/** The total of the combination as it is offered. */
export function offeredTotal({ price }: RevisionDocument): number {
  return price.combinations[0]?.totalMinor ?? 0;
}

const whatItIs = ({ name, quantity }: ShownLight): string =>
  quantity === 1 ? name : `${quantity} × ${name}`;

/** Null where it was not moved. */
function movedBy(
  before: RevisionDocument,
  old: ShownLight,
  after: RevisionDocument,
  light: ShownLight,
): { readonly meters: number | null } | null {
  if (old.sheetId !== light.sheetId) return { meters: null };
  if (Math.hypot(light.x - old.x, light.y - old.y) <= MOVED_PIXELS) return null;
  const from = groundOf(before, old);
  const to = groundOf(after, light);
  if (!from || !to) return { meters: null };
  const meters = Math.hypot(to.x - from.x, to.y - from.y);
  return meters < MOVED_METERS ? null : { meters };
}

function groundOf(document: RevisionDocument, light: ShownLight) {
  const sheet = frozenRecord(document, light.sheetId);
  const solved = sheet?.kind === 'sheet' ? scaleOfSheet(sheet) : null;
  return solved?.ok ? solved.scale.groundFromSheet(sheetPoint(light)) : null;
}

/** Lines whose quantity or price is another, by what they are: groups may have been cut otherwise since. */
function linesOf(before: readonly ShownLine[], after: readonly ShownLine[]): Differences['lines'] {
  const was = summed(before);
  const now = summed(after);
  const lines: Differences['lines'] = [];
  for (const key of new Set([...was.keys(), ...now.keys()])) {
    const [old, present] = [was.get(key), now.get(key)];
    const line = present ?? old;
    if (!line) continue;
    const wasQuantity = old?.quantity ?? 0;
    const nowQuantity = present?.quantity ?? 0;
    const byMinor =
      old?.priceMinor === null || present?.priceMinor === null
        ? null
        : (present?.priceMinor ?? 0) - (old?.priceMinor ?? 0);
    if (wasQuantity === nowQuantity && !byMinor) continue;
    lines.push({ name: line.name, wasQuantity, nowQuantity, unit: line.unit, byMinor });
  }
  return lines;
}

interface Summed {
  readonly name: string;
  readonly unit: string;
  quantity: number;
  priceMinor: number | null;
}

function summed(lines: readonly ShownLine[]): Map<string, Summed> {
  const sums = new Map<string, Summed>();
  for (const { key, name, unit, quantity, priceMinor } of lines) {
    const what = `${key.split('@')[0]} ${unit}`;
    const sum = sums.get(what);
    if (!sum) sums.set(what, { name, unit, quantity, priceMinor });
    else {
      sum.quantity += quantity;
      sum.priceMinor = sum.priceMinor === null || priceMinor === null ? null : sum.priceMinor + priceMinor;
    }
  }
  return sums;
}
