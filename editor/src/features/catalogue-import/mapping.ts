import type { FieldName, Mapping, Table } from './api';

/** The mapping after a column was said to hold a field: a field is held by one column, a column holds one. */
export function withField(mapping: Mapping, column: number, field: FieldName | null): Mapping {
  const next = { ...mapping };
  for (const name of Object.keys(next) as FieldName[]) if (next[name] === column) next[name] = null;
  if (field !== null) next[field] = column;
  return next;
}

export function fieldOfColumn(mapping: Mapping, column: number): FieldName | null {
  return (Object.keys(mapping) as FieldName[]).find((name) => mapping[name] === column) ?? null;
}

/** A few texts of a column, to tell what it holds. */
export function samplesOf({ rows }: Pick<Table, 'rows'>, column: number): string[] {
  const texts = new Set<string>();
  for (const row of rows) {
    const text = row[column] ?? '';
    if (text !== '') texts.add(text);
    if (texts.size === 3) break;
  }
  return [...texts];
}
