import { Inject, Injectable } from '@nestjs/common';
import { Database } from '../../database/database.js';
import { jobEvents } from '../../database/schema/index.js';
import type { JobStage } from '../jobs/jobs.dto.js';

/** What is told of each kind of event. Amounts are in minor units; crew never see them. */
export interface JobEventData {
  'stage-changed': { readonly from: JobStage; readonly to: JobStage };
  'fault-accepted': { readonly message: string; readonly reason: string };
  'proposal-frozen': { readonly revision: number; readonly amountMinor: number };
  'proposal-sent': {
    readonly revision: number;
    readonly to: readonly string[];
    readonly amountMinor: number;
  };
  'proposal-opened': { readonly revision: number };
  'reminder-sent': { readonly to: string };
  'link-revoked': { readonly to: string };
  'revision-withdrawn': { readonly revision: number };
  'revision-released': { readonly revision: number };
  'question-asked': { readonly about: string };
  'question-answered': { readonly about: string };
  approved: { readonly revision: number; readonly amountMinor: number };
  declined: { readonly revision: number; readonly reason: string };
  'payment-requested': { readonly name: string; readonly amountMinor: number };
  'payment-received': { readonly name: string; readonly method: string; readonly amountMinor: number };
  'payment-failed': { readonly name: string; readonly amountMinor: number };
  /** The card service reports a sum that nobody asked for: somebody must look at it. */
  'payment-mismatch': { readonly name: string; readonly amountMinor: number; readonly expectedMinor: number };
  refunded: { readonly reason: string; readonly amountMinor: number };
  'refund-failed': { readonly reason: string; readonly amountMinor: number };
}
export type JobEventKind = keyof JobEventData;

/** Null id for the homeowner; null altogether for the product itself. */
export type EventActor = { readonly id: string | null; readonly name: string } | null;

/** Writes the timeline of jobs, in the transaction of what it tells. */
@Injectable()
export class JobEvents {
  constructor(@Inject(Database) private readonly database: Database) {}

  async note<K extends JobEventKind>(
    { companyId, jobId }: { readonly companyId: string; readonly jobId: string },
    kind: K,
    data: JobEventData[K],
    actor: EventActor,
  ): Promise<void> {
    await this.database.queries
      .insert(jobEvents)
      .values({ companyId, jobId, kind, data, actorId: actor?.id ?? null, actorName: actor?.name ?? '' });
  }
}
