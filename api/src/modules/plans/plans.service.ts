import {
  apply,
  type Change,
  isEmpty,
  MAX_RECORDS_PER_CHANGE,
  newId,
  type PlanConflict,
  type PlanDocument,
  rebase,
  restoreTo,
  touched,
} from '@lampwright/geometry/plan';
import { Inject, Injectable } from '@nestjs/common';
import { type Actor, demand } from '../../access/actor.js';
import { conflict, notFound } from '../../http/app-error.js';
import { changeOf, PlanDocuments } from './plan-documents.js';
import { type HeldPlan, PlanWriter } from './plan-writer.js';
import {
  CHANGES_PER_PAGE,
  type Changes,
  type ChangesQuery,
  type History,
  type HistoryQuery,
  type Plan,
  planSummarySchema,
  type Restore,
  type Save,
  type Saved,
  type SummaryAnswer,
} from './plans.dto.js';
import { type ChangeRow, type PlanKey, PlansRepository } from './plans.repository.js';
import { readChanges } from './read-changes.js';

const HISTORY_PER_PAGE = 50;

@Injectable()
export class PlansService {
  constructor(
    @Inject(PlansRepository) private readonly repository: PlansRepository,
    @Inject(PlanDocuments) private readonly documents: PlanDocuments,
    @Inject(PlanWriter) private readonly writer: PlanWriter,
  ) {}

  async get(actor: Actor, jobId: string): Promise<Plan> {
    const key = await this.readable(actor, jobId);
    await this.writer.ensure(key);
    const read = await this.documents.read(key);
    if (!read) throw notFound('This plan');
    return { version: read.version, records: [...read.plan.values()] };
  }

  async changesSince(actor: Actor, jobId: string, { since }: ChangesQuery): Promise<Changes> {
    const key = await this.readable(actor, jobId);
    const version = (await this.repository.find(key))?.version ?? 0;
    const rows = await this.repository.changesBetween(key, since, version, CHANGES_PER_PAGE);
    const last = rows.at(-1)?.version ?? version;
    return { version, changes: rows.map(committed), more: last < version };
  }

  /**
   * Makes the changes that the server has not seen, each a version, or none of them: one that conflicts with
   * what others did since its base is told with all sides of it. One seen before gets its first answer.
   * @throws AppError 409 `plan-conflict`, `job-archived`; 400 for changes that can't be read
   */
  async save(actor: Actor, jobId: string, request: Save): Promise<Saved> {
    const key = await this.editable(actor, jobId);
    const changes = readChanges(request.changes);
    const author = { userId: actor.userId, session: request.session ?? '' };
    let others: ChangeRow[] = [];
    const applied: { id: string; version: number }[] = [];
    const left = await this.writer.write(key, author, async (held) => {
      const known = await this.repository.versionsOf(
        key,
        changes.map(({ id }) => id),
      );
      const since = await this.repository.changesBetween(key, request.baseVersion, held.version);
      const isOwn = this.ownOf(request, known);
      others = since.filter((row) => !isOwn(row));
      const seen = await this.seenBy(key, request.baseVersion, held, since, isOwn);
      const fresh = merge(seen, held, changes, known, others);
      let version = held.version;
      for (const { id } of changes) {
        const first = known.get(id);
        if (first === undefined) version += 1;
        applied.push({ id, version: first ?? version });
      }
      return fresh.map((change) => ({ change }));
    });
    this.documents.remember(key, left);
    return { version: left.version, applied, others: others.map(committed) };
  }

  async history(actor: Actor, jobId: string, query: HistoryQuery): Promise<History> {
    const key = await this.readable(actor, jobId);
    const limit = query.limit ?? HISTORY_PER_PAGE;
    const rows = await this.repository.history(key, query.before ?? null, limit);
    const last = rows.at(-1)?.version ?? 1;
    return {
      items: rows.map(({ authorId, authorName, at, ...row }) => ({
        ...row,
        at: at.toISOString(),
        author: authorId === null ? null : { id: authorId, name: authorName ?? '' },
      })),
      next: last > 1 ? last : null,
    };
  }

