import type { Change, PlanDocument, RecordKind } from '@lampwright/geometry/plan';

const names: Readonly<Record<RecordKind, readonly [one: string, many: string]>> = {
  sheet: ['sheet', 'sheets'],
  transformer: ['transformer', 'transformers'],
  feed: ['feed', 'feeds'],
  fixture: ['fixture', 'fixtures'],
  junction: ['splice or hub', 'splices and hubs'],
  run: ['run', 'runs'],
  cable: ['cable', 'cables'],
  area: ['area', 'areas'],
  face: ['wall face', 'wall faces'],
  tree: ['tree', 'trees'],
  zone: ['zone', 'zones'],
  measurement: ['measurement', 'measurements'],
  note: ['note', 'notes'],
  item: ['item', 'items'],
  settings: ['settings', 'settings'],
};

/** What comes along by itself is not worth telling while there is anything else. */
const quiet: ReadonlySet<RecordKind> = new Set(['item', 'run']);

/** What a change did, for the history: "Added 2 fixtures, changed 1 cable". Given the plan before it. */
export function describeChange(before: PlanDocument, change: Change): string {
  const counts = { Added: new Map<RecordKind, number>(), Changed: new Map(), Removed: new Map() };
  const count = (verb: keyof typeof counts, kind: RecordKind) =>
    counts[verb].set(kind, (counts[verb].get(kind) ?? 0) + 1);
  for (const [id, record] of Object.entries(change.put))
    count(before.has(id) ? 'Changed' : 'Added', record.kind);
  for (const id of change.remove) {
    const record = before.get(id);
    if (record) count('Removed', record.kind);
  }
  const told = (only: (kind: RecordKind) => boolean) =>
    Object.entries(counts).flatMap(([verb, kinds]) => {
      const parts = [...kinds].filter(([kind]) => only(kind)).map(([kind, n]) => amount(kind, n));
      return parts.length > 0 ? [`${verb} ${parts.join(', ')}`] : [];
    });
  const loud = told((kind) => !quiet.has(kind));
  const [first, ...rest] = loud.length > 0 ? loud : told(() => true);
  if (first === undefined) return 'No change';
  return [first, ...rest.map((part) => part.charAt(0).toLowerCase() + part.slice(1))].join('; ');
}

function amount(kind: RecordKind, n: number): string {
  const [one, many] = names[kind];
  if (kind === 'settings') return one;
  return `${n} ${n === 1 ? one : many}`;
}
