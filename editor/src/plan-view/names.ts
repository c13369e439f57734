import {
  type FixtureRecord,
  initialOf,
  lightOf,
  type PlanDocument,
  type PlanRecord,
  recordOf,
} from '@lampwright/geometry/plan';
import type { Bounds } from './fixture-look';

/** What stands on the plan and in the ledger for one record: P4, T1, H2. */
export function tagOf(doc: PlanDocument, record: PlanRecord): string {
  switch (record.kind) {
    case 'transformer':
      return `T${record.number}`;
    case 'feed': {
      const transformer = recordOf(doc, record.transformerId, 'transformer');
      return transformer === undefined ? 'T?' : `T${transformer.number}`;
    }
    case 'fixture':
      return `${initialOf(doc, record)}${record.number}`;
    case 'junction':
      return `${record.style === 'hub' ? 'H' : 'J'}${record.number}`;
    case 'run':
      return `Run ${record.number}`;
    case 'sheet':
    case 'area':
    case 'zone':
      return record.name;
    case 'face':
      return record.name || 'Wall face';
    case 'tree':
      return record.name || 'Tree';
    case 'item':
      return record.item.name;
    case 'cable':
      return 'Cable';
    case 'measurement':
      return 'Measurement';
    case 'note':
      return 'Note';
    case 'settings':
      return 'Settings';
  }
}

/** The volts it is rated for. */
export function windowOf(doc: PlanDocument, fixture: FixtureRecord): Bounds | null {
  return lightOf(doc, fixture)?.window ?? null;
}
