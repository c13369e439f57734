import type { FixtureKind, Load } from '../catalogue/index.js';
import { itemOf, labelOf, lightOf, type PlanDocument, recordsOf } from '../plan/index.js';

/** One row of the schedule of fixtures and lamps. */
export interface ScheduleRow {
  readonly recordId: string;
  readonly tag: string;
  readonly kind: FixtureKind | null;
  readonly fixture: string;
  /** Empty where the light is built in. */
  readonly lamp: string;
  readonly quantity: number;
  /** Of one; null while there is no light in it. */
  readonly watts: number | null;
  readonly lumens: number | null;
  readonly beamDegrees: number | null;
  readonly cctKelvin: number | null;
}

/** Every fixture of the plan with its lamp, by letter and number. */
export function scheduleOf(doc: PlanDocument): ScheduleRow[] {
  const rows: (ScheduleRow & { readonly number: number })[] = [];
  for (const record of recordsOf(doc, 'fixture')) {
    const item = itemOf(doc, record.itemId, 'fixture');
    const light = lightOf(doc, record);
    rows.push({
      recordId: record.id,
      number: record.number,
      tag: labelOf(record, doc),
      kind: item?.kind ?? null,
      fixture: item?.name ?? 'An item that is missing',
      lamp: itemOf(doc, record.lampId, 'lamp')?.name ?? '',
      quantity: record.quantity,
      watts: light ? wattsOf(light.load) : null,
      lumens: light?.lumens ?? null,
      beamDegrees: light?.beamDegrees ?? null,
      cctKelvin: light?.cctKelvin ?? null,
    });
  }
  rows.sort((a, b) => (a.kind ?? '').localeCompare(b.kind ?? '') || a.number - b.number);
  return rows.map(({ number: _, ...row }) => row);
}

function wattsOf(load: Load): number | null {
  return 'watts' in load ? load.watts : null;
}
