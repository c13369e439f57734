import { cableLengths } from '../estimate/index.js';
import { type JunctionRecord, nextNumber, type PlanDocument, type PlanRecord } from '../plan/index.js';
import type { JobPricing } from './job-pricing.js';
import { recordGroups } from './record-groups.js';

/**
 * The plan as it is built when only these groups are taken. Lights of the others go, with the cable that is
 * theirs alone; where cable that stays passed through one of them, a splice is left in its place. Cable keeps
 * its length, also where it now ends at a splice.
 */
export function planWith(
  doc: PlanDocument,
  pricing: Pick<JobPricing, 'groups' | 'members'>,
  on: ReadonlySet<string>,
): PlanDocument {
  const groups = recordGroups(doc, pricing);
  const stays = (id: string) => {
    const group = groups.get(id) ?? null;
    return group === null || on.has(group);
  };
  const kept = new Map<string, PlanRecord>();
  const ends = new Set<string>();
  const lengths = cableLengths(doc);
  for (const record of doc.values()) {
    if (record.kind === 'fixture' || record.kind === 'junction' || record.kind === 'cable') {
      if (!stays(record.id)) continue;
      if (record.kind === 'cable') {
        ends.add(record.fromId);
        ends.add(record.toId);
        const { slackFromMeters, slackToMeters } = lengths.get(record.id) ?? record;
        kept.set(record.id, { ...record, slackFromMeters, slackToMeters });
        continue;
      }
    }
    kept.set(record.id, record);
  }
  let number = nextNumber(doc, 'junction');
  for (const id of ends) {
    const record = doc.get(id);
    if (kept.has(id) || record === undefined) continue;
    if (record.kind === 'junction') kept.set(id, record);
    else if (record.kind === 'fixture')
      kept.set(id, spliceAt({ id, sheetId: record.sheetId, at: record.at, number: number++ }));
  }
  return kept;
}

const spliceAt = (place: Pick<JunctionRecord, 'id' | 'sheetId' | 'at' | 'number'>): JunctionRecord => ({
  ...place,
  kind: 'junction',
  style: 'splice',
  name: '',
  itemId: null,
});
