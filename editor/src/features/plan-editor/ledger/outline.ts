import type { CableLength } from '@lampwright/geometry/estimate';
import { scheduleInWords } from '@lampwright/geometry/night';
import {
  type CableRecord,
  commonsOf,
  itemOf,
  type PlanDocument,
  type RunRecord,
  recordOf,
  recordsOf,
  SETTINGS_ID,
} from '@lampwright/geometry/plan';
import { type FixtureLook, fixtureLook, unwiredLook } from '../../../plan-view/fixture-look';
import { tagOf, windowOf } from '../../../plan-view/names';
import type { Readings } from '../../../plan-view/scene';
import { percentText, voltAmpsText, voltsText } from '../../../plan-view/words';

/** One line of the ledger. Rows come in the order in which they are shown, parents before children. */
export interface OutlineRow {
  /** Unique in the outline; the record's id where it stands for one. */
  readonly key: string;
  readonly recordId: string | null;
  readonly kind: 'transformer' | 'common' | 'run' | 'fixture' | 'cable' | 'junction' | 'group' | 'other';
  readonly level: number;
  readonly parent: string | null;
  readonly title: string;
  readonly detail: string;
  /** The figure at the end of the line; empty while there is none. */
  readonly figure: string;
  readonly look: FixtureLook | null;
  /** Share of a limit, for a bar. */
  readonly loadPercent: number | null;
  readonly parentOf: number;
}

export interface OutlineWords {
  readonly length: (meters: number | null) => string;
  readonly area: (use: string) => string;
}

type Draft = Omit<OutlineRow, 'parentOf'>;

/** The plan as an outline: transformers, their commons, their runs, what hangs on each, then all the rest. */
export function outlineOf(
  doc: PlanDocument,
  readings: Readings,
  lengths: ReadonlyMap<string, CableLength>,
  words: OutlineWords,
): OutlineRow[] {
  const rows: Draft[] = [];
  const cables = cablesOfRuns(doc);
  const shown = new Set<string>();
  const { answers } = readings;

  const leaf = (id: string, level: number, parent: string): void => {
    const record = doc.get(id);
    if (record?.kind === 'fixture') {
      shown.add(id);
      const reading = answers?.fixtures.get(id);
      const window = windowOf(doc, record);
      const unwired = readings.unwired.has(id);
      const item = itemOf(doc, record.itemId, 'fixture');
      const name = record.name || item?.name || 'Fixture';
      rows.push({
        key: id,
        recordId: id,
        kind: 'fixture',
        level,
        parent,
        title: `${tagOf(doc, record)} ${name}`,
        detail: record.quantity > 1 ? `× ${record.quantity}` : '',
        figure: unwired ? 'not wired yet' : reading === undefined ? '' : voltsText(reading.volts, window),
        look: unwired ? unwiredLook : fixtureLook(reading, window),
        loadPercent: null,
      });
    } else if (record?.kind === 'junction' && record.style === 'hub') {
      shown.add(id);
      rows.push(plain(id, 'junction', level, parent, `${tagOf(doc, record)} ${record.name || 'Hub'}`));
    }
  };

  const run = (record: RunRecord, parent: string): void => {
    const own = cables.get(record.id) ?? [];
    const reading = answers?.runs.get(record.id);
    const total = own.reduce<number | null>((sum, c) => {
      const length = lengths.get(c.id)?.totalMeters ?? null;
      return sum === null || length === null ? null : sum + length;
    }, 0);
    rows.push({
      key: record.id,
      recordId: record.id,
      kind: 'run',
      level: 3,
      parent,
      title: `Run ${record.number}`,
      detail: [record.name, gauges(doc, own), tapText(doc, record)].filter(Boolean).join(' · '),
      figure:
        own.length === 0
          ? ''
          : total === null
            ? 'waits for scale'
            : words.length(reading?.lengthMeters ?? total),
      look: null,
      loadPercent: null,
    });
    for (const id of nodesInOrder(record, own)) if (!shown.has(id)) leaf(id, 4, record.id);
    cableGroup(own, `${record.id}/cable`, 4, record.id);
  };

  const cableGroup = (
    list: readonly CableRecord[],
    key: string,
    level: number,
    parent: string | null,
  ): void => {
    if (list.length === 0) return;
    rows.push(
      plain(null, 'group', level, parent, list.length === 1 ? 'Cable' : `Cable, ${list.length} lengths`, key),
    );
    for (const cable of list) {
      shown.add(cable.id);
      const length = lengths.get(cable.id)?.totalMeters ?? null;
      const percent = answers?.cables.get(cable.id)?.ampacityPercent ?? null;
      rows.push({
        key: cable.id,
        recordId: cable.id,
        kind: 'cable',
        level: level + 1,
        parent: key,
        title: endsText(doc, cable),
        detail: itemOf(doc, cable.itemId, 'cable')?.name ?? '',
        figure: [
          length === null ? 'waits for scale' : words.length(length),
          percent !== null && percent > 80 ? percentText(percent) : '',
        ]
          .filter(Boolean)
          .join(' · '),
        look: null,
        loadPercent: null,
      });
    }
  };

  const runs = [...recordsOf(doc, 'run')].sort((a, b) => a.number - b.number);
  for (const transformer of [...recordsOf(doc, 'transformer')].sort((a, b) => a.number - b.number)) {
    const item = itemOf(doc, transformer.itemId, 'transformer');
    const reading = answers?.transformers.get(transformer.id);
    shown.add(transformer.id);
    rows.push({
      key: transformer.id,
      recordId: transformer.id,
      kind: 'transformer',
      level: 1,
      parent: null,
      title: `T${transformer.number}${transformer.name ? ` · ${transformer.name}` : ''}`,
      detail: '',
      figure:
        item === undefined
          ? ''
          : `${reading === undefined ? '0' : Math.round(reading.voltAmps)} / ${voltAmpsText(item.ratedVA)}`,
      look: null,
      loadPercent: reading?.loadPercent ?? 0,
    });
    const own = runs.filter((r) => r.transformerId === transformer.id);
    const commons = item === undefined ? [] : commonsOf(item);
    for (const common of commons) {
      const landed = own.filter((r) => r.commonId === common.id);
      if (landed.length === 0) continue;
      const key = `${transformer.id}/${common.id}`;
      const load = answers?.common(transformer.id, common.id);
      const limit = common.limitAmps === null ? '' : ` / ${common.limitAmps} A`;
      rows.push({
        key,
        recordId: null,
        kind: 'common',
        level: 2,
        parent: transformer.id,
        title: `Common ${common.id}`,
        detail: '',
        figure: load === undefined ? '' : `${load.amps.toFixed(1)}${limit || ' A'}`,
        look: null,
        loadPercent: load?.loadPercent ?? null,
      });
      for (const record of landed) run(record, key);
    }
    const feeds = [...recordsOf(doc, 'feed')].filter((f) => f.transformerId === transformer.id);
    for (const feed of feeds) {
      shown.add(feed.id);
      const sheet = doc.get(feed.sheetId);
      rows.push(
        plain(
          feed.id,
          'other',
          2,
          transformer.id,
          `Feed on ${sheet?.kind === 'sheet' ? sheet.name : 'another sheet'}`,
        ),
      );
    }
  }

  const loose = [...recordsOf(doc, 'fixture')].filter((f) => !shown.has(f.id));
  if (loose.length > 0) {
    rows.push(plain(null, 'group', 1, null, 'Not wired yet', 'loose'));
    for (const fixture of loose) leaf(fixture.id, 2, 'loose');
  }
  cableGroup(
    [...recordsOf(doc, 'cable')].filter((c) => !shown.has(c.id)),
    'loose-cable',
    1,
    null,
  );
  uprights(doc, rows, words);
  rest(doc, rows, shown, words);
  if (rows.length > 0) times(doc, rows);
  return counted(rows);
}

