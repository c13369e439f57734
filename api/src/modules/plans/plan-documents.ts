import {
  applyAll,
  type Change,
  PLAN_SCHEMA_VERSION,
  type PlanDocument,
  type PlanRecord,
  planOf,
  readChange,
  readRecord,
} from '@lampwright/geometry/plan';
import { Inject, Injectable } from '@nestjs/common';
import { type ChangeRow, type PlanKey, PlansRepository, type StoredRecords } from './plans.repository.js';

export interface PlanAt {
  readonly version: number;
  readonly plan: PlanDocument;
}

/** Plans kept in memory, so that a save need not read the whole plan each time. */
const PLANS_REMEMBERED = 32;

/** Reads plans: the present one from its rows, an older one by replaying changes from a snapshot. */
@Injectable()
export class PlanDocuments {
  private readonly remembered = new Map<string, PlanAt>();

  constructor(@Inject(PlansRepository) private readonly repository: PlansRepository) {}

  /** The plan as its rows say, of one moment; null while there is none. */
  async read(key: PlanKey): Promise<PlanAt | null> {
    const stored = await this.repository.present(key);
    return stored && { version: stored.version, plan: planFrom(stored) };
  }

  /** The present plan, whose version the caller holds locked. */
  async present(key: PlanKey, version: number): Promise<PlanDocument> {
    const known = this.remembered.get(nameOf(key));
    if (known?.version === version) return known.plan;
    const read = await this.read(key);
    if (read?.version !== version)
      throw new Error(`The plan is at version ${read?.version}, but ${version} was held locked.`);
    return read.plan;
  }

  /** Keeps the plan of a version that is committed. */
  remember(key: PlanKey, at: PlanAt): void {
    const name = nameOf(key);
    // Taking it out first makes the order of the map that of use.
    this.remembered.delete(name);
    this.remembered.set(name, at);
    for (const oldest of this.remembered.keys()) {
      if (this.remembered.size <= PLANS_REMEMBERED) break;
      this.remembered.delete(oldest);
    }
  }

  /** The plan as it was at a version, from the changes alone. */
  async at(key: PlanKey, version: number): Promise<PlanDocument> {
    const snapshot = await this.repository.snapshotBefore(key, version);
    const start = snapshot ?? { version: 0, schemaVersion: PLAN_SCHEMA_VERSION, records: [] };
    const changes = await this.repository.changesBetween(key, start.version, version);
    return applyAll(planFrom(start), changes.map(changeOf));
  }
}

const nameOf = ({ companyId, jobId }: PlanKey) => `${companyId}/${jobId}`;

function planFrom({ schemaVersion, records }: StoredRecords): PlanDocument {
  // Rows of today's form were checked when they were written.
  if (schemaVersion === PLAN_SCHEMA_VERSION) return planOf(records as PlanRecord[]);
  return planOf(records.map((record) => readRecord(schemaVersion, record)));
}

/** A change as it was applied, in today's form. */
export function changeOf(row: ChangeRow): Change {
  const stored = {
    id: row.changeId,
    schema: row.schemaVersion,
    put: row.put as Change['put'],
    remove: row.remove as string[],
  };
  if (row.schemaVersion !== PLAN_SCHEMA_VERSION) return readChange(stored);
  return { ...stored, schema: PLAN_SCHEMA_VERSION };
}