  /** Makes the plan what it was at a version, as a new change: nothing since is lost. */
  async restore(actor: Actor, jobId: string, { version, changeId }: Restore): Promise<Saved> {
    const key = await this.editable(actor, jobId);
    const id = changeId ?? newId();
    let first: number | undefined;
    const author = { userId: actor.userId, session: '' };
    const left = await this.writer.write(key, author, async (held) => {
      first = (await this.repository.versionsOf(key, [id])).get(id);
      if (first !== undefined) return [];
      if (version > held.version)
        throw notFound(`Version ${version} of this plan, which is at ${held.version},`);
      const change = restoreTo(held.plan, await this.documents.at(key, version), id);
      if (touched(change).length > MAX_RECORDS_PER_CHANGE)
        throw conflict(
          'too-much-to-restore',
          `Going back to version ${version} would change ${touched(change).length} records at once; ${MAX_RECORDS_PER_CHANGE} are the most. Go back in several steps.`,
        );
      return isEmpty(change) ? [] : [{ change, label: `Restored version ${version}` }];
    });
    this.documents.remember(key, left);
    return { version: left.version, applied: [{ id, version: first ?? left.version }], others: [] };
  }

  async summary(actor: Actor, jobId: string): Promise<SummaryAnswer> {
    const key = await this.readable(actor, jobId);
    const version = (await this.repository.find(key))?.version ?? 0;
    const row = await this.repository.newestSummary(key);
    // One of an older shape counts as not computed yet: the next save makes it anew.
    const summary = planSummarySchema.safeParse(row?.summary);
    return { version, summary: summary.success ? summary.data : null };
  }

  /** The present version, for those who follow the plan. */
  async version(actor: Actor, jobId: string): Promise<number> {
    const key = await this.readable(actor, jobId);
    return (await this.repository.find(key))?.version ?? 0;
  }

  private async readable(actor: Actor, jobId: string): Promise<PlanKey> {
    demand(actor, 'plan.read');
    const key = { companyId: actor.companyId, jobId };
    if (!(await this.repository.jobState(key))) throw notFound('This job');
    return key;
  }

  private async editable(actor: Actor, jobId: string): Promise<PlanKey> {
    demand(actor, 'plan.edit');
    const key = { companyId: actor.companyId, jobId };
    const state = await this.repository.jobState(key);
    if (!state) throw notFound('This job');
    if (state === 'archived')
      throw conflict('job-archived', 'This job is archived. Restore it before changing its plan.');
    return key;
  }

  private ownOf({ session, own = [] }: Save, known: ReadonlyMap<string, number>) {
    const ids = new Set(own);
    return (row: ChangeRow) =>
      known.has(row.changeId) ||
      ids.has(row.changeId) ||
      (session !== undefined && session !== '' && row.session === session);
  }

  /** The plan that the author of the changes saw: the base, with what of later changes was their own. */
  private async seenBy(
    key: PlanKey,
    baseVersion: number,
    held: HeldPlan,
    since: readonly ChangeRow[],
    isOwn: (row: ChangeRow) => boolean,
  ): Promise<PlanDocument> {
    if (since.every(isOwn)) return held.plan;
    const base = await this.documents.at(key, Math.min(baseVersion, held.version));
    return since.filter(isOwn).reduce((plan, row) => apply(plan, changeOf(row)), base);
  }
}

/**
 * The changes that are not known yet, each made on the plan as left by the one before.
 * @throws AppError 409 with the conflicts of all of them, so that the author decides once
 */
function merge(
  seenAtFirst: PlanDocument,
  held: HeldPlan,
  changes: readonly Change[],
  known: ReadonlyMap<string, number>,
  others: readonly ChangeRow[],
): Change[] {
  let seen = seenAtFirst;
  let present = held.plan;
  const fresh: Change[] = [];
  const conflicts = new Map<string, PlanConflict & { changeId: string }>();
  for (const change of changes) {
    if (known.has(change.id)) continue;
    const rebased = rebase(seen, present, change);
    if (rebased.kind === 'conflict')
      for (const found of rebased.conflicts)
        if (!conflicts.has(found.recordId)) conflicts.set(found.recordId, { ...found, changeId: change.id });
    fresh.push(change);
    seen = apply(seen, change);
    present = apply(present, change);
  }
  if (conflicts.size > 0)
    throw conflict(
      'plan-conflict',
      'Somebody changed the same things as you. Choose for each which to keep.',
      {
        version: held.version,
        // Several changes of one record are one conflict: what was, theirs, and mine in the end.
        conflicts: [...conflicts.values()].map((found) =>
          found.mine === null ? found : { ...found, mine: present.get(found.recordId) ?? found.mine },
        ),
        others: others.map(committed),
      },
    );
  return fresh;
}

function committed(row: ChangeRow) {
  return { version: row.version, change: changeOf(row) };
}