/** What stops and catches light: walls, then trees. */
function uprights(doc: PlanDocument, rows: Draft[], words: OutlineWords): void {
  const marks = [...recordsOf(doc, 'face'), ...recordsOf(doc, 'tree')];
  if (marks.length === 0) return;
  rows.push(plain(null, 'group', 1, null, 'Walls and trees', 'uprights'));
  for (const record of marks)
    rows.push({
      ...plain(record.id, 'other', 2, 'uprights', tagOf(doc, record)),
      figure: words.length(record.heightMeters),
    });
}

/** When the lights are on, and the zones of those that switch themselves. */
function times(doc: PlanDocument, rows: Draft[]): void {
  const settings = recordOf(doc, SETTINGS_ID, 'settings');
  const zones = [...recordsOf(doc, 'zone')];
  if (settings === undefined && zones.length === 0) return;
  rows.push(plain(null, 'group', 1, null, 'Times and zones', 'times'));
  if (settings !== undefined)
    rows.push({
      ...plain(settings.id, 'other', 2, 'times', 'The plan’s lights'),
      detail: scheduleInWords(settings.schedule),
    });
  const members = new Map<string, number>();
  for (const { zoneId } of recordsOf(doc, 'fixture'))
    if (zoneId !== null) members.set(zoneId, (members.get(zoneId) ?? 0) + 1);
  for (const zone of zones) {
    const count = members.get(zone.id) ?? 0;
    rows.push({
      ...plain(zone.id, 'other', 2, 'times', zone.name),
      detail: scheduleInWords(zone.schedule),
      figure: count === 1 ? '1 light' : `${count} lights`,
    });
  }
}

