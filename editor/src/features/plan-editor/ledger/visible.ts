import type { OutlineRow } from './outline';

/** With more fixtures than this, runs begin folded. */
export const FOLD_FROM = 40;

/** Lines that begin folded: cable always, since it is seldom looked at; runs where the plan is long. */
export function foldedAtFirst(row: OutlineRow, fixtures: number): boolean {
  if (row.kind === 'group' && row.key.endsWith('/cable')) return true;
  return row.kind === 'run' && fixtures > FOLD_FROM;
}

/** What has to be unfolded for these records to show. */
export function unfoldedFor(rows: readonly OutlineRow[], recordIds: ReadonlySet<string>): Set<string> {
  const byKey = new Map(rows.map((row) => [row.key, row]));
  const fixtures = rows.filter((row) => row.kind === 'fixture').length;
  const opened = new Set<string>();
  for (const row of rows) {
    if (row.recordId === null || !recordIds.has(row.recordId)) continue;
    for (let at = row.parent; at !== null; at = byKey.get(at)?.parent ?? null) {
      const parent = byKey.get(at);
      if (parent !== undefined && foldedAtFirst(parent, fixtures)) opened.add(at);
    }
  }
  return opened;
}

/**
 * The lines that show: those with no folded ancestor, or, while somebody searches, those that match and
 * their ancestors. `toggled` holds lines that are not as they began.
 */
export function visibleRows(
  rows: readonly OutlineRow[],
  toggled: ReadonlySet<string>,
  search: string,
): { readonly row: OutlineRow; readonly open: boolean }[] {
  const words = search.trim().toLowerCase().split(/\s+/).filter(Boolean);
  if (words.length > 0) return matching(rows, words);
  const fixtures = rows.filter((row) => row.kind === 'fixture').length;
  const hidden = new Set<string>();
  const shown: { row: OutlineRow; open: boolean }[] = [];
  for (const row of rows) {
    const under = row.parent !== null && hidden.has(row.parent);
    const open = foldedAtFirst(row, fixtures) === toggled.has(row.key);
    if (under || !open) hidden.add(row.key);
    if (!under) shown.push({ row, open });
  }
  return shown;
}

function matching(rows: readonly OutlineRow[], words: readonly string[]) {
  const byKey = new Map(rows.map((row) => [row.key, row]));
  const keep = new Set<string>();
  for (const row of rows) {
    const text = `${row.title} ${row.detail} ${row.figure}`.toLowerCase();
    if (!words.every((w) => text.includes(w))) continue;
    let at: OutlineRow | undefined = row;
    while (at !== undefined && !keep.has(at.key)) {
      keep.add(at.key);
      at = at.parent === null ? undefined : byKey.get(at.parent);
    }
  }
  return rows.filter((row) => keep.has(row.key)).map((row) => ({ row, open: true }));
}
