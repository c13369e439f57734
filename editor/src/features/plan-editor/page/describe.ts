import type { PlanRecord } from '@lampwright/geometry/plan';

const words: Readonly<Record<string, string>> = {
  at: 'place',
  via: 'bends',
  points: 'outline',
  itemId: 'item',
  lampId: 'lamp',
  tapId: 'tap',
  commonId: 'common',
  runId: 'run',
  fromId: 'start',
  toId: 'end',
  lineVolts: 'line volts',
  measuredMeters: 'measured length',
  slackFromMeters: 'slack at its start',
  slackToMeters: 'slack at its end',
  riseMeters: 'rise',
  extraOhms: 'splices',
  markedToMarked: 'marked to marked',
  heightMeters: 'height',
  foot: 'foot',
  top: 'upper edge',
  outline: 'crown',
  crownBaseMeters: 'lower edge of its crown',
  aim: 'aim',
  mountingHeightMeters: 'mounting height',
  zoneId: 'zone',
  schedule: 'times',
  lightTarget: 'light wanted',
  whiteLux: 'exposure at night',
  references: 'scale',
  groundMetersPerPaperMeter: 'drawing scale',
};

/** What differs between a record and what it was, field by field, for a person to choose by. */
export function describeRecord(record: PlanRecord, base: PlanRecord | null): string[] {
  const before: Readonly<Record<string, unknown>> = base === null ? {} : { ...base };
  const told: string[] = [];
  for (const [field, value] of Object.entries(record)) {
    if (field === 'id' || field === 'kind' || same(value, before[field])) continue;
    told.push(`${words[field] ?? field} ${valueText(value)}`.trim());
  }
  return told;
}

function valueText(value: unknown): string {
  if (value === null) return 'none';
  if (typeof value === 'string')
    return value === '' ? 'empty' : `“${value.length > 60 ? `${value.slice(0, 59)}…` : value}”`;
  if (typeof value === 'number') return String(Math.round(value * 1000) / 1000);
  if (typeof value === 'boolean') return value ? 'yes' : 'no';
  if (isPoint(value)) return `at ${Math.round(value.x)}, ${Math.round(value.y)}`;
  return 'changed';
}

function isPoint(value: unknown): value is { x: number; y: number } {
  return (
    typeof value === 'object' &&
    value !== null &&
    'x' in value &&
    'y' in value &&
    typeof value.x === 'number' &&
    typeof value.y === 'number'
  );
}

function same(a: unknown, b: unknown): boolean {
  return JSON.stringify(a) === JSON.stringify(b);
}

/** The name that a person gave a record; empty where it has none. */
export function describeName(record: PlanRecord): string {
  switch (record.kind) {
    case 'transformer':
    case 'feed':
    case 'fixture':
    case 'junction':
    case 'run':
    case 'face':
    case 'tree':
    case 'zone':
      return record.name;
    default:
      return '';
  }
}