function rest(doc: PlanDocument, rows: Draft[], shown: ReadonlySet<string>, words: OutlineWords): void {
  const others: Draft[] = [];
  for (const record of doc.values()) {
    if (shown.has(record.id)) continue;
    switch (record.kind) {
      case 'junction':
        if (record.style === 'hub' || record.name !== '')
          others.push(
            plain(record.id, 'junction', 2, 'rest', `${tagOf(doc, record)} ${record.name || 'Hub'}`),
          );
        break;
      case 'area':
        others.push(plain(record.id, 'other', 2, 'rest', record.name || words.area(record.use)));
        break;
      case 'measurement':
        others.push(plain(record.id, 'other', 2, 'rest', 'Measurement'));
        break;
      case 'note':
        others.push(plain(record.id, 'other', 2, 'rest', `Note: ${record.text.split('\n')[0] ?? ''}`));
        break;
      case 'sheet':
      case 'transformer':
      case 'feed':
      case 'fixture':
      case 'run':
      case 'cable':
      case 'face':
      case 'tree':
      case 'zone':
      case 'item':
      case 'settings':
        break;
    }
  }
  if (others.length === 0) return;
  rows.push(plain(null, 'group', 1, null, 'Ground, hubs and notes', 'rest'), ...others);
}

function plain(
  recordId: string | null,
  kind: OutlineRow['kind'],
  level: number,
  parent: string | null,
  title: string,
  key = recordId ?? title,
): Draft {
  return { key, recordId, kind, level, parent, title, detail: '', figure: '', look: null, loadPercent: null };
}

function counted(rows: readonly Draft[]): OutlineRow[] {
  const children = new Map<string, number>();
  for (const row of rows)
    if (row.parent !== null) children.set(row.parent, (children.get(row.parent) ?? 0) + 1);
  return rows.map((row) => ({ ...row, parentOf: children.get(row.key) ?? 0 }));
}

function cablesOfRuns(doc: PlanDocument): Map<string, CableRecord[]> {
  const map = new Map<string, CableRecord[]>();
  for (const cable of recordsOf(doc, 'cable')) {
    if (cable.runId === null) continue;
    const list = map.get(cable.runId);
    if (list === undefined) map.set(cable.runId, [cable]);
    else list.push(cable);
  }
  return map;
}

/** What a run reaches, as its cable is walked from the transformer outwards. */
export function nodesInOrder(run: RunRecord, cables: readonly CableRecord[]): string[] {
  const next = new Map<string, string[]>();
  const link = (a: string, b: string): void => {
    const list = next.get(a);
    if (list === undefined) next.set(a, [b]);
    else list.push(b);
  };
  for (const cable of cables) {
    link(cable.fromId, cable.toId);
    link(cable.toId, cable.fromId);
  }
  const order: string[] = [];
  const seen = new Set<string>();
  const walk = (start: string): void => {
    const stack = [start];
    for (let id = stack.pop(); id !== undefined; id = stack.pop()) {
      if (seen.has(id)) continue;
      seen.add(id);
      order.push(id);
      for (const other of [...(next.get(id) ?? [])].reverse()) if (!seen.has(other)) stack.push(other);
    }
  };
  walk(run.transformerId);
  // Feeds on other sheets, and whatever two people's edits may have torn off.
  for (const cable of cables) for (const id of [cable.fromId, cable.toId]) if (!seen.has(id)) walk(id);
  return order;
}

function gauges(doc: PlanDocument, cables: readonly CableRecord[]): string {
  const names = new Set<string>();
  for (const cable of cables) {
    const conductor = itemOf(doc, cable.itemId, 'cable')?.conductor;
    if (conductor === undefined) continue;
    names.add(gaugeText(conductor));
  }
  return [...names].join(', ');
}

export function gaugeText(conductor: { awg: number } | { mm2: number } | { ohmsPerKm: number }): string {
  if ('awg' in conductor) return `${conductor.awg} AWG`;
  if ('mm2' in conductor) return `${conductor.mm2} mm²`;
  return `${conductor.ohmsPerKm} Ω/km`;
}

function tapText(doc: PlanDocument, run: RunRecord): string {
  const transformer = doc.get(run.transformerId);
  const item =
    transformer?.kind === 'transformer' ? itemOf(doc, transformer.itemId, 'transformer') : undefined;
  const tap = item?.terminals.find((t) => t.type === 'tap' && t.id === run.tapId);
  return tap?.type === 'tap' ? `${tap.volts} V tap` : `tap ${run.tapId}`;
}

export function endsText(doc: PlanDocument, cable: CableRecord): string {
  const end = (id: string): string => {
    const record = doc.get(id);
    return record === undefined ? '?' : tagOf(doc, record);
  };
  return `${end(cable.fromId)} to ${end(cable.toId)}`;
}
